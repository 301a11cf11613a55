package org.whither.render;

import java.awt.BasicStroke;
import java.awt.Rectangle;
import java.awt.Shape;
import java.awt.geom.Area;
import java.awt.geom.Line2D;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.EnumSet;
import java.util.List;
import java.util.Set;
import org.whither.fate.FedPoint;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/**
 * The face seen along the shaft: on the left the whole ring with the film pressure in colour, grooves, feed and
 * footprints of paths; on the right one sector enlarged, with isobars; below it the feed unrolled, with a marker for each
 * point that says where its gas goes.
 *
 * <p>Angles are those of the frame in which the film is steady; lengths in both views are true to scale.
 */
public final class Plan {
    /** Most isobars in the enlarged view. */
    private static final int ISOBARS = 12;

    /** How far round a footprint is drawn at most: a longer one would run over its own beginning (rad). */
    private static final double FULL = Math.toRadians(330);

    /** Of lines over the pressure. */
    private static final int DARK = 0x14181c;

    private final FilmShape shape;
    private final FilmGrid grid;
    private final PictureSettings settings;
    private final List<FedPoint> fed;
    private final List<Path> paths;
    private final PictureSettings.Range found;
    private final PictureSettings.Range range;

    private Plan(FilmFlow flow, List<FedPoint> fed, List<Path> paths, PictureSettings settings) {
        this.shape = new FilmShape(flow);
        this.grid = shape.grid();
        this.settings = settings;
        this.fed = fed;
        this.paths = paths;
        this.found = shape.pressureRange();
        this.range = settings.pressureRange().orElse(found);
    }

    /**
     * Draws a plan.
     *
     * @param flow the film and its motion
     * @param fed points of the feed with the ends of their tracers; may be empty
     * @param paths paths whose footprints are drawn; may be empty
     * @param settings what the picture is to be like
     * @return the picture, opaque
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the size is beyond what this machine draws
     */
    public static BufferedImage draw(FilmFlow flow, List<FedPoint> fed, List<Path> paths, PictureSettings settings) {
        HeadlessGL.start();
        return new Plan(flow, List.copyOf(fed), List.copyOf(paths), settings).draw();
    }

    /** The layout that a plan would have, for tests and for overlays. */
    static PlanLayout layout(FilmShape shape, PictureSettings settings, boolean withFeed, boolean withLegend) {
        BufferedImage page = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        try (Ink ink = new Ink(page, settings)) {
            return new PlanLayout(shape, settings, ink, withFeed, withLegend);
        }
    }

    private BufferedImage draw() {
        PlanLayout layout = layout(shape, settings, withFeed(), withFeed() || !paths.isEmpty());
        BufferedImage image;
        try (Canvas canvas = new Canvas(settings.width(), settings.height())) {
            Scene scene = scene();
            image = canvas.draw(
                    Ink.paper(settings),
                    List.of(new Canvas.View(scene, layout.ring), new Canvas.View(scene, layout.sector)));
        }
        try (Ink ink = new Ink(image, settings)) {
            page(ink, layout);
            ring(ink, layout);
            sector(ink, layout);
            if (layout.feedWindow != null) {
                feed(ink, layout);
            }
            if (withFeed() || !paths.isEmpty()) {
                legend(ink, layout);
            }
        }
        return image;
    }

    private boolean withFeed() {
        return shape.feed() != null && !fed.isEmpty();
    }

    /** The pressure over the whole ring: one mesh of a sector, placed as often as there are sectors. */
    private Scene scene() {
        Mesh mesh = shape.pressureMesh(range);
        Scene.Material material = Scene.Material.scaled(ColourScale.PRESSURE, false);
        List<Scene.Item> items = new ArrayList<>();
        for (int n = 0; n < grid.sectors(); n++) {
            items.add(new Scene.Item(mesh, material, n * grid.pitch()));
        }
        return new Scene(items, Scene.Light.from(0, 0, 1));
    }

    private void page(Ink ink, PlanLayout layout) {
        double room = layout.rightEdge - layout.margin;
        ink.write(
                ink.title,
                ink.text,
                ink.fitted(ink.title, settings.title(), room),
                layout.margin,
                layout.titleBase,
                Ink.Side.LEFT);
        String facts = Words.facts(shape.flow().film());
        ink.writeIn(room, ink.body, ink.faint, facts, layout.margin, layout.factsBase);
        ink.caution(room, layout.margin, layout.cautionBase);
        ink.colourBar(
                layout.pressureBar,
                ColourScale.PRESSURE,
                range.low() / 1e5,
                range.high() / 1e5,
                found.low() < range.low() - 1,
                found.high() > range.high() + 1,
                "film pressure, bar absolute");
    }

    private void ring(Ink ink, PlanLayout layout) {
        Rectangle window = layout.ringWindow;
        Shape before = ink.pen.getClip();
        ink.pen.clip(window);
        outlines(ink, layout.ring, Math.max(0.75, 0.95 * ink.unit), 0, grid.sectors() - 1, false);
        footprints(ink, layout.ring, 1.5 * ink.unit);
        ink.pen.setClip(before);

        var conditions = shape.flow().film().conditions();
        double line = ink.height(ink.body);
        double x = window.x;
        double y = window.y + ink.ascent(ink.body);
        // The corner of the window that the ring leaves free.
        String outerSide = ink.fitted(ink.heading, conditions.outerSide() + " side", 0.37 * window.width);
        ink.write(ink.heading, ink.text, outerSide, x, y, Ink.Side.LEFT);
        ink.write(
                ink.small, ink.faint, "outside, " + Words.bar(conditions.pressureOuter()), x, y + line, Ink.Side.LEFT);

        double cx = window.getCenterX();
        double cy = window.getCenterY();
        double hole = 1e3 * grid.innerRadius() * layout.ringScale;
        double most = 1.5 * hole;
        String inner = ink.fitted(ink.heading, conditions.innerSide() + " side", most);
        String inside = "inside, " + Words.bar(conditions.pressureInner());
        ink.write(ink.heading, ink.text, inner, cx, cy + 0.42 * hole, Ink.Side.MIDDLE);
        ink.write(ink.small, ink.faint, inside, cx, cy + 0.42 * hole + line, Ink.Side.MIDDLE);

        double rate = conditions.rotationRate();
        double words = cy - 0.18 * hole;
        if (rate != 0) {
            ink.arrow(rotationArrow(layout.ring, rate, 0.74e3 * grid.innerRadius()), 2.4 * ink.unit, ink.text);
            ink.write(ink.heading, ink.text, "rotor turns, " + Words.speed(rate), cx, words, Ink.Side.MIDDLE);
        } else {
            ink.write(ink.heading, ink.text, "rotor stands still", cx, words, Ink.Side.MIDDLE);
        }
        String seen = settings.seenFrom().words();
        ink.write(ink.fitting(ink.small, seen, most), ink.faint, seen, cx, words + line, Ink.Side.MIDDLE);

        scaleBar(ink, window.x, window.getMaxY() - 8 * ink.unit, layout.ringScale, 0.2 * window.width);
        // Where the enlarged view lies.
        ink.colour(ink.text, 0.55);
        ink.stroke(Math.max(1, 1.1 * ink.unit));
        ink.pen.draw(sectorFrame(layout));
    }

    private static void scaleBar(Ink ink, double x, double y, double scale, double room) {
        double length = Ticks.step(room / scale, 1);
        length = length * scale > 1.4 * room ? Ticks.step(0.5 * room / scale, 1) : length;
        ink.scaleBar(x, y, length * scale, Ticks.plain(length) + " mm");
    }

    /** The window of the enlarged view, as it lies in the ring. */
    private static Shape sectorFrame(PlanLayout layout) {
        Rectangle window = layout.sectorWindow;
        Point2D middle = layout.sector.project(0, 0, 0);
        double ratio = layout.ringScale / layout.sectorScale;
        Point2D ringMiddle = layout.ring.project(0, 0, 0);
        // Both views differ by a turn about the shaft and a scale.
        Point2D up = layout.ring.project(Math.cos(layout.middle), Math.sin(layout.middle), 0);
        double ux = (up.getX() - ringMiddle.getX()) / layout.ringScale;
        double uy = (up.getY() - ringMiddle.getY()) / layout.ringScale;
        double[][] corners = {
            {window.x, window.y},
            {window.getMaxX(), window.y},
            {window.getMaxX(), window.getMaxY()},
            {window.x, window.getMaxY()}
        };
        Path2D.Double path = new Path2D.Double();
        for (int n = 0; n < 4; n++) {
            double right = ratio * (corners[n][0] - middle.getX());
            double above = ratio * (middle.getY() - corners[n][1]);
            double px = ringMiddle.getX() + above * ux - right * uy;
            double py = ringMiddle.getY() + above * uy + right * ux;
            if (n == 0) {
                path.moveTo(px, py);
            } else {
                path.lineTo(px, py);
            }
        }
        path.closePath();
        return path;
    }

    /**
     * Points along the rotation arrow, from its tail to its tip, in the picture: a quarter turn through the top in the
     * sense in which the rotor turns.
     *
     * @param camera the view
     * @param rotationRate rotation rate, not 0 (rad/s)
     * @param radius radius of the arrow (mm)
     */
    static Point2D[] rotationArrow(Camera camera, double rotationRate, double radius) {
        Point2D[] points = new Point2D[49];
        double half = Math.toRadians(52) * Math.signum(rotationRate);
        for (int n = 0; n < points.length; n++) {
            double theta = Math.PI / 2 - half + 2 * half * n / (points.length - 1);
            points[n] = camera.project(radius * Math.cos(theta), radius * Math.sin(theta), 0);
        }
        return points;
    }

    /**
     * Rims of the face, feed and groove outlines, for a range of sectors.
     *
     * @param cased whether groove edges are strong lines with a light casing, so that isobars are not taken for them
     */
    private void outlines(Ink ink, Camera camera, double width, int first, int last, boolean cased) {
        Path2D.Double grooves = new Path2D.Double();
        Path2D.Double ports = new Path2D.Double();
        for (int n = first; n <= last; n++) {
            add(grooves, camera, shape.grooveEdges(), n * grid.pitch());
            add(ports, camera, shape.feedEdges(), n * grid.pitch());
        }
        if (cased) {
            grooveLine(ink, grooves);
        } else {
            ink.colour(DARK, 0.75);
            ink.stroke(width);
            ink.pen.draw(grooves);
        }
        ink.colour(DARK, cased ? 0.85 : 0.75);
        ink.dashes(width, 4 * ink.unit, 2.4 * ink.unit);
        FilmShape.Band feed = shape.feed();
        if (feed != null) {
            ink.pen.draw(ports);
            if (shape.feedEdges().isEmpty()) {
                circle(ink, camera, feed.from());
                circle(ink, camera, feed.to());
            }
        }
        ink.colour(ink.text);
        ink.stroke(1.4 * width);
        circle(ink, camera, grid.innerRadius());
        circle(ink, camera, grid.outerRadius());
    }

    /** Draws an edge of a groove in the enlarged view. */
    private static void grooveLine(Ink ink, Shape line) {
        ink.colour(0xffffff, 0.95);
        ink.stroke(4.4 * ink.unit);
        ink.pen.draw(line);
        ink.colour(DARK);
        ink.stroke(1.8 * ink.unit);
        ink.pen.draw(line);
    }

    private static void add(Path2D.Double path, Camera camera, List<FilmShape.Edge> edges, double turn) {
        for (FilmShape.Edge edge : edges) {
            double span = edge.theta1() - edge.theta0();
            int parts = Math.max(1, (int) Math.ceil(Math.abs(span) / Math.toRadians(1)));
            Point2D a = at(camera, edge.theta0() + turn, edge.r0());
            path.moveTo(a.getX(), a.getY());
            for (int n = 1; n <= parts; n++) {
                double f = (double) n / parts;
                Point2D b = at(camera, edge.theta0() + f * span + turn, edge.r0() + f * (edge.r1() - edge.r0()));
                path.lineTo(b.getX(), b.getY());
            }
        }
    }

    private static Point2D at(Camera camera, double theta, double r) {
        return camera.project(1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), 0);
    }

    private static void circle(Ink ink, Camera camera, double radius) {
        Path2D.Double path = new Path2D.Double();
        for (int n = 0; n <= 720; n++) {
            Point2D p = at(camera, Math.toRadians(0.5 * n), radius);
            if (n == 0) {
                path.moveTo(p.getX(), p.getY());
            } else {
                path.lineTo(p.getX(), p.getY());
            }
        }
        ink.pen.draw(path);
    }

    private void footprints(Ink ink, Camera camera, double width) {
        for (Path path : paths) {
            Point2D[] points = footprint(path, camera);
            if (points.length < 2) {
                continue;
            }
            Path2D.Double foot = new Path2D.Double();
            foot.moveTo(points[0].getX(), points[0].getY());
            for (int n = 1; n < points.length; n++) {
                foot.lineTo(points[n].getX(), points[n].getY());
            }
            if (goesOn(path)) {
                openHead(foot, points, 3.2 * width);
            }
            ink.colour(DARK, 0.85);
            ink.stroke(width + 1.4 * ink.unit);
            ink.pen.draw(foot);
            ink.colour(Destination.of(path.end()).colour());
            ink.stroke(width);
            ink.pen.draw(foot);
        }
        for (Path path : paths) {
            if (!path.points().isEmpty() && !goesOn(path)) {
                PathPoint end = path.points().get(path.points().size() - 1);
                Point2D p = at(camera, end.steadyTheta(), end.radius());
                Destination destination = Destination.of(path.end());
                ink.mark(destination.marker(p.getX(), p.getY(), 6.5 * width), destination.colour(), 1.2 * ink.unit);
            }
        }
    }

    /** Whether a path runs further round than its footprint is drawn. */
    private static boolean goesOn(Path path) {
        List<PathPoint> points = path.points();
        return !points.isEmpty()
                && points.stream()
                        .anyMatch(p -> Math.abs(p.steadyTheta() - points.get(0).steadyTheta()) > FULL);
    }

    /** The drawn points of a path; of one that runs round and round, those of its first time round. */
    static Point2D[] footprint(Path path, Camera camera) {
        List<Point2D> result = new ArrayList<>();
        List<PathPoint> points = path.points();
        for (int n = 0; n < points.size(); n++) {
            PathPoint b = points.get(n);
            PathPoint a = n == 0 ? b : points.get(n - 1);
            double turn = b.steadyTheta() - a.steadyTheta();
            int parts = Math.max(1, (int) Math.ceil(Math.abs(turn) / Math.toRadians(1)));
            for (int m = 1; m <= parts; m++) {
                double f = (double) m / parts;
                double theta = a.steadyTheta() + f * turn;
                if (Math.abs(theta - points.get(0).steadyTheta()) > FULL) {
                    return result.toArray(new Point2D[0]);
                }
                result.add(at(camera, theta, a.radius() + f * (b.radius() - a.radius())));
            }
        }
        return result.toArray(new Point2D[0]);
    }

    /** Adds an open arrowhead at the last of some points. */
    private static void openHead(Path2D.Double path, Point2D[] points, double size) {
        Point2D tip = points[points.length - 1];
        int back = points.length - 2;
        while (back > 0 && tip.distance(points[back]) < size) {
            back--;
        }
        double length = tip.distance(points[back]);
        if (length == 0) {
            return;
        }
        double dx = size * (tip.getX() - points[back].getX()) / length;
        double dy = size * (tip.getY() - points[back].getY()) / length;
        path.moveTo(tip.getX() - dx - 0.7 * dy, tip.getY() - dy + 0.7 * dx);
        path.lineTo(tip.getX(), tip.getY());
        path.lineTo(tip.getX() - dx + 0.7 * dy, tip.getY() - dy - 0.7 * dx);
    }

    private void sector(Ink ink, PlanLayout layout) {
        Rectangle window = layout.sectorWindow;
        String heading = grid.sectors() > 1
                ? "Enlarged: one of " + grid.sectors() + " equal sectors, isobars in bar(a)"
                : "Enlarged part of the ring, isobars in bar(a)";
        ink.write(
                ink.heading,
                ink.text,
                ink.fitted(ink.heading, heading, window.width),
                window.x,
                window.y - 7 * ink.unit,
                Ink.Side.LEFT);
        Shape before = ink.pen.getClip();
        ink.pen.clip(window);
        double half = Math.asin(Math.min(1, 0.75 * window.width / layout.sectorScale / (1e3 * grid.innerRadius())));
        int reach = Math.min(grid.sectors() / 2 + 1, 1 + spiralReach() + (int) Math.ceil(half / grid.pitch()));
        List<Runnable> labels = isobars(ink, layout, reach);
        outlines(ink, layout.sector, 1.25 * ink.unit, -reach, reach, true);
        footprints(ink, layout.sector, 2.2 * ink.unit);
        labels.forEach(Runnable::run);
        ink.pen.setClip(before);
        ink.colour(ink.line);
        ink.stroke(Math.max(1, ink.unit));
        ink.pen.draw(window);
        names(ink, layout);
        double rate = shape.flow().film().conditions().rotationRate();
        if (rate != 0) {
            // At the top of the ring +θ runs to the left, seen from the stator.
            boolean left = rate > 0 == (settings.seenFrom() == ViewingSide.STATOR);
            ink.write(
                    ink.small,
                    ink.faint,
                    left ? "← rotor turns" : "rotor turns →",
                    window.x + 8 * ink.unit,
                    window.y + 6 * ink.unit + ink.ascent(ink.small),
                    Ink.Side.LEFT);
        }
        scaleBarOver(ink, layout);
    }

    private void scaleBarOver(Ink ink, PlanLayout layout) {
        Rectangle window = layout.sectorWindow;
        scaleBar(
                ink,
                window.x + 10 * ink.unit,
                window.getMaxY() + ink.ascent(ink.small) + 13 * ink.unit,
                layout.sectorScale,
                0.16 * window.width);
    }

    /** How many sectors further a grid line leads between the two diameters. */
    private int spiralReach() {
        return (int) Math.ceil(Math.abs(grid.theta(0, grid.nj() - 1) - grid.theta(0, 0)) / grid.pitch());
    }

    /** Draws the isobars and returns what writes their values, to be run when all other lines are drawn. */
    private List<Runnable> isobars(Ink ink, PlanLayout layout, int reach) {
        List<Rectangle2D> taken = new ArrayList<>();
        List<Runnable> labels = new ArrayList<>();
        double[] one = shape.nodePressures();
        int rows = grid.nj();
        // Long cells are divided, so that the lines follow the circles.
        int fine = Math.max(1, (int) Math.ceil(grid.pitch() / grid.cellsTheta() / Math.toRadians(1.25)));
        int per = grid.cellsTheta() * fine;
        int columns = (2 * reach + 1) * per + 1;
        double[] x = new double[columns * rows];
        double[] y = new double[columns * rows];
        double[] values = new double[columns * rows];
        for (int c = 0; c < columns; c++) {
            int i = c % per / fine;
            double f = (double) (c % fine) / fine;
            double turn = (c / per - reach) * grid.pitch();
            for (int j = 0; j < rows; j++) {
                double theta = grid.theta(i, j) + f * (grid.theta(i + 1, j) - grid.theta(i, j));
                Point2D p = at(layout.sector, theta + turn, grid.radius(j));
                x[c * rows + j] = p.getX();
                y[c * rows + j] = p.getY();
                double a = one[grid.node(i, j)];
                values[c * rows + j] = (a + f * (one[grid.node(i + 1, j)] - a)) / 1e5;
            }
        }
        double step = Ticks.step((range.high() - range.low()) / 1e5, ISOBARS);
        for (double level : Ticks.between(range.low() / 1e5, range.high() / 1e5, ISOBARS)) {
            int colour = ColourScale.PRESSURE.colour((level * 1e5 - range.low()) / (range.high() - range.low()));
            boolean onDark = Colours.lightness(colour) < 58;
            int contrast = onDark ? 0xffffff : 0x14181c;
            for (double[] line : Isobars.lines(rows, x, y, values, level)) {
                Path2D.Double path = new Path2D.Double();
                path.moveTo(line[0], line[1]);
                for (int n = 2; n < line.length; n += 2) {
                    path.lineTo(line[n], line[n + 1]);
                }
                ink.colour(contrast, 0.75);
                ink.stroke(0.7 * ink.unit);
                ink.pen.draw(path);
                String words = Ticks.number(level, Ticks.decimals(step));
                labels.add(() -> label(ink, layout.sectorWindow, line, words, contrast, colour, taken));
            }
        }
        return labels;
    }

    /** Writes a value on a line where it is straight, inside the window and clear of other values; else not at all. */
    private static void label(
            Ink ink, Rectangle window, double[] line, String words, int colour, int edge, List<Rectangle2D> taken) {
        double wide = ink.width(ink.small, words);
        double tall = ink.height(ink.small);
        int points = line.length / 2;
        double best = Double.POSITIVE_INFINITY;
        double[] place = null;
        for (int n = 0; n < points; n++) {
            int a = n;
            int b = n;
            double px = line[2 * n];
            double py = line[2 * n + 1];
            double bend = 0;
            while (b + 1 < points && Math.hypot(line[2 * b] - px, line[2 * b + 1] - py) < 0.7 * wide) {
                b++;
            }
            while (a > 0 && Math.hypot(line[2 * a] - px, line[2 * a + 1] - py) < 0.7 * wide) {
                a--;
            }
            double length = Math.hypot(line[2 * b] - line[2 * a], line[2 * b + 1] - line[2 * a + 1]);
            if (length < 1.25 * wide) {
                continue;
            }
            for (int m = a; m <= b; m++) {
                double off = Math.abs((line[2 * m] - line[2 * a]) * (line[2 * b + 1] - line[2 * a + 1])
                                - (line[2 * m + 1] - line[2 * a + 1]) * (line[2 * b] - line[2 * a]))
                        / length;
                bend = Math.max(bend, off);
            }
            if (bend > 0.3 * tall) {
                continue;
            }
            double reachX = 0.5 * wide + 6 * ink.unit;
            Rectangle2D box = new Rectangle2D.Double(px - reachX, py - tall, 2 * reachX, 2 * tall);
            if (!window.contains(box) || taken.stream().anyMatch(box::intersects)) {
                continue;
            }
            double cost = bend + 0.02 * Math.abs(px - window.getCenterX());
            if (cost < best) {
                best = cost;
                double angle = Math.atan2(line[2 * b + 1] - line[2 * a + 1], line[2 * b] - line[2 * a]);
                if (Math.abs(angle) > Math.PI / 2) {
                    angle -= Math.signum(angle) * Math.PI;
                }
                place = new double[] {px, py, angle};
            }
        }
        if (place == null) {
            return;
        }
        taken.add(new Rectangle2D.Double(place[0] - wide, place[1] - tall, 2 * wide, 2 * tall));
        double drop = 0.36 * ink.small.getSize2D();
        ink.writeOver(
                ink.small,
                colour,
                edge,
                words,
                place[0] - drop * Math.sin(place[2]),
                place[1] + drop * Math.cos(place[2]),
                place[2],
                Ink.Side.MIDDLE);
    }

    /** The line that stands for something named, as a sample beside its name. */
    private enum Sample {
        NONE,
        GROOVE,
        FEED
    }

    private record Name(double wantedY, String words, String detail, Sample sample) {}

    /** Names of diameters and bands beside the enlarged sector, each with a leader to its place at the window's edge. */
    private void names(Ink ink, PlanLayout layout) {
        var conditions = shape.flow().film().conditions();
        List<Name> names = new ArrayList<>();
        add(
                names,
                layout,
                grid.outerRadius(),
                "outer diameter",
                Words.diameter(grid.outerRadius()) + ", " + conditions.outerSide(),
                Sample.NONE);
        for (FilmShape.Band band : shape.grooveBands()) {
            add(names, layout, 0.5 * (band.from() + band.to()), "grooves", between(band), Sample.GROOVE);
        }
        FilmShape.Band feed = shape.feed();
        if (feed != null) {
            String face = shape.flow().film().supply().orElseThrow().face() == org.whither.film.Face.STATOR
                    ? "feed, in the stator"
                    : "feed, in the rotor";
            add(names, layout, 0.5 * (feed.from() + feed.to()), face, between(feed), Sample.FEED);
        }
        for (FilmShape.Band band : shape.ungrooved()) {
            add(names, layout, besideFeed(band, feed), name(shape, band), between(band), Sample.NONE);
        }
        add(
                names,
                layout,
                grid.innerRadius(),
                "inner diameter",
                Words.diameter(grid.innerRadius()) + ", " + conditions.innerSide(),
                Sample.NONE);
        names.sort((a, b) -> Double.compare(a.wantedY(), b.wantedY()));
        double pitch = ink.height(ink.body) + ink.height(ink.small) + 3 * ink.unit;
        double[] y = spread(
                names.stream().mapToDouble(Name::wantedY).toArray(),
                pitch,
                layout.sectorWindow.y + 0.3 * pitch,
                layout.sectorWindow.getMaxY() - 0.2 * pitch);
        double room = layout.rightEdge - layout.namesLeft;
        double edge = layout.sectorWindow.getMaxX();
        for (int n = 0; n < y.length; n++) {
            Name name = names.get(n);
            ink.colour(ink.faint);
            ink.stroke(Math.max(1, ink.unit));
            double from = edge - 8 * ink.unit;
            Path2D.Double leader = new Path2D.Double();
            leader.moveTo(edge, name.wantedY());
            leader.lineTo(edge + 5 * ink.unit, name.wantedY());
            leader.lineTo(layout.namesLeft - 9 * ink.unit, y[n]);
            leader.lineTo(layout.namesLeft - 4 * ink.unit, y[n]);
            ink.pen.draw(leader);
            ink.mark(Destination.HELD.marker(from + 8 * ink.unit, name.wantedY(), 4 * ink.unit), ink.text, 1);
            ink.write(
                    ink.fitting(ink.body, name.words(), room),
                    ink.text,
                    name.words(),
                    layout.namesLeft,
                    y[n] + 0.25 * ink.body.getSize2D(),
                    Ink.Side.LEFT);
            sample(ink, name.sample(), layout.namesLeft + ink.width(ink.body, name.words()) + 9 * ink.unit, y[n]);
            ink.write(
                    ink.small,
                    ink.faint,
                    ink.fitted(ink.small, name.detail(), room),
                    layout.namesLeft,
                    y[n] + 0.25 * ink.body.getSize2D() + ink.height(ink.small),
                    Ink.Side.LEFT);
        }
    }

    /** A short piece of the line that stands for something, on the ground that it has in the enlarged view. */
    private static void sample(Ink ink, Sample sample, double x, double y) {
        double length = 24 * ink.unit;
        if (sample == Sample.NONE) {
            return;
        }
        ink.colour(ColourScale.PRESSURE.colour(0.6));
        ink.pen.fill(new Rectangle2D.Double(x, y - 5 * ink.unit, length, 10 * ink.unit));
        Line2D.Double line = new Line2D.Double(x + 3 * ink.unit, y, x + length - 3 * ink.unit, y);
        if (sample == Sample.GROOVE) {
            grooveLine(ink, line);
        } else {
            ink.colour(DARK, 0.85);
            ink.dashes(1.25 * ink.unit, 4 * ink.unit, 2.4 * ink.unit);
            ink.pen.draw(line);
        }
    }

    /** What a ring without grooves is called. */
    static String name(FilmShape shape, FilmShape.Band band) {
        return band.equals(shape.dam()) ? "dam, without grooves" : "land, without grooves";
    }

    private static double besideFeed(FilmShape.Band band, FilmShape.Band feed) {
        if (feed == null || feed.to() < band.from() || feed.from() > band.to()) {
            return 0.5 * (band.from() + band.to());
        }
        // Beside the feed, on the wider part.
        return feed.from() - band.from() > band.to() - feed.to()
                ? 0.5 * (band.from() + feed.from())
                : 0.5 * (feed.to() + band.to());
    }

    private static String between(FilmShape.Band band) {
        return "Ø " + Ticks.number(2e3 * band.from(), 1) + " – " + Ticks.number(2e3 * band.to(), 1) + " mm";
    }

    /** Finds where the circle of a radius meets the right edge of the enlarged view. */
    private static void add(
            List<Name> names, PlanLayout layout, double radius, String words, String detail, Sample sample) {
        Rectangle window = layout.sectorWindow;
        Point2D shaft = layout.sector.project(0, 0, 0);
        double across = window.getMaxX() - shaft.getX();
        double reach = 1e3 * radius * layout.sectorScale;
        double y = reach > across ? shaft.getY() - Math.sqrt(reach * reach - across * across) : window.getMaxY();
        y = Math.max(window.y + 2, Math.min(window.getMaxY() - 2, y));
        names.add(new Name(y, words, detail, sample));
    }

    /** Moves wanted places, in rising order, apart to a least distance, within two ends, as little as need be. */
    static double[] spread(double[] wanted, double pitch, double low, double high) {
        double[] y = wanted.clone();
        for (int round = 0; round < 200; round++) {
            for (int n = 0; n + 1 < y.length; n++) {
                double lack = pitch - (y[n + 1] - y[n]);
                if (lack > 0) {
                    y[n] -= 0.5 * lack;
                    y[n + 1] += 0.5 * lack;
                }
            }
            if (y.length > 0) {
                y[0] = Math.max(y[0], low);
                y[y.length - 1] = Math.min(y[y.length - 1], high);
            }
        }
        return y;
    }

    /**
     * Where a point of the feed lies in the unrolled view.
     *
     * @param layout the layout, with a feed
     * @param theta angle in the frame in which the film is steady (rad)
     * @param radius radius (m)
     */
    Point2D.Double unrolled(PlanLayout layout, double theta, double radius) {
        FilmShape.Band feed = shape.feed();
        Rectangle window = layout.feedWindow;
        double r = Math.max(grid.innerRadius(), Math.min(grid.outerRadius(), radius));
        int row = grid.row(r);
        double within = theta - grid.intoSector(theta, row, r) * grid.pitch();
        // The band of the sector is skewed where its borders follow a spiral: straightened about the feed's middle.
        double middle = 0.5 * (feed.from() + feed.to());
        double start = grid.lineTheta(0, grid.row(middle), middle);
        double turns = (within - start) / grid.pitch();
        double along = turns - Math.floor(turns);
        boolean mirrored = settings.seenFrom() == ViewingSide.ROTOR;
        // Up is outwards; seen from the stator +θ runs to the left at the top of the ring.
        double f = mirrored ? along : 1 - along;
        return new Point2D.Double(
                window.x + f * window.width, window.y + (feed.to() - radius) / feed.width() * window.height);
    }

    private void feed(Ink ink, PlanLayout layout) {
        Rectangle window = layout.feedWindow;
        FilmShape.Band feed = shape.feed();
        double along = grid.pitch() * 0.5 * (feed.from() + feed.to());
        double stretch = (window.height / feed.width()) / (window.width / along);
        String which = grid.sectors() > 1 ? "one sector" : "whole ring";
        String heading = "Where the gas of the feed goes (" + which + ", unrolled)";
        ink.writeIn(layout.rightEdge - window.x, ink.heading, ink.text, heading, window.x, window.y - 7 * ink.unit);
        ink.colour(ink.dark() ? 0x1d2329 : 0xeff0ee);
        ink.pen.fill(window);
        Shape before = ink.pen.getClip();
        double count = Math.max(1, fed.size());
        double size = Math.sqrt(0.62 * window.width * window.height / count);
        size = Math.max(4 * ink.unit, Math.min(11 * ink.unit, size));
        Area room = new Area(window);
        ink.pen.clip(room);
        for (FedPoint point : fed) {
            Destination destination = Destination.of(point.end());
            Point2D p =
                    unrolled(layout, point.release().theta(), point.release().radius());
            ink.mark(
                    destination.marker(p.getX(), p.getY(), size),
                    destination.colour(),
                    Math.min(0.9 * ink.unit, 0.08 * size));
        }
        ink.pen.setClip(before);
        ink.colour(ink.line);
        ink.pen.setStroke(new BasicStroke((float) Math.max(1, ink.unit)));
        ink.pen.draw(window);

        double x = layout.namesLeft - 14 * ink.unit;
        String upper = Words.diameter(feed.to());
        String lower = Words.diameter(feed.from());
        ink.write(ink.small, ink.text, upper, x, window.y + ink.ascent(ink.small), Ink.Side.LEFT);
        ink.write(
                ink.small,
                ink.faint,
                "towards the outer",
                x,
                window.y + ink.ascent(ink.small) + ink.height(ink.small),
                Ink.Side.LEFT);
        ink.write(ink.small, ink.text, lower, x, window.getMaxY(), Ink.Side.LEFT);
        ink.write(
                ink.small, ink.faint, "towards the inner", x, window.getMaxY() - ink.height(ink.small), Ink.Side.LEFT);
        double line = ink.height(ink.small);
        if (window.height > 6.4 * line) {
            double middle = 0.5 * (window.y + ink.ascent(ink.small) + window.getMaxY());
            double beside = layout.rightEdge - x;
            ink.writeIn(beside, ink.small, ink.text, "each point: same mass flow,", x, middle - 0.5 * line);
            ink.writeIn(beside, ink.small, ink.text, "so dense = much gas", x, middle + 0.5 * line);
        }
        String stretched = stretch >= 1
                ? "drawn " + Ticks.number(stretch, stretch < 10 ? 1 : 0) + " × too wide across the feed"
                : "drawn " + Ticks.number(1 / stretch, 1 / stretch < 10 ? 1 : 0) + " × too long along the feed";
        double length = Ticks.step(1e3 * along * 0.2, 1);
        String alongWords = Ticks.plain(length) + " mm along";
        double bar = length * window.width / (1e3 * along);
        double taken = 20 * ink.unit + Math.max(bar, 0.5 * (bar + ink.width(ink.small, alongWords)));
        ink.write(
                ink.small,
                ink.faint,
                ink.fitted(ink.small, stretched, window.width - taken),
                window.getMaxX(),
                window.getMaxY() + ink.height(ink.small),
                Ink.Side.RIGHT);
        ink.scaleBar(
                window.x + 10 * ink.unit, window.getMaxY() + ink.ascent(ink.small) + 13 * ink.unit, bar, alongWords);
    }

    private void legend(Ink ink, PlanLayout layout) {
        var conditions = shape.flow().film().conditions();
        Set<Destination> seen = EnumSet.noneOf(Destination.class);
        fed.forEach(point -> seen.add(Destination.of(point.end())));
        paths.forEach(path -> seen.add(Destination.of(path.end())));
        List<Destination> entries = new ArrayList<>();
        List<String> words = new ArrayList<>();
        for (Destination destination : Destination.values()) {
            if (destination != Destination.UNKNOWN || seen.contains(destination)) {
                entries.add(destination);
                words.add(destination.words(conditions));
            }
        }
        boolean goesOn = paths.stream().anyMatch(Plan::goesOn);
        if (goesOn) {
            words.add("open arrow: goes on round");
        }
        double size = 11 * ink.unit;
        double before = size + 6 * ink.unit;
        int perRow = (words.size() + 1) / 2;
        double x = layout.sectorWindow.x;
        double widest = 0;
        for (int n = 0; n < words.size(); n++) {
            // Column by column, two rows.
            if (n % 2 == 0 && n > 0) {
                x += before + widest + 22 * ink.unit;
                widest = 0;
            }
            double y = layout.legendBase + (n % 2) * 1.25 * ink.height(ink.small);
            double room = (layout.rightEdge - layout.sectorWindow.x) / perRow * 1.4;
            String text = ink.fitted(ink.small, words.get(n), room);
            if (n == entries.size()) {
                Path2D.Double arrow = new Path2D.Double();
                double middle = y - 0.36 * ink.small.getSize2D();
                Point2D[] shaft = {new Point2D.Double(x, middle), new Point2D.Double(x + size, middle)};
                arrow.moveTo(x, middle);
                arrow.lineTo(x + size, middle);
                openHead(arrow, shaft, 5 * ink.unit);
                ink.colour(ink.text);
                ink.stroke(1.5 * ink.unit);
                ink.pen.draw(arrow);
                ink.write(ink.small, ink.text, text, x + before, y, Ink.Side.LEFT);
                continue;
            }
            Destination destination = entries.get(n);
            ink.mark(
                    destination.marker(x + size / 2, y - 0.36 * ink.small.getSize2D(), size),
                    destination.colour(),
                    ink.unit);
            ink.write(ink.small, ink.text, text, x + before, y, Ink.Side.LEFT);
            widest = Math.max(widest, ink.width(ink.small, text));
        }
    }
}
