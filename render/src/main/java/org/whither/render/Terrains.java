package org.whither.render;

import java.awt.geom.Rectangle2D;
import java.util.ArrayList;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import org.whither.film.Conditions;
import org.whither.film.FilmGrid;

/** Chooses what an animation goes over, and what follows from that. */
final class Terrains {
    /** Colours of a scale that a file should keep. */
    private static final int KEPT = 26;

    private Terrains() {}

    /**
     * The terrain asked for.
     *
     * @param inside whether the eye is to be inside the film, where that is shown
     * @param standing middle of what is left of the stator where it is not (rad)
     */
    static Terrain of(FilmShape shape, MotionSettings settings, boolean inside, double standing) {
        if (settings.ground() == MotionSettings.Ground.RELIEF) {
            PictureSettings picture = settings.picture();
            return new ReliefTerrain(
                    Relief.scene(
                            shape, picture.pressureRange().orElse(shape.pressureRange()), ReliefSettings.ring(picture)),
                    shape.grid());
        }
        return new FilmTerrain(shape, settings.exaggeration(), inside, standing);
    }

    /** The colour bar of the pressure, where it is shown by colour. */
    static Optional<MotionPage.Bar> pressureBar(FilmShape shape, MotionSettings settings) {
        if (settings.ground() != MotionSettings.Ground.RELIEF) {
            return Optional.empty();
        }
        PictureSettings.Range found = shape.pressureRange();
        PictureSettings.Range range = settings.picture().pressureRange().orElse(found);
        return Optional.of(new MotionPage.Bar(
                ColourScale.PRESSURE,
                range.low() / 1e5,
                range.high() / 1e5,
                found.low() < range.low() - 1,
                found.high() > range.high() + 1,
                "film pressure, bar absolute"));
    }

    /**
     * Angles, whole sectors, by which pieces of gas that fill one sector evenly are turned so that they fill the ring as
     * evenly: by multiples of the golden section, which no grid has (rad).
     */
    static double[] spread(int count, FilmGrid grid) {
        double[] spread = new double[count];
        for (int n = 0; n < count; n++) {
            double turn = n * 0.6180339887498949;
            spread[n] = Math.floor((turn - Math.floor(turn)) * grid.sectors()) * grid.pitch();
        }
        return spread;
    }

    /** A legend's entry for gas that goes somewhere. */
    static MotionPage.Entry entry(Destination destination, Conditions conditions) {
        return new MotionPage.Entry(
                (ink, x, y) -> ink.mark(destination.marker(x, y, 10 * ink.unit), destination.colour(), ink.unit),
                destination.words(conditions));
    }

    /** A legend's entry for the feed, where there is one. */
    static Optional<MotionPage.Entry> feedEntry(FilmShape shape) {
        return shape.feed() == null
                ? Optional.empty()
                : Optional.of(new MotionPage.Entry(
                        (ink, x, y) -> ink.mark(
                                new Rectangle2D.Double(x - 6 * ink.unit, y - 4 * ink.unit, 12 * ink.unit, 8 * ink.unit),
                                GapScene.FEED,
                                0.8 * ink.unit),
                        "feed"));
    }

    /** How far from an eye, round the ring, things cast shadows (rad). */
    private static final double SHADOWS = Math.toRadians(50);

    /**
     * Adds the sectors of a ring, turned; beside an eye those near it first, so that what they hide is not drawn, and
     * shadows only there.
     *
     * @param sectors things of sectors, each turned by where its sector begins
     * @param turn angle by which the ring has turned (rad)
     * @param eye the eye, or null (mm)
     * @param half half the angle of a sector (rad)
     * @param items where they are added
     */
    static void around(List<Scene.Item> sectors, double turn, double[] eye, double half, List<Scene.Item> items) {
        if (eye == null) {
            sectors.forEach(item -> items.add(item.turned(item.turn() + turn)));
            return;
        }
        double there = Math.atan2(eye[1], eye[0]);
        List<Scene.Item> turned = new ArrayList<>();
        for (Scene.Item item : sectors) {
            Scene.Item now = item.turned(item.turn() + turn);
            turned.add(apart(now, there, half) <= SHADOWS + half ? now : now.shadowless());
        }
        turned.sort(Comparator.comparingDouble(item -> apart(item, there, half)));
        items.addAll(turned);
    }

    private static double apart(Scene.Item sector, double theta, double half) {
        double d = sector.turn() + half - theta;
        return Math.abs(d - 2 * Math.PI * Math.rint(d / (2 * Math.PI)));
    }

    static void add(List<Scene.Item> items, MeshBuilder mesh, Scene.Material material) {
        if (!mesh.isEmpty()) {
            items.add(new Scene.Item(mesh.build(), material, 0));
        }
    }

    /** Colours that a file should keep: paper, letters, destinations, and steps of the scales shown. */
    static List<Integer> keyColours(PictureSettings picture, boolean pressure, boolean speed) {
        List<Integer> colours = new ArrayList<>();
        boolean dark = picture.background() == PictureSettings.Background.DARK;
        colours.add(Ink.paper(picture));
        colours.add(dark ? 0xe9edf0 : 0x1c2126);
        colours.add(dark ? 0x9aa6b0 : 0x5b656e);
        for (Destination destination : Destination.values()) {
            colours.add(destination.colour());
        }
        colours.add(GapScene.FEED);
        colours.add(Ride.ON_RELIEF);
        for (int n = 0; n < KEPT; n++) {
            if (speed) {
                colours.add(ColourScale.SPEED.colour((double) n / (KEPT - 1)));
            }
            if (pressure) {
                colours.add(ColourScale.PRESSURE.colour((double) n / (KEPT - 1)));
            }
        }
        return colours;
    }
}
