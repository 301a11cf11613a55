package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.Arrays;
import java.util.EnumSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.whither.film.Conditions;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/**
 * The film pressure drawn as height over the ring or over a few sectors, lit from the side so that its ridges stand out,
 * with paths laid over it as tubes coloured by speed. Seen from the stator.
 */
public final class Relief {
    /** From the upper left, low, so that ridges throw shadows. */
    private static final double LIGHT_ABOVE = Math.toRadians(38);

    /** Share of the ring's radius that the highest place is drawn over the lowest, about. */
    private static final double WANTED_HEIGHT = 0.26;

    /** The same of a few sectors, as a share of the face's radial extent. */
    private static final double WANTED_SECTOR_HEIGHT = 0.75;

    /** About how much of the ring a picture of sectors shows (rad). */
    private static final double SECTOR_WISH = Math.toRadians(70);

    private final FilmShape shape;
    private final FilmGrid grid;
    private final PictureSettings settings;
    private final List<Path> paths;
    private final PictureSettings.Range found;
    private final PictureSettings.Range pressures;
    private final PictureSettings.Range speeds;
    private final double[] speedsFound;
    private final ReliefScene scene;
    private final Viewpoint viewpoint;

    private Relief(FilmFlow flow, List<Path> paths, ReliefSettings relief) {
        this.shape = new FilmShape(flow);
        this.grid = shape.grid();
        this.settings = relief.picture();
        this.paths = paths;
        this.found = shape.pressureRange();
        this.pressures = settings.pressureRange().orElse(found);
        this.speedsFound = speeds(paths);
        this.speeds = settings.speedRange()
                .orElse(
                        speedsFound == null
                                ? new PictureSettings.Range(0, 1)
                                : Gap.range(speedsFound[0], speedsFound[1]));
        this.scene = scene(shape, pressures, relief);
        this.viewpoint = relief.camera().orElse(usualCamera(scene.whole(), paths));
    }

    /** Where a relief is looked at from where nothing else is asked for. */
    static Viewpoint usualCamera(boolean whole, List<Path> paths) {
        if (!whole) {
            return ReliefSettings.SECTOR_CAMERA;
        }
        double x = 0;
        double y = 0;
        for (Path path : paths) {
            for (PathPoint point : path.points()) {
                x += Math.cos(point.steadyTheta()) / path.points().size();
                y += Math.sin(point.steadyTheta()) / path.points().size();
            }
        }
        return Math.hypot(x, y) < 0.2 * Math.max(1, paths.size())
                ? ReliefSettings.RING_CAMERA
                : ReliefSettings.RING_CAMERA.turned(Math.atan2(y, x) + Math.PI);
    }

    /**
     * The scene that a relief would show; for animations too.
     *
     * @param shape the film's shape
     * @param pressures ends of the pressure scale (Pa)
     * @param relief which part, and how high
     */
    static ReliefScene scene(FilmShape shape, PictureSettings.Range pressures, ReliefSettings relief) {
        int sectors = relief.part() == Part.SECTOR
                ? sectors(shape.grid())
                : shape.grid().sectors();
        double scale = relief.barPerMillimetre().orElse(usualScale(shape, pressures, relief.part()));
        return new ReliefScene(shape, pressures, scale, sectors);
    }

    private static int sectors(FilmGrid grid) {
        return (int) Math.max(1, Math.min(grid.sectors(), Math.rint(SECTOR_WISH / grid.pitch())));
    }

    /** A round number of bar for one mm of height. */
    private static double usualScale(FilmShape shape, PictureSettings.Range pressures, Part part) {
        FilmGrid grid = shape.grid();
        double wanted = part == Part.SECTOR
                ? WANTED_SECTOR_HEIGHT * 1e3 * (grid.outerRadius() - grid.innerRadius())
                : WANTED_HEIGHT * 1e3 * grid.outerRadius();
        double scale = 1e-5 * (pressures.high() - pressures.low()) / wanted;
        double power = Math.pow(10, Math.floor(Math.log10(scale)));
        double best = 10 * power;
        for (double factor : new double[] {1, 1.25, 2, 2.5, 4, 5, 8}) {
            if (Math.abs(Math.log(factor * power / scale)) < Math.abs(Math.log(best / scale))) {
                best = factor * power;
            }
        }
        return best;
    }

    /** The pressure for one mm of height that a relief would have (bar/mm). */
    public static double barPerMillimetre(FilmFlow flow, ReliefSettings settings) {
        FilmShape shape = new FilmShape(flow);
        PictureSettings.Range pressures = settings.picture().pressureRange().orElse(shape.pressureRange());
        return settings.barPerMillimetre().orElse(usualScale(shape, pressures, settings.part()));
    }

    /** From where a relief would be looked at. */
    public static Viewpoint camera(FilmFlow flow, List<Path> paths, ReliefSettings settings) {
        return settings.camera()
                .orElseGet(() -> usualCamera(
                        settings.part() != Part.SECTOR
                                || sectors(flow.film().grid())
                                        == flow.film().grid().sectors(),
                        paths));
    }

    /** The range of speeds that a relief would show (m/s); empty without paths. */
    public static Optional<PictureSettings.Range> speedRange(List<Path> paths) {
        double[] found = speeds(paths);
        return found == null ? Optional.empty() : Optional.of(Gap.range(found[0], found[1]));
    }

    /** Lowest speed, speed below which nearly all of the drawn length lies, and highest; null without paths (m/s). */
    static double[] speeds(List<Path> paths) {
        List<double[]> steps = new ArrayList<>();
        double total = 0;
        for (Path path : paths) {
            List<PathPoint> points = path.points();
            for (int n = 1; n < points.size(); n++) {
                PathPoint a = points.get(n - 1);
                PathPoint b = points.get(n);
                double length = Math.hypot(b.radius() - a.radius(), b.radius() * (b.steadyTheta() - a.steadyTheta()));
                steps.add(new double[] {b.speed(), length});
                total += length;
            }
        }
        if (steps.isEmpty()) {
            return null;
        }
        double[][] sorted = steps.toArray(new double[0][]);
        Arrays.sort(sorted, (a, b) -> Double.compare(a[0], b[0]));
        double left = 0.005 * total;
        int n = sorted.length - 1;
        while (n > 0 && left >= sorted[n][1]) {
            left -= sorted[n--][1];
        }
        return new double[] {sorted[0][0], sorted[n][0], sorted[sorted.length - 1][0]};
    }

    /**
     * Draws a relief.
     *
     * @param flow the film and its motion
     * @param paths paths laid over it as tubes; may be empty
     * @param settings what the picture is to be like
     * @return the picture, opaque
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the size is beyond the memory
     */
    public static BufferedImage draw(FilmFlow flow, List<Path> paths, ReliefSettings settings) {
        HeadlessGL.start();
        return new Relief(flow, List.copyOf(paths), settings).draw();
    }

    /** Where the light of a relief comes from, for a camera: always from the upper left of the picture. */
    static Scene.Light light(double azimuth) {
        // The eye's left is its azimuth turned back by a right angle; the light stands a little beyond it.
        double from = azimuth - Math.toRadians(115);
        return Scene.Light.from(
                Math.cos(LIGHT_ABOVE) * Math.cos(from), Math.cos(LIGHT_ABOVE) * Math.sin(from), Math.sin(LIGHT_ABOVE));
    }

    /** The direction from the scene to the eye (rad). */
    static double azimuth(ReliefScene scene, Viewpoint camera) {
        return camera.azimuth() + (scene.whole() ? 0 : scene.middle());
    }

    /** The layout that a relief would have, for tests. */
    static Layout layout(FilmFlow flow, List<Path> paths, ReliefSettings settings) {
        BufferedImage blank = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        try (Ink ink = new Ink(blank, settings.picture())) {
            return new Relief(flow, paths, settings).new Layout(ink);
        }
    }

    /** What stands round the scene, and the room that is left. */
    final class Layout {
        final Page page;
        final Legend legend;
        final double barTop;
        final double barLength;
        final Camera camera;

        Layout(Ink ink) {
            double u = ink.unit;
            page = new Page(ink, settings, Words.facts(shape.flow().film()), words());
            legend = new Legend(ink, page.right - page.left);
            fill(legend);
            double legendTop = page.bottom - legend.height();
            barLength = Math.min(0.44 * (page.right - page.left), 420 * u);
            double barHeight = 12 * u;
            barTop = legendTop - 16 * u - ink.ascent(ink.small) - barHeight;
            double captions = 14 * u + 2.2 * ink.height(ink.heading) + ink.height(ink.small);
            double left = page.left + 64 * u + 20;
            // Names stand over the far rim of a part of the ring.
            double top = page.top + 4 * u + (scene.whole() ? 0 : ink.height(ink.heading) + 10 * u);
            Rectangle2D room = new Rectangle2D.Double(left, top, page.right - left - 20 * u, barTop - captions - top);
            camera = viewpoint
                    .turned(azimuth(scene, viewpoint))
                    .fit(scene.extent(), new Rectangle(0, 0, settings.width(), settings.height()), room);
        }

        ReliefScene scene() {
            return scene;
        }

        PictureSettings.Range speeds() {
            return speeds;
        }
    }

    private String words() {
        String part = scene.whole() ? "whole ring" : shownSectors() + " of " + grid.sectors() + " equal sectors";
        return "Film pressure drawn as height: " + Ticks.plain(scene.barPerMillimetre())
                + " bar per mm, on the scale of the lengths along the face" + Ink.DOT + part + Ink.DOT
                + ViewingSide.STATOR.words();
    }

    private int shownSectors() {
        return sectors(grid);
    }

    private void fill(Legend legend) {
        Conditions conditions = shape.flow().film().conditions();
        Set<Destination> seen = EnumSet.noneOf(Destination.class);
        paths.forEach(path -> seen.add(Destination.of(path.end())));
        for (Destination destination : seen) {
            legend.add(destination, destination.words(conditions));
        }
        if (shape.grooved()) {
            legend.addLine(legend.ink().text, "edges of the grooves");
        }
        if (shape.feed() != null) {
            legend.add(
                    (x, y) -> {
                        Ink ink = legend.ink();
                        ink.colour(ink.text);
                        ink.dashes(2 * ink.unit, 4 * ink.unit, 2.4 * ink.unit);
                        ink.line(x - 7 * ink.unit, y, x + 7 * ink.unit, y);
                    },
                    "edges of the feed");
        }
        if (!paths.isEmpty()) {
            legend.add((x, y) -> {}, "tubes not to size");
        }
        if (paths.stream().anyMatch(scene::goesOn)) {
            legend.add((x, y) -> {}, "a tube without a mark at its end goes on outside the part shown");
        }
    }

    private BufferedImage draw() {
        BufferedImage blank = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        Layout layout;
        try (Ink ink = new Ink(blank, settings)) {
            layout = new Layout(ink);
        }
        List<Scene.Item> items = new ArrayList<>(scene.surface());
        items.addAll(scene.lines());
        items.addAll(scene.tubes(paths, speeds));
        Scene.Light light = light(azimuth(scene, viewpoint));
        BufferedImage image;
        try (Canvas canvas = new Canvas(settings.width(), settings.height())) {
            image = canvas.draw(Ink.paper(settings), List.of(new Canvas.View(new Scene(items, light), layout.camera)));
        }
        try (Ink ink = new Ink(image, settings)) {
            Layout there = new Layout(ink);
            there.page.write(ink);
            bars(ink, there);
            ends(ink, there.camera);
            names(ink, there);
            heightScale(ink, there.camera);
            lengthScale(ink, there.camera);
        }
        return image;
    }

    private void bars(Ink ink, Layout layout) {
        double u = ink.unit;
        ink.colourBar(
                new Rectangle2D.Double(layout.page.left + 8 * u, layout.barTop, layout.barLength, 12 * u),
                ColourScale.PRESSURE,
                pressures.low() / 1e5,
                pressures.high() / 1e5,
                found.low() < pressures.low() - 1,
                found.high() > pressures.high() + 1,
                "film pressure, bar absolute");
        if (speedsFound != null) {
            ink.colourBar(
                    new Rectangle2D.Double(
                            layout.page.right - 8 * u - layout.barLength, layout.barTop, layout.barLength, 12 * u),
                    ColourScale.SPEED,
                    speeds.low(),
                    speeds.high(),
                    speedsFound[0] < speeds.low() - 1e-9,
                    speedsFound[2] > speeds.high() + 1e-9,
                    "speed of the gas " + Words.frame(settings.speedFrame()) + ", m/s");
        }
        layout.legend.draw(ink, layout.page.left, layout.page.bottom - layout.legend.height());
    }

    private void ends(Ink ink, Camera camera) {
        for (Path path : paths) {
            double[][] line = scene.line(path, speeds);
            int last = line[1].length - 1;
            if (last < 0 || scene.goesOn(path)) {
                continue;
            }
            double[] end = Arrays.copyOfRange(line[0], 3 * last, 3 * last + 3);
            if (scene.hidden(end, camera.eye())) {
                continue;
            }
            Point2D p = camera.project(end[0], end[1], end[2]);
            Destination destination = Destination.of(path.end());
            ink.mark(destination.marker(p.getX(), p.getY(), 11 * ink.unit), destination.colour(), 1.2 * ink.unit);
        }
    }

    /** Names of the sides, and the rotation arrow. */
    private void names(Ink ink, Layout layout) {
        double u = ink.unit;
        Camera camera = layout.camera;
        Conditions conditions = shape.flow().film().conditions();
        double rate = conditions.rotationRate();
        String turning = rate == 0 ? "rotor stands still" : "rotor turns, " + Words.speed(rate);
        String outer = conditions.outerSide() + " side";
        String inner = conditions.innerSide() + " side";
        String outside = "outside, " + Words.bar(conditions.pressureOuter());
        String inside = "inside, " + Words.bar(conditions.pressureInner());
        double line = ink.height(ink.small);
        if (scene.whole()) {
            double hole = 1e3 * grid.innerRadius();
            Point2D middle = camera.project(0, 0, scene.bottom());
            double aside = viewpoint.azimuth() + Math.PI / 2;
            Point2D rim = camera.project(hole * Math.cos(aside), hole * Math.sin(aside), scene.bottom());
            double room = 1.3 * Math.abs(rim.getX() - middle.getX());
            String fits = ink.first(ink.heading, room, inner, conditions.innerSide());
            ink.write(ink.heading, ink.text, fits, middle.getX(), middle.getY(), Ink.Side.MIDDLE);
            ink.write(
                    ink.small,
                    ink.faint,
                    ink.first(ink.small, room, inside, Words.bar(conditions.pressureInner())),
                    middle.getX(),
                    middle.getY() + line,
                    Ink.Side.MIDDLE);
            double x = layout.page.right;
            double y = layout.page.top + ink.ascent(ink.heading) + 4 * u;
            double beside = 0.3 * settings.width();
            ink.write(ink.heading, ink.text, ink.fitted(ink.heading, outer, beside), x, y, Ink.Side.RIGHT);
            ink.write(ink.small, ink.faint, outside, x, y + line, Ink.Side.RIGHT);
            ink.write(ink.heading, ink.text, turning, x, y + 2.6 * line, Ink.Side.RIGHT);
            if (rate != 0) {
                ink.arrow(rotationArrow(camera, rate), 2.6 * u, ink.text);
            }
            return;
        }
        double side = grid.pitch() * shownSectors();
        double middle = scene.middle();
        String words = inner + ", " + inside;
        double half = 0.5 * ink.width(ink.heading, words) + 8 * u;
        Point2D front = at(camera, middle - 0.12 * side, grid.innerRadius(), scene.bottom());
        double y = front.getY();
        for (int n = 0; n <= 60; n++) {
            Point2D p = at(camera, middle + (n / 60.0 - 0.5) * side, grid.innerRadius(), scene.bottom());
            y = Math.abs(p.getX() - front.getX()) < half ? Math.max(y, p.getY()) : y;
        }
        y += 8 * u + ink.ascent(ink.heading);
        ink.write(ink.heading, ink.text, words, front.getX(), y, Ink.Side.MIDDLE);
        Point2D back = at(camera, middle, grid.outerRadius(), scene.heightAt(middle, grid.outerRadius()));
        double highest = back.getY();
        for (int n = 0; n <= 40; n++) {
            double theta = middle + (n / 40.0 - 0.5) * 0.6 * side;
            for (int m = 0; m <= 20; m++) {
                double r = grid.innerRadius() + (grid.outerRadius() - grid.innerRadius()) * m / 20;
                highest = Math.min(
                        highest, at(camera, theta, r, scene.heightAt(theta, r)).getY());
            }
        }
        ink.write(ink.heading, ink.text, outer + ", " + outside, back.getX(), highest - 10 * u, Ink.Side.MIDDLE);
        double x = layout.page.right;
        double top = layout.page.top + ink.ascent(ink.heading) + 4 * u;
        if (rate != 0) {
            // Of three places the middle one is tangent: the arrow shows its direction.
            Point2D a = at(camera, middle, grid.outerRadius(), 0);
            Point2D b = at(camera, middle + 0.02 * Math.signum(rate), grid.outerRadius(), 0);
            double way = Math.signum(b.getX() - a.getX());
            double wide = 70 * u;
            Point2D[] arrow = new Point2D[15];
            for (int n = 0; n < arrow.length; n++) {
                double f = (double) n / (arrow.length - 1);
                arrow[n] = new Point2D.Double(x - wide * (way > 0 ? 1 - f : f), top + 13 * u);
            }
            ink.write(ink.heading, ink.text, turning, x, top, Ink.Side.RIGHT);
            ink.arrow(arrow, 2.6 * u, ink.text);
        } else {
            ink.write(ink.heading, ink.text, turning, x, top, Ink.Side.RIGHT);
        }
    }

    private static Point2D at(Camera camera, double theta, double r, double z) {
        return camera.project(1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), z);
    }

    /** Points along the rotation arrow, tail to tip, in the picture: in the bore, in the sense in which the rotor turns. */
    private Point2D[] rotationArrow(Camera camera, double rate) {
        return rotationArrow(camera, rate, 0.72 * grid.innerRadius(), viewpoint.azimuth() + Math.PI, scene.bottom());
    }

    static Point2D[] rotationArrow(Camera camera, double rate, double radius, double up, double z) {
        Point2D[] points = new Point2D[49];
        double half = Math.toRadians(48) * Math.signum(rate);
        for (int n = 0; n < points.length; n++) {
            double theta = up - half + 2 * half * n / (points.length - 1);
            points[n] = at(camera, theta, radius, z);
        }
        return points;
    }

    /** The pressures at which the height scale has ticks (bar). */
    static double[] heightTicks(PictureSettings.Range pressures) {
        return Ticks.between(pressures.low() / 1e5, pressures.high() / 1e5, 6);
    }

    /** A post beside the body, with the pressures that its heights stand for. */
    private void heightScale(Ink ink, Camera camera) {
        double u = ink.unit;
        double[] foot = post(scene, camera);
        ink.colour(ink.text);
        ink.stroke(Math.max(1.2, 1.5 * u));
        double[] ticks = heightTicks(pressures);
        double lowest = Math.min(0, scene.height(ticks[0] * 1e5));
        Point2D a = camera.project(foot[0], foot[1], lowest);
        Point2D b = camera.project(foot[0], foot[1], scene.height(pressures.high()));
        ink.line(a.getX(), a.getY(), b.getX(), b.getY());
        int decimals = Ticks.decimals(ticks.length > 1 ? ticks[1] - ticks[0] : 1);
        double before = Double.POSITIVE_INFINITY;
        for (double tick : ticks) {
            Point2D p = camera.project(foot[0], foot[1], scene.height(tick * 1e5));
            ink.colour(ink.text);
            ink.line(p.getX() - 5 * u, p.getY(), p.getX(), p.getY());
            if (before - p.getY() > 0.9 * ink.height(ink.small)) {
                ink.write(
                        ink.small,
                        ink.text,
                        Ticks.number(tick, decimals),
                        p.getX() - 9 * u,
                        p.getY() + 0.36 * ink.small.getSize2D(),
                        Ink.Side.RIGHT);
                before = p.getY();
            }
        }
        ink.write(
                ink.small,
                ink.faint,
                "bar(a)",
                b.getX() - 2 * u,
                b.getY() - 0.8 * ink.height(ink.small),
                Ink.Side.RIGHT);
    }

    /** A length along the rim that lies nearest to the eye, at the foot of the body. */
    private void lengthScale(Ink ink, Camera camera) {
        double u = ink.unit;
        double r = scene.whole() ? grid.outerRadius() : grid.innerRadius();
        double nearest = scene.whole() ? viewpoint.azimuth() : scene.middle() + 0.36 * shownSectors() * grid.pitch();
        double length = Ticks.step(scene.whole() ? 0.3e3 * r : 0.2e3 * r * shownSectors() * grid.pitch(), 1);
        double angle = length / (1e3 * r);
        Point2D[] points = new Point2D[25];
        double lowest = 0;
        for (int n = 0; n < points.length; n++) {
            Point2D p = at(camera, nearest + angle * (n / 24.0 - 0.5), r, scene.bottom());
            points[n] = new Point2D.Double(p.getX(), p.getY() + 8 * u);
            lowest = Math.max(lowest, points[n].getY());
        }
        ink.colour(ink.text);
        ink.stroke(Math.max(1.2, 1.5 * u));
        for (int n = 1; n < points.length; n++) {
            ink.line(points[n - 1].getX(), points[n - 1].getY(), points[n].getX(), points[n].getY());
        }
        for (int n : new int[] {0, 24}) {
            ink.line(points[n].getX(), points[n].getY() - 4 * u, points[n].getX(), points[n].getY() + 4 * u);
        }
        ink.write(
                ink.small,
                ink.text,
                Ticks.plain(length) + " mm",
                points[12].getX(),
                lowest + 6 * u + ink.ascent(ink.small),
                Ink.Side.MIDDLE);
    }

    /** Foot of the height scale: a little beyond the place of the outer rim that lies furthest to the left; x, y (mm). */
    static double[] post(ReliefScene scene, Camera camera) {
        double[] best = null;
        double least = Double.POSITIVE_INFINITY;
        for (double[] point : scene.extent()) {
            if (point[2] != scene.bottom()) {
                continue;
            }
            double x = camera.project(point[0], point[1], 0).getX();
            if (x < least) {
                least = x;
                best = point;
            }
        }
        double further = 1.02;
        return new double[] {further * best[0], further * best[1]};
    }
}
