package org.whither.io.picture;

import java.awt.image.BufferedImage;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import org.whither.eddy.Zone;
import org.whither.film.FilmFlow;
import org.whither.render.Gap;
import org.whither.render.GapSettings;
import org.whither.render.Meridian;
import org.whither.render.MeridianSettings;
import org.whither.render.Pair;
import org.whither.render.PictureSettings;
import org.whither.render.Plan;
import org.whither.render.PlanData;
import org.whither.render.PlanSettings;
import org.whither.render.Quantity;
import org.whither.render.Relief;
import org.whither.render.ReliefSettings;

/** Draws a described picture of a film, alone or beside another one. */
public final class Stills {
    /**
     * A film with what was computed of it.
     *
     * @param flow the motion of its gas
     * @param data what a plan can show; its paths are drawn in every picture that has paths
     * @param zones zones of held gas, outlined in every picture but a relief; may be empty
     */
    public record Subject(FilmFlow flow, PlanData data, List<Zone> zones) {
        /** Keeps its own copy of the zones. */
        public Subject {
            zones = List.copyOf(zones);
        }
    }

    private Stills() {}

    /** The description with everything filled in that follows from the field: the picture it makes is the same. */
    public static PictureDescription resolved(Subject subject, PictureDescription picture, String title) {
        PictureDescription full = picture;
        FilmFlow flow = subject.flow();
        switch (picture.view()) {
            case PLAN:
                if (picture.show() != Quantity.DESTINATION) {
                    full = filled(
                            full,
                            picture.show(),
                            Plan.range(
                                    flow,
                                    picture.show(),
                                    picture.frame(),
                                    subject.data().ages()));
                }
                return full;
            case RELIEF:
                full = filled(
                        full,
                        Quantity.PRESSURE,
                        Plan.range(flow, Quantity.PRESSURE, picture.frame(), Optional.empty()));
                full = filledSpeeds(full, Relief.speedRange(subject.data().paths()));
                ReliefSettings relief = relief(full, title);
                return full.drawn(
                        OptionalDouble.empty(),
                        OptionalDouble.of(Relief.barPerMillimetre(flow, relief)),
                        OptionalDouble.empty(),
                        Optional.of(Relief.camera(flow, subject.data().paths(), relief)));
            case GAP:
                full = filledSpeeds(full, Gap.speedRange(flow, subject.data().paths(), gap(full, title)));
                return full.drawn(
                        OptionalDouble.of(full.exaggeration().orElse(GapSettings.USUAL)),
                        OptionalDouble.empty(),
                        OptionalDouble.empty(),
                        Optional.of(Gap.viewpoint(flow, subject.data().paths(), gap(full, title))));
            default:
                full = filledSpeeds(full, Optional.of(Meridian.speedRange(flow, meridian(full, title))));
                return full.drawn(
                        OptionalDouble.of(Meridian.exaggeration(flow, meridian(full, title))),
                        OptionalDouble.empty(),
                        full.angle(),
                        Optional.empty());
        }
    }

    private static PictureDescription filled(
            PictureDescription picture, Quantity quantity, PictureSettings.Range range) {
        return picture.range(quantity).isPresent() ? picture : picture.ranged(quantity, range);
    }

    private static PictureDescription filledSpeeds(PictureDescription picture, Optional<PictureSettings.Range> range) {
        return range.isPresent() ? filled(picture, Quantity.SPEED, range.get()) : picture;
    }

    /** The description of two pictures with one scale: what holds both where they differ. */
    public static PictureDescription common(PictureDescription a, PictureDescription b) {
        PictureDescription both = a;
        for (Quantity quantity : Quantity.values()) {
            Optional<PictureSettings.Range> first = a.range(quantity);
            Optional<PictureSettings.Range> second = b.range(quantity);
            if (second.isPresent()) {
                double low =
                        Math.min(first.orElse(second.get()).low(), second.get().low());
                double high =
                        Math.max(first.orElse(second.get()).high(), second.get().high());
                both = both.ranged(quantity, new PictureSettings.Range(low, high));
            }
        }
        OptionalDouble exaggeration =
                a.exaggeration().isPresent() && b.exaggeration().isPresent()
                        ? OptionalDouble.of(Math.min(
                                a.exaggeration().getAsDouble(), b.exaggeration().getAsDouble()))
                        : a.exaggeration();
        OptionalDouble height = a.barPerMillimetre().isPresent()
                        && b.barPerMillimetre().isPresent()
                ? OptionalDouble.of(Math.max(
                        a.barPerMillimetre().getAsDouble(), b.barPerMillimetre().getAsDouble()))
                : a.barPerMillimetre();
        return both.drawn(exaggeration, height, a.angle(), a.camera());
    }

    /**
     * Draws a picture.
     *
     * @throws org.whither.render.NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the size is beyond the memory
     */
    public static BufferedImage draw(Subject subject, PictureDescription picture, String title) {
        FilmFlow flow = subject.flow();
        return switch (picture.view()) {
            case PLAN ->
                Plan.draw(
                        flow,
                        few(subject),
                        new PlanSettings(
                                settings(picture, title),
                                picture.show(),
                                picture.part(),
                                picture.range(picture.show())));
            case RELIEF -> Relief.draw(flow, subject.data().paths(), relief(picture, title));
            case GAP -> Gap.draw(flow, subject.data().paths(), subject.zones(), gap(picture, title));
            case MERIDIAN -> Meridian.draw(flow, subject.zones(), meridian(picture, title));
        };
    }

    /** More footprints than this cover what lies under them. */
    private static final int FOOTPRINTS = 8;

    private static PlanData few(Subject subject) {
        PlanData data = subject.data();
        return new PlanData(
                data.fed(),
                data.paths().subList(0, Math.min(data.paths().size(), FOOTPRINTS)),
                data.ages(),
                data.destinations(),
                subject.zones());
    }

    /**
     * Draws two films side by side with one description.
     *
     * @param picture what each half shows; its size is that of the whole picture
     */
    public static BufferedImage pair(
            Subject left, String leftTitle, Subject right, String rightTitle, PictureDescription picture) {
        PictureSettings whole = settings(picture, leftTitle);
        PictureDescription half = picture.sized(Pair.halfWidth(whole), Pair.halfHeight(whole));
        return Pair.of(draw(left, half, leftTitle), draw(right, half, rightTitle), whole);
    }

    /** Size, title, background and ranges of a picture. */
    static PictureSettings settings(PictureDescription picture, String title) {
        return new PictureSettings(
                picture.width(),
                picture.height(),
                title,
                picture.background(),
                picture.seenFrom(),
                picture.frame(),
                picture.range(Quantity.PRESSURE),
                picture.range(Quantity.SPEED));
    }

    private static ReliefSettings relief(PictureDescription picture, String title) {
        return new ReliefSettings(
                settings(picture, title), picture.part(), picture.barPerMillimetre(), picture.camera());
    }

    private static GapSettings gap(PictureDescription picture, String title) {
        return new GapSettings(
                settings(picture, title), picture.exaggeration().orElse(GapSettings.USUAL), picture.camera());
    }

    private static MeridianSettings meridian(PictureDescription picture, String title) {
        return new MeridianSettings(settings(picture, title), picture.angle(), picture.exaggeration());
    }
}
