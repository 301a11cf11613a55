package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.List;
import org.whither.film.Face;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/**
 * A look into the film, its thickness drawn too large by a factor that the picture states: the rotor with its grooves
 * below, the stator above, cut away in front, and paths as tubes coloured by speed. The eye is outside the outer diameter
 * and above, so +θ runs to the right.
 */
public final class Gap {
    /** Height of the eye above the plane of the faces (rad). */
    private static final double ELEVATION = Math.toRadians(33);

    /** How far the eye is turned from the middle of the part shown, towards −θ (rad). */
    private static final double ASIDE = Math.toRadians(20);

    private static final double FIELD_OF_VIEW = Math.toRadians(22);

    private final GapScene gap;
    private final FilmShape shape;
    private final FilmGrid grid;
    private final PictureSettings settings;
    private final List<Path> paths;
    private final PictureSettings.Range range;
    private final double fastest;
    private final double slowest;
    private final double every;

    private Gap(FilmFlow flow, List<Path> paths, GapSettings settings) {
        this.shape = new FilmShape(flow);
        this.grid = shape.grid();
        this.gap = new GapScene(shape, settings.exaggeration());
        this.settings = settings.picture();
        this.paths = paths;
        double most = 0;
        double least = Double.POSITIVE_INFINITY;
        for (Path path : paths) {
            for (PathPoint point : path.points()) {
                most = Math.max(most, point.speed());
                least = Math.min(least, point.speed());
            }
        }
        this.fastest = most;
        this.slowest = least;
        this.range = this.settings.speedRange().orElse(new PictureSettings.Range(0, most > 0 ? upper(most) : 1));
        this.every = interval(paths);
    }

    /** The scale ends at a round number not far above the highest speed. */
    private static double upper(double most) {
        double step = Ticks.step(most, 12);
        return step * Math.ceil(most / step - 1e-9);
    }

    /** A round time that puts about eight markers on a path of middling duration (s). */
    private static double interval(List<Path> paths) {
        double[] times = paths.stream()
                .filter(path -> !path.points().isEmpty())
                .mapToDouble(path -> path.points().get(path.points().size() - 1).time())
                .filter(time -> time > 0)
                .sorted()
                .toArray();
        return times.length == 0 ? 1 : Ticks.step(times[times.length / 2], 9);
    }

    /**
     * Draws a look into the film.
     *
     * @param flow the film and its motion
     * @param paths paths drawn as tubes; may be empty
     * @param settings what the picture is to be like
     * @return the picture, opaque
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the size is beyond what this machine draws
     */
    public static BufferedImage draw(FilmFlow flow, List<Path> paths, GapSettings settings) {
        HeadlessGL.start();
        return new Gap(flow, List.copyOf(paths), settings).draw();
    }

    /** The view that a picture would have, for tests and for overlays. */
    static Camera camera(GapScene gap, PictureSettings settings) {
        double unit = Ink.unit(settings);
        Rectangle window = new Rectangle(0, 0, settings.width(), settings.height());
        // The legend below is three lines of small letters, which do not shrink as far as the picture does.
        double below = 74 * unit + 6.9 * Math.max(Ink.LEAST_SMALL, Ink.SMALL * unit);
        Rectangle2D room = new Rectangle2D.Double(
                125 * unit, 116 * unit, settings.width() - 175 * unit, settings.height() - 116 * unit - below);
        List<double[]> extent = gap.extent();
        double[] away = {
            Math.cos(ELEVATION) * Math.cos(ASIDE), -Math.cos(ELEVATION) * Math.sin(ASIDE), Math.sin(ELEVATION)
        };
        double[] right = {Math.sin(ASIDE), Math.cos(ASIDE), 0};
        double[] up = {
            -Math.sin(ELEVATION) * Math.cos(ASIDE), Math.sin(ELEVATION) * Math.sin(ASIDE), Math.cos(ELEVATION)
        };
        double[] target = new double[3];
        double size = 0;
        for (double[] point : extent) {
            for (int c = 0; c < 3; c++) {
                target[c] += point[c] / extent.size();
            }
        }
        for (double[] point : extent) {
            size = Math.max(
                    size, Math.hypot(Math.hypot(point[0] - target[0], point[1] - target[1]), point[2] - target[2]));
        }
        double distance = 4 * size;
        Camera camera = null;
        for (int round = 0; round < 40; round++) {
            double[] eye = new double[3];
            for (int c = 0; c < 3; c++) {
                eye[c] = target[c] + distance * away[c];
            }
            camera = Camera.perspective(
                    eye,
                    target,
                    FIELD_OF_VIEW,
                    Math.max(0.02 * distance, distance - 2.5 * size),
                    distance + 2.5 * size,
                    window);
            Rectangle2D seen = null;
            for (double[] point : extent) {
                Point2D p = camera.project(point[0], point[1], point[2]);
                if (seen == null) {
                    seen = new Rectangle2D.Double(p.getX(), p.getY(), 0, 0);
                } else {
                    seen.add(p);
                }
            }
            double scale = 2 * distance * Math.tan(FIELD_OF_VIEW / 2) / window.height;
            double dx = (seen.getCenterX() - room.getCenterX()) * scale;
            double dy = (room.getCenterY() - seen.getCenterY()) * scale;
            for (int c = 0; c < 3; c++) {
                target[c] += dx * right[c] + dy * up[c];
            }
            distance *= Math.max(seen.getWidth() / room.getWidth(), seen.getHeight() / room.getHeight());
        }
        return camera;
    }

    private BufferedImage draw() {
        Camera camera = camera(gap, settings);
        List<Scene.Item> items = new ArrayList<>(gap.rings());
        items.addAll(gap.paths(paths, range, every));
        Scene scene = new Scene(items, Scene.Light.from(0.35, -0.75, 1.15));
        BufferedImage image;
        try (Canvas canvas = new Canvas(settings.width(), settings.height())) {
            image = canvas.draw(Ink.paper(settings), List.of(new Canvas.View(scene, camera)));
        }
        try (Ink ink = new Ink(image, settings)) {
            page(ink);
            labels(ink, camera);
        }
        return image;
    }

    private void page(Ink ink) {
        double u = ink.unit;
        double margin = 26 * u;
        double room = settings.width() - 2 * margin;
        double titleBase = margin + ink.ascent(ink.title);
        double factsBase = titleBase + 9 * u + ink.ascent(ink.body);
        double captionBase = factsBase + 11 * u + ink.ascent(ink.body);
        ink.write(ink.title, ink.text, ink.fitted(ink.title, settings.title(), room), margin, titleBase, Ink.Side.LEFT);
        String facts = Words.facts(shape.flow().film());
        ink.writeIn(room, ink.body, ink.faint, facts, margin, factsBase);
        String drawn = exaggerationWords();
        ink.writeIn(room, ink.heading, ink.text, drawn, margin, captionBase);

        double cautionBase = settings.height() - 14 * u;
        ink.caution(room, margin, cautionBase);
        double barBase = cautionBase - ink.ascent(ink.small) - 12 * u - 2.1 * ink.ascent(ink.small) - 16 * u;
        if (!paths.isEmpty()) {
            double length = 0.36 * settings.width();
            Rectangle2D bar = new Rectangle2D.Double(settings.width() - margin - length, barBase, length, 12 * u);
            ink.colourBar(
                    bar,
                    ColourScale.SPEED,
                    range.low(),
                    range.high(),
                    slowest < range.low(),
                    fastest > range.high(),
                    "speed of the gas " + Words.frame(settings.speedFrame()) + ", m/s");
            double x = margin + 9 * u;
            double y = barBase + 12 * u - 2.15 * ink.height(ink.small);
            ink.write(ink.small, ink.text, gap.part(), margin, y, Ink.Side.LEFT);
            y += 1.15 * ink.height(ink.small);
            ink.colour(GapScene.STATOR);
            ink.stroke(2.2 * u);
            ink.line(x - 8 * u, y - 0.35 * ink.small.getSize2D(), x + 8 * u, y - 0.35 * ink.small.getSize2D());
            ink.write(
                    ink.small, ink.text, "edge of the stator face where it is cut away", x + 15 * u, y, Ink.Side.LEFT);
            y += 1.15 * ink.height(ink.small);
            ink.mark(Destination.HELD.marker(x, y - 0.35 * ink.small.getSize2D(), 10 * u), 0xf4f4f2, u);
            ink.write(ink.small, ink.text, "one marker each " + time(every), x + 15 * u, y, Ink.Side.LEFT);
            String each = "one marker each " + time(every);
            ink.write(
                    ink.small,
                    ink.faint,
                    ";  tubes and markers are not drawn to size",
                    x + 15 * u + ink.width(ink.small, each),
                    y,
                    Ink.Side.LEFT);
        }
    }

    private String exaggerationWords() {
        double factor = gap.exaggeration;
        if (factor == 1) {
            return "Drawn true to scale";
        }
        String number = Ticks.plain(factor);
        return "Lengths across the film are drawn " + number + " times " + (factor > 1 ? "too large" : "their size")
                + "; light falls on the drawn shape";
    }

    static String time(double seconds) {
        if (seconds < 0.9999e-3) {
            return Ticks.plain(Math.rint(seconds * 1e9) / 1e3) + " µs";
        }
        return seconds < 0.9999
                ? Ticks.plain(Math.rint(seconds * 1e6) / 1e3) + " ms"
                : Ticks.plain(Math.rint(seconds * 1e3) / 1e3) + " s";
    }

    private void labels(Ink ink, Camera camera) {
        double u = ink.unit;
        var conditions = shape.flow().film().conditions();
        double outer = grid.outerRadius();
        double inner = grid.innerRadius();

        // The rotation arrow lies on the rotor's side, in front.
        double rate = conditions.rotationRate();
        double mid = 0.5 * (gap.bottom + gap.height(shape.rotorLow()));
        if (rate != 0) {
            ink.arrow(rotationArrow(gap, camera, rate, 1e3 * outer, mid), 3 * u, 0xf6f3ee);
        }
        String rotor = rate == 0 ? "rotor stands still" : "rotor turns, " + Words.speed(rate);
        under(ink, camera, 0.36, rotor, "seen from outside, stator above");
        under(ink, camera, 0.7, conditions.outerSide() + " side", "outside, " + Words.bar(conditions.pressureOuter()));

        double backTheta = gap.from + 0.1 * (gap.to - gap.from);
        Point2D back = at(camera, backTheta, inner, gap.height(gap.statorAt(backTheta, inner)));
        double statorTheta = gap.cut + 0.5 * (gap.to - gap.cut);
        Point2D stator = at(camera, statorTheta, 0.5 * (inner + outer), gap.top);
        ink.write(
                ink.heading,
                0x14181c,
                "stator",
                stator.getX(),
                stator.getY() + 0.3 * ink.heading.getSize2D(),
                Ink.Side.MIDDLE);

        double most = Double.POSITIVE_INFINITY;
        FilmShape.Band feed = shape.feed();
        if (feed != null) {
            boolean above = shape.flow().film().supply().orElseThrow().face() == Face.STATOR;
            double theta = gap.from + 0.4 * (gap.to - gap.from);
            double r = 0.5 * (feed.from() + feed.to());
            Point2D p = at(camera, theta, r, gap.height(above ? gap.statorAt(theta, r) : gap.rotorAt(theta, r)));
            Point2D rim = at(camera, theta, inner, gap.height(gap.statorAt(theta, inner)));
            String enters = "supply gas enters here";
            most = p.getX() - 24 * u - ink.width(ink.small, enters) - 16 * u;
            callOut(
                    ink,
                    p,
                    new Point2D.Double(p.getX() - 24 * u, rim.getY() - 40 * u),
                    "feed in the " + (above ? "stator" : "rotor"),
                    enters,
                    Ink.Side.RIGHT);
        }
        String inside = "inside, " + Words.bar(conditions.pressureInner());
        double x = Math.min(back.getX() - 30 * u, most);
        callOut(
                ink,
                back,
                new Point2D.Double(x, back.getY() - 40 * u),
                conditions.innerSide() + " side",
                inside,
                Ink.Side.RIGHT);
        scales(ink, camera);
    }

    /** Writes two lines under the front edge of the drawn block, clear of it, from a share of its length on. */
    private void under(Ink ink, Camera camera, double share, String heading, String detail) {
        double x = at(camera, gap.from + share * (gap.to - gap.from), grid.outerRadius(), gap.bottom)
                .getX();
        double room = settings.width() - 20 * ink.unit - x;
        heading = ink.fitted(ink.heading, heading, room);
        detail = ink.fitted(ink.small, detail, room);
        double wide = Math.max(ink.width(ink.heading, heading), ink.width(ink.small, detail));
        double y = below(camera, x, x + wide) + 10 * ink.unit + ink.ascent(ink.heading);
        ink.write(ink.heading, ink.text, heading, x, y, Ink.Side.LEFT);
        ink.write(ink.small, ink.faint, detail, x, y + ink.height(ink.small), Ink.Side.LEFT);
    }

    private static void callOut(Ink ink, Point2D place, Point2D words, String heading, String detail, Ink.Side side) {
        ink.colour(ink.faint);
        ink.stroke(Math.max(1, ink.unit));
        double gapBelow = ink.height(ink.small) + 4 * ink.unit;
        Path2D.Double leader = new Path2D.Double();
        leader.moveTo(place.getX(), place.getY());
        leader.lineTo(words.getX(), words.getY() + gapBelow);
        ink.pen.draw(leader);
        ink.mark(Destination.HELD.marker(place.getX(), place.getY(), 5 * ink.unit), ink.text, ink.unit);
        double room = words.getX() - 20 * ink.unit;
        heading = ink.fitted(ink.heading, heading, room);
        double x = words.getX() + (side == Ink.Side.LEFT ? -4 : side == Ink.Side.RIGHT ? 4 : 0) * ink.unit;
        ink.write(ink.heading, ink.text, heading, x, words.getY(), side);
        ink.write(ink.small, ink.faint, detail, x, words.getY() + ink.height(ink.small), side);
    }

    /** The lowest place of the drawn block between two picture columns (pixels from the top). */
    private double below(Camera camera, double left, double right) {
        double lowest = 0;
        for (int n = 0; n <= 200; n++) {
            Point2D p = at(camera, gap.from + (gap.to - gap.from) * n / 200, grid.outerRadius(), gap.bottom);
            if (p.getX() >= left && p.getX() <= right) {
                lowest = Math.max(lowest, p.getY());
            }
        }
        return lowest;
    }

    private Point2D at(Camera camera, double theta, double r, double drawnZ) {
        double[] p = gap.place(theta, r, gap.datum);
        return camera.project(p[0], p[1], drawnZ);
    }

    /** Points along the rotation arrow, tail to tip, in the picture: on the rotor's outer side, in its sense of turning. */
    static Point2D[] rotationArrow(GapScene gap, Camera camera, double rate, double radius, double z) {
        double half = 0.16 * (gap.to - gap.from) * Math.signum(rate);
        Point2D[] points = new Point2D[41];
        for (int n = 0; n < points.length; n++) {
            double theta = gap.middle - half + 2 * half * n / (points.length - 1);
            points[n] = camera.project(radius * Math.cos(theta - gap.middle), radius * Math.sin(theta - gap.middle), z);
        }
        return points;
    }

    /** A scale along the face at the lower front edge, and one across the film at the front corner. */
    private void scales(Ink ink, Camera camera) {
        double u = ink.unit;
        double outer = grid.outerRadius();
        // Along the front edge of the underside, from the left corner.
        double arc = 1e3 * outer * (gap.to - gap.from);
        double length = Ticks.step(0.22 * arc, 1);
        Path2D.Double bar = new Path2D.Double();
        double first = gap.from;
        double last = gap.from + length / (1e3 * outer);
        double drop = 9 * u;
        for (int n = 0; n <= 24; n++) {
            Point2D p = at(camera, first + (last - first) * n / 24, outer, gap.bottom);
            if (n == 0) {
                bar.moveTo(p.getX(), p.getY() + drop - 4 * u);
                bar.lineTo(p.getX(), p.getY() + drop + 4 * u);
                bar.moveTo(p.getX(), p.getY() + drop);
            } else {
                bar.lineTo(p.getX(), p.getY() + drop);
            }
            if (n == 24) {
                bar.moveTo(p.getX(), p.getY() + drop - 4 * u);
                bar.lineTo(p.getX(), p.getY() + drop + 4 * u);
            }
        }
        ink.colour(ink.text);
        ink.stroke(Math.max(1.2, 1.6 * u));
        ink.pen.draw(bar);
        String along = Ticks.plain(length) + " mm along the outer diameter";
        Point2D start = at(camera, first, outer, gap.bottom);
        double base0 = below(camera, start.getX(), start.getX() + ink.width(ink.small, along));
        ink.write(
                ink.small, ink.text, along, start.getX(), base0 + drop + 8 * u + ink.ascent(ink.small), Ink.Side.LEFT);

        // Across the film, beside the front left corner.
        double thick = gap.statorAt(gap.from, outer) - gap.rotorAt(gap.from, outer);
        double micrometres = Ticks.step(1e6 * thick, 1);
        micrometres = micrometres > 1e6 * thick * 1.05 ? Ticks.step(0.5e6 * thick, 1) : micrometres;
        double base = gap.rotorAt(gap.from, outer);
        Point2D a = at(camera, gap.from, outer, gap.height(base));
        Point2D b = at(camera, gap.from, outer, gap.height(base + 1e-6 * micrometres));
        double x = a.getX() - 12 * u;
        double shift = -12 * u;
        ink.colour(ink.text);
        ink.line(a.getX() + shift, a.getY(), b.getX() + shift, b.getY());
        ink.line(x - 4 * u, a.getY(), x + 4 * u, a.getY());
        ink.line(b.getX() + shift - 4 * u, b.getY(), b.getX() + shift + 4 * u, b.getY());
        ink.write(
                ink.small,
                ink.text,
                Ticks.plain(micrometres) + " µm",
                x - 8 * u,
                0.5 * (a.getY() + b.getY()),
                Ink.Side.RIGHT);
        ink.write(
                ink.small,
                ink.faint,
                "across the film",
                x - 8 * u,
                0.5 * (a.getY() + b.getY()) + ink.height(ink.small),
                Ink.Side.RIGHT);
    }
}
