package org.whither.io.picture;

import java.util.EnumMap;
import java.util.Map;
import java.util.Optional;
import java.util.OptionalDouble;
import org.whither.film.Frame;
import org.whither.render.Part;
import org.whither.render.PictureSettings;
import org.whither.render.Quantity;
import org.whither.render.ViewingSide;
import org.whither.render.Viewpoint;

/**
 * What a picture shows and how, whatever the field: enough to make the same picture of another one.
 *
 * @param view which kind of picture
 * @param show what a plan shows in colour
 * @param part how much of the ring a plan or a relief shows
 * @param width width (pixels)
 * @param height height (pixels)
 * @param background light or dark
 * @param seenFrom from which side a plan is seen
 * @param frame frame of the speeds
 * @param exaggeration how many times too large lengths across the film are drawn in a gap or a meridian; empty: as usual
 * @param barPerMillimetre pressure for one mm of a relief (bar/mm); empty: a round number
 * @param angle angle of a meridian in the frame in which the film is steady (rad); empty: averaged round the ring
 * @param camera direction from which a relief or a gap is seen; empty: the usual one
 * @param ranges ends of colour scales (SI); those left out follow from the field
 */
public record PictureDescription(
        View view,
        Quantity show,
        Part part,
        int width,
        int height,
        PictureSettings.Background background,
        ViewingSide seenFrom,
        Frame frame,
        OptionalDouble exaggeration,
        OptionalDouble barPerMillimetre,
        OptionalDouble angle,
        Optional<Viewpoint> camera,
        Map<Quantity, PictureSettings.Range> ranges) {
    /** Keeps its own copy of the ranges. */
    public PictureDescription {
        Map<Quantity, PictureSettings.Range> copy = new EnumMap<>(Quantity.class);
        copy.putAll(ranges);
        ranges = copy;
    }

    /** The usual picture of a kind. */
    public static PictureDescription of(View view) {
        return new PictureDescription(
                view,
                Quantity.PRESSURE,
                view == View.RELIEF ? Part.RING : Part.BOTH,
                1280,
                720,
                PictureSettings.Background.LIGHT,
                ViewingSide.STATOR,
                Frame.ROTATING,
                OptionalDouble.empty(),
                OptionalDouble.empty(),
                OptionalDouble.empty(),
                Optional.empty(),
                Map.of());
    }

    /** The same of another kind, which has none of the lengths and cameras of this one. */
    public PictureDescription ofView(View other) {
        return other == view
                ? this
                : new PictureDescription(
                        other,
                        show,
                        other == View.RELIEF && part == Part.BOTH ? Part.RING : part,
                        width,
                        height,
                        background,
                        seenFrom,
                        frame,
                        OptionalDouble.empty(),
                        OptionalDouble.empty(),
                        OptionalDouble.empty(),
                        Optional.empty(),
                        ranges);
    }

    /** The same that shows another quantity. */
    public PictureDescription showing(Quantity quantity) {
        return new PictureDescription(
                view,
                quantity,
                part,
                width,
                height,
                background,
                seenFrom,
                frame,
                exaggeration,
                barPerMillimetre,
                angle,
                camera,
                ranges);
    }

    /** The same of another part of the ring. */
    public PictureDescription ofPart(Part other) {
        return new PictureDescription(
                view,
                show,
                other,
                width,
                height,
                background,
                seenFrom,
                frame,
                exaggeration,
                barPerMillimetre,
                angle,
                camera,
                ranges);
    }

    /** The same at another size (pixels). */
    public PictureDescription sized(int newWidth, int newHeight) {
        return new PictureDescription(
                view,
                show,
                part,
                newWidth,
                newHeight,
                background,
                seenFrom,
                frame,
                exaggeration,
                barPerMillimetre,
                angle,
                camera,
                ranges);
    }

    /** The same on a background, from a side, with speeds of a frame. */
    public PictureDescription seen(PictureSettings.Background on, ViewingSide from, Frame speeds) {
        return new PictureDescription(
                view,
                show,
                part,
                width,
                height,
                on,
                from,
                speeds,
                exaggeration,
                barPerMillimetre,
                angle,
                camera,
                ranges);
    }

    /** The same with other lengths and another camera; what is empty stays to be found from the field. */
    public PictureDescription drawn(
            OptionalDouble newExaggeration,
            OptionalDouble newBarPerMillimetre,
            OptionalDouble newAngle,
            Optional<Viewpoint> newCamera) {
        return new PictureDescription(
                view,
                show,
                part,
                width,
                height,
                background,
                seenFrom,
                frame,
                newExaggeration,
                newBarPerMillimetre,
                newAngle,
                newCamera,
                ranges);
    }

    /** The same with given ends of a colour scale (SI). */
    public PictureDescription ranged(Quantity quantity, PictureSettings.Range range) {
        Map<Quantity, PictureSettings.Range> more = new EnumMap<>(Quantity.class);
        more.putAll(ranges);
        more.put(quantity, range);
        return new PictureDescription(
                view,
                show,
                part,
                width,
                height,
                background,
                seenFrom,
                frame,
                exaggeration,
                barPerMillimetre,
                angle,
                camera,
                more);
    }

    /** The range of a quantity, where it is given. */
    public Optional<PictureSettings.Range> range(Quantity quantity) {
        return Optional.ofNullable(ranges.get(quantity));
    }

    /** The name of its file, without an ending. */
    public String name() {
        return view == View.PLAN && show != Quantity.PRESSURE
                ? "plan-" + show.name().toLowerCase(java.util.Locale.ROOT)
                : view.word();
    }
}
