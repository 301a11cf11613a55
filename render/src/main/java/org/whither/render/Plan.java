package org.whither.render;

import java.awt.Rectangle;
import java.awt.Shape;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.EnumMap;
import java.util.EnumSet;
import java.util.LinkedHashMap;
import java.util.List;
import java.util.Map;
import java.util.Optional;
import java.util.Set;
import org.whither.eddy.AgeMap;
import org.whither.fate.DestinationMap;
import org.whither.fate.FedPoint;
import org.whither.film.Conditions;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/**
 * The face seen along the shaft, with the pressure, the film thickness, the speed, the age or the destination of the gas
 * in colour, and grooves, feed, zones of held gas and footprints of paths: the whole ring with one sector enlarged and its feed unrolled, or
 * the ring alone, or one sector unrolled.
 *
 * <p>Angles are those of the frame in which the film is steady; lengths are true to scale, of an unrolled sector at the
 * middle radius.
 */
public final class Plan {
    /** How far round a footprint is drawn at most: a longer one would run over its own beginning (rad). */
    private static final double FULL = Math.toRadians(330);

    /** Of lines over the pressure. */
    static final int DARK = 0x14181c;

    private final FilmShape shape;
    private final FilmGrid grid;
    private final PlanSettings plan;
    private final PictureSettings settings;
    private final PlanData data;
    private final List<Path> paths;
    private final PlanZones zones;
    private final FaceValues values;
    private final PictureSettings.Range found;
    private final PictureSettings.Range range;

    private Plan(FilmFlow flow, PlanData data, PlanSettings plan) {
        this.shape = new FilmShape(flow);
        this.grid = shape.grid();
        this.plan = plan;
        this.settings = plan.picture();
        this.data = data;
        this.paths = data.paths();
        this.zones = new PlanZones(data.zones(), grid);
        this.values = new FaceValues(shape, plan.quantity(), settings.speedFrame(), data.ages());
        this.found = values.range();
        this.range = plan.range().orElse(values.roundRange());
        if (plan.quantity() == Quantity.DESTINATION && data.destinations().isEmpty()) {
            throw new IllegalArgumentException("a plan of destinations without a map of them; expected one");
        }
    }

    /**
     * Draws a plan of the pressure: the ring and one sector enlarged.
     *
     * @param flow the film and its motion
     * @param fed points of the feed with the ends of their tracers; may be empty
     * @param paths paths whose footprints are drawn; may be empty
     * @param settings what the picture is to be like
     * @return the picture, opaque
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the size is beyond the memory
     */
    public static BufferedImage draw(FilmFlow flow, List<FedPoint> fed, List<Path> paths, PictureSettings settings) {
        return draw(flow, PlanData.of(fed, paths), PlanSettings.standard(settings));
    }

    /**
     * Draws a plan.
     *
     * @param flow the film and its motion
     * @param data what was computed of it
     * @param settings what the picture is to be like
     * @return the picture, opaque
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the size is beyond the memory, or what is to be shown is missing
     */
    public static BufferedImage draw(FilmFlow flow, PlanData data, PlanSettings settings) {
        HeadlessGL.start();
        return new Plan(flow, data, settings).draw();
    }

    /**
     * The range of a quantity that a plan would show without a wanted one (SI).
     *
     * @param ages needed for the age
     */
    public static PictureSettings.Range range(FilmFlow flow, Quantity quantity, Frame frame, Optional<AgeMap> ages) {
        return new FaceValues(new FilmShape(flow), quantity, frame, ages).roundRange();
    }

    /** The layout that a plan would have, for tests and for overlays. */
    static PlanLayout layout(FilmShape shape, PictureSettings settings, boolean withFeed, boolean withLegend) {
        return layout(shape, PlanSettings.standard(settings), withFeed, withLegend);
    }

    static PlanLayout layout(FilmShape shape, PlanSettings plan, boolean withFeed, boolean withLegend) {
        BufferedImage page = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        try (Ink ink = new Ink(page, plan.picture())) {
            return new PlanLayout(shape, plan, ink, withFeed, withLegend);
        }
    }

    private BufferedImage draw() {
        boolean withLegend =
                withFeed() || !paths.isEmpty() || !data.zones().isEmpty() || plan.quantity() == Quantity.DESTINATION;
        PlanLayout layout = layout(shape, plan, withFeed(), withLegend);
        BufferedImage image;
        try (Canvas canvas = new Canvas(settings.width(), settings.height())) {
            List<Canvas.View> views = new ArrayList<>();
            if (layout.ringWindow != null) {
                views.add(new Canvas.View(scene(layout.ringChart, 0, grid.sectors() - 1), layout.ring));
            }
            if (layout.sectorWindow != null) {
                int reach = reach(layout);
                Chart chart = layout.sectorChart;
                int first = chart.isUnrolled() ? -reach : 0;
                int last = chart.isUnrolled() ? reach : grid.sectors() - 1;
                views.add(new Canvas.View(scene(chart, first, last), layout.sector));
            }
            image = canvas.draw(Ink.paper(settings), views);
        }
        try (Ink ink = new Ink(image, settings)) {
            layout.page.write(ink);
            bar(ink, layout);
            if (layout.ringWindow != null) {
                ring(ink, layout);
            }
            if (layout.sectorWindow != null) {
                sector(ink, layout);
            }
            new PlanNames(shape).draw(ink, layout);
            if (layout.feedWindow != null) {
                new FeedStrip(shape, settings, data.fed()).draw(ink, layout);
            }
            if (withLegend) {
                Legend legend = new Legend(ink, layout.legendRoom());
                fill(legend, layout);
                legend.draw(ink, layout.legendLeft, layout.legendTop);
            }
        }
        return image;
    }

    private boolean withFeed() {
        return plan.part() == Part.BOTH && shape.feed() != null && !data.fed().isEmpty();
    }

    /** One mesh of a sector, placed as often as sectors are shown. */
    private Scene scene(Chart chart, int first, int last) {
        List<Scene.Item> items = new ArrayList<>();
        Map<Mesh, Scene.Material> meshes = new LinkedHashMap<>();
        if (plan.quantity() == Quantity.DESTINATION) {
            Map<org.whither.fate.Destination, MeshBuilder> built = new EnumMap<>(org.whither.fate.Destination.class);
            values.destinations(chart, data.destinations().orElseThrow(), built);
            built.forEach((destination, mesh) -> meshes.put(
                    mesh.build(),
                    Scene.Material.plain(Destination.of(destination).colour(), 1)));
        } else {
            meshes.put(
                    values.mesh(chart, range),
                    Scene.Material.scaled(plan.quantity().scale(), false));
        }
        for (int n = first; n <= last; n++) {
            int sector = n;
            meshes.forEach((mesh, material) -> items.add(chart.item(mesh, material, sector, grid.pitch())));
        }
        return new Scene(items, Scene.Light.from(0, 0, 1));
    }

    private void bar(Ink ink, PlanLayout layout) {
        if (plan.quantity() == Quantity.DESTINATION) {
            return;
        }
        double unit = plan.quantity().unit();
        double hair = 1e-6 * (range.high() - range.low());
        ink.colourBar(
                layout.pressureBar,
                plan.quantity().scale(),
                range.low() * unit,
                range.high() * unit,
                found.low() < range.low() - hair,
                found.high() > range.high() + hair,
                plan.quantity().caption(settings.speedFrame()));
    }

    private void ring(Ink ink, PlanLayout layout) {
        Rectangle window = layout.ringWindow;
        Shape before = ink.pen.getClip();
        ink.pen.clip(window);
        outlines(ink, layout.ringChart, Math.max(0.75, 0.95 * ink.unit), 0, grid.sectors() - 1, false);
        zones.draw(ink, layout.ringChart, window, false);
        footprints(ink, layout.ringChart, 1.5 * ink.unit);
        ink.pen.setClip(before);

        var conditions = shape.flow().film().conditions();
        double line = ink.height(ink.body);
        double x = window.x;
        double y = window.y + ink.ascent(ink.body);
        // The corner of the window that the ring leaves free.
        String outerSide =
                ink.first(ink.heading, 0.37 * window.width, conditions.outerSide() + " side", conditions.outerSide());
        ink.write(ink.heading, ink.text, outerSide, x, y, Ink.Side.LEFT);
        String outside = Words.bar(conditions.pressureOuter());
        outside = ink.first(ink.small, 0.27 * window.width, "outside, " + outside, outside);
        ink.write(ink.small, ink.faint, outside, x, y + line, Ink.Side.LEFT);

        double cx = window.getCenterX();
        double cy = window.getCenterY();
        double hole = 1e3 * grid.innerRadius() * layout.ringScale;
        double most = 1.5 * hole;
        String inner = ink.first(ink.heading, most, conditions.innerSide() + " side", conditions.innerSide());
        String inside = Words.bar(conditions.pressureInner());
        inside = ink.first(ink.small, most, "inside, " + inside, inside);
        ink.write(ink.heading, ink.text, inner, cx, cy + 0.42 * hole, Ink.Side.MIDDLE);
        ink.write(ink.small, ink.faint, inside, cx, cy + 0.42 * hole + line, Ink.Side.MIDDLE);

        double rate = conditions.rotationRate();
        double words = cy - 0.18 * hole;
        if (rate != 0) {
            ink.arrow(rotationArrow(layout.ring, rate, 0.74e3 * grid.innerRadius()), 2.4 * ink.unit, ink.text);
            ink.write(
                    ink.heading,
                    ink.text,
                    ink.first(ink.heading, most, "rotor turns, " + Words.speed(rate), Words.speed(rate)),
                    cx,
                    words,
                    Ink.Side.MIDDLE);
        } else {
            ink.write(ink.heading, ink.text, "rotor stands still", cx, words, Ink.Side.MIDDLE);
        }
        String seen = settings.seenFrom().words();
        List<String> lines = ink.lines(ink.small, seen, most, 2);
        for (int n = 0; n < lines.size(); n++) {
            ink.write(ink.small, ink.faint, lines.get(n), cx, words + (n + 1) * line, Ink.Side.MIDDLE);
        }

        scaleBar(ink, window.x, window.getMaxY() - 8 * ink.unit, layout.ringScale, 0.2 * window.width);
        // Where the enlarged view lies.
        if (layout.sectorWindow != null) {
            ink.colour(ink.text, 0.55);
            ink.stroke(Math.max(1, 1.1 * ink.unit));
            ink.pen.draw(sectorFrame(layout));
        }
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
    private void outlines(Ink ink, Chart chart, double width, int first, int last, boolean cased) {
        Path2D.Double grooves = new Path2D.Double();
        Path2D.Double ports = new Path2D.Double();
        for (int n = first; n <= last; n++) {
            chart.add(grooves, shape.grooveEdges(), n * grid.pitch());
            chart.add(ports, shape.feedEdges(), n * grid.pitch());
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
                ink.pen.draw(chart.circle(feed.from()));
                ink.pen.draw(chart.circle(feed.to()));
            }
        }
        ink.colour(ink.text);
        ink.stroke(1.4 * width);
        ink.pen.draw(chart.circle(grid.innerRadius()));
        ink.pen.draw(chart.circle(grid.outerRadius()));
    }

    /** Draws an edge of a groove in the enlarged view. */
    static void grooveLine(Ink ink, Shape line) {
        ink.colour(0xffffff, 0.95);
        ink.stroke(4.4 * ink.unit);
        ink.pen.draw(line);
        ink.colour(DARK);
        ink.stroke(1.8 * ink.unit);
        ink.pen.draw(line);
    }

    private void footprints(Ink ink, Chart chart, double width) {
        for (Path path : paths) {
            Point2D[] points = footprint(path, chart, chart.shift(path, grid));
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
            boolean onItsOwn = plan.quantity() == Quantity.DESTINATION;
            ink.colour(onItsOwn ? 0xffffff : Destination.of(path.end()).colour());
            ink.stroke(width);
            ink.pen.draw(foot);
        }
        for (Path path : paths) {
            if (!path.points().isEmpty() && !goesOn(path)) {
                PathPoint end = path.points().get(path.points().size() - 1);
                Point2D p = chart.at(end.steadyTheta() + chart.shift(path, grid), end.radius());
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
        return footprint(path, Chart.ring(camera), 0);
    }

    private static Point2D[] footprint(Path path, Chart chart, double shift) {
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
                result.add(chart.at(theta + shift, a.radius() + f * (b.radius() - a.radius())));
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
        Chart chart = layout.sectorChart;
        boolean isobars = plan.quantity() == Quantity.PRESSURE;
        String one = grid.sectors() > 1 ? "one of " + grid.sectors() + " equal sectors" : "part of the ring";
        String which = (chart.isUnrolled() ? "Unrolled: " : "Enlarged: ") + one;
        double headingRoom = chart.isUnrolled() ? 0.7 * window.width : window.width;
        String heading = isobars
                ? ink.first(ink.heading, headingRoom, which + ", isobars in bar(a)", which)
                : ink.first(ink.heading, headingRoom, which, one);
        ink.write(ink.heading, ink.text, heading, window.x, window.y - 7 * ink.unit, Ink.Side.LEFT);
        Shape before = ink.pen.getClip();
        ink.pen.clip(window);
        int reach = reach(layout);
        List<Runnable> labels = isobars ? IsobarLines.draw(ink, shape, chart, window, range, reach) : List.of();
        if (plan.quantity() == Quantity.DESTINATION) {
            pattern(ink, layout, reach);
        }
        outlines(ink, chart, 1.25 * ink.unit, -reach, reach, true);
        if (chart.isUnrolled()) {
            sectorBorders(ink, layout);
        }
        zones.draw(ink, chart, window, true);
        footprints(ink, chart, 2.2 * ink.unit);
        labels.forEach(Runnable::run);
        ink.pen.setClip(before);
        ink.colour(ink.line);
        ink.stroke(Math.max(1, ink.unit));
        ink.pen.draw(window);
        double rate = shape.flow().film().conditions().rotationRate();
        double wordsY = window.y + 6 * ink.unit + ink.ascent(ink.small);
        if (rate != 0) {
            // At the top of the ring +θ runs to the left, seen from the stator.
            boolean left = rate > 0 == (settings.seenFrom() == ViewingSide.STATOR);
            String words = left ? "← rotor turns" : "rotor turns →";
            if (chart.isUnrolled()) {
                ink.write(ink.heading, ink.text, words, window.getMaxX(), window.y - 7 * ink.unit, Ink.Side.RIGHT);
            } else {
                ink.write(ink.small, ink.text, words, window.x + 8 * ink.unit, wordsY, Ink.Side.LEFT);
            }
        }
        if (layout.ringWindow == null) {
            Conditions conditions = shape.flow().film().conditions();
            String seen = settings.seenFrom().words() + ", " + conditions.outerSide() + " side up";
            ink.write(
                    ink.small,
                    ink.faint,
                    ink.first(
                            ink.small,
                            0.6 * window.width,
                            seen,
                            settings.seenFrom().words()),
                    window.getMaxX(),
                    window.getMaxY() + ink.ascent(ink.small) + 6 * ink.unit,
                    Ink.Side.RIGHT);
        }
        scaleBar(
                ink,
                window.x + 10 * ink.unit,
                window.getMaxY() + ink.ascent(ink.small) + 13 * ink.unit,
                layout.sectorScale,
                0.16 * window.width);
    }

    /** The destinations' markers all over a view, so that they differ by more than colour. */
    private void pattern(Ink ink, PlanLayout layout, int reach) {
        DestinationMap map = data.destinations().orElseThrow();
        double apart = 26 * ink.unit;
        double size = 7 * ink.unit;
        double dr = 1e-3 * apart / layout.sectorScale;
        int rows = (int) Math.max(1, Math.rint((grid.outerRadius() - grid.innerRadius()) / dr));
        for (int row = 0; row < rows; row++) {
            double r = grid.innerRadius() + (row + 0.5) / rows * (grid.outerRadius() - grid.innerRadius());
            int count = (int) Math.max(1, Math.rint((2 * reach + 1) * grid.pitch() * r / dr));
            double start = layout.middle - (reach + 0.5) * grid.pitch();
            for (int n = 0; n < count; n++) {
                double theta = start + (n + (row % 2 == 0 ? 0.25 : 0.75)) / count * (2 * reach + 1) * grid.pitch();
                Destination destination = Destination.of(map.at(theta, r));
                Point2D p = layout.sectorChart.at(theta, r);
                ink.colour(DARK, 0.75);
                ink.stroke(1.1 * ink.unit);
                ink.pen.draw(destination.marker(p.getX(), p.getY(), size));
            }
        }
    }

    /** Fine lines where one unrolled sector begins and ends. */
    private void sectorBorders(Ink ink, PlanLayout layout) {
        ink.colour(DARK, 0.6);
        ink.dashes(ink.unit, 1.5 * ink.unit, 4 * ink.unit);
        for (int end = -1; end <= 1; end += 2) {
            Point2D a = layout.sectorChart.at(layout.middle + end * 0.5 * grid.pitch(), grid.innerRadius());
            Point2D b = layout.sectorChart.at(layout.middle + end * 0.5 * grid.pitch(), grid.outerRadius());
            ink.line(a.getX(), a.getY(), b.getX(), b.getY());
        }
    }

    /** How many sectors to either side a view reaches. */
    private int reach(PlanLayout layout) {
        Rectangle window = layout.sectorWindow;
        double wide = 0.75 * window.width / layout.sectorScale / (1e3 * grid.innerRadius());
        double half = layout.sectorChart.isUnrolled() ? wide : Math.asin(Math.min(1, wide));
        int most = layout.sectorChart.isUnrolled() ? Integer.MAX_VALUE : grid.sectors() / 2 + 1;
        return Math.min(most, 1 + spiralReach() + (int) Math.ceil(half / grid.pitch()));
    }

    /** How many sectors further a grid line leads between the two diameters. */
    private int spiralReach() {
        return (int) Math.ceil(Math.abs(grid.theta(0, grid.nj() - 1) - grid.theta(0, 0)) / grid.pitch());
    }

    /** What a ring without grooves is called. */
    static String name(FilmShape shape, FilmShape.Band band) {
        return PlanNames.name(shape, band);
    }

    private void fill(Legend legend, PlanLayout layout) {
        Conditions conditions = shape.flow().film().conditions();
        Set<Destination> seen = EnumSet.noneOf(Destination.class);
        if (withFeed()) {
            data.fed().forEach(point -> seen.add(Destination.of(point.end())));
        }
        paths.forEach(path -> seen.add(Destination.of(path.end())));
        boolean all = withFeed() || plan.quantity() == Quantity.DESTINATION;
        if (plan.quantity() == Quantity.DESTINATION) {
            DestinationMap map = data.destinations().orElseThrow();
            for (int p = 0; p < map.phases(); p++) {
                for (int q = 0; q < map.radii(); q++) {
                    seen.add(Destination.of(map.destination(p, q)));
                }
            }
        }
        for (Destination destination : Destination.values()) {
            if (seen.contains(destination) || all && destination != Destination.UNKNOWN) {
                legend.add(destination, destination.words(conditions));
            }
        }
        zones.legend(legend);
        if (paths.stream().anyMatch(Plan::goesOn)) {
            legend.add(
                    (x, y) -> {
                        Ink ink = legend.ink();
                        double u = ink.unit;
                        Path2D.Double arrow = new Path2D.Double();
                        arrow.moveTo(x - 7 * u, y);
                        arrow.lineTo(x + 5 * u, y);
                        openHead(
                                arrow,
                                new Point2D[] {new Point2D.Double(x - 7 * u, y), new Point2D.Double(x + 5 * u, y)},
                                5 * u);
                        ink.colour(ink.text);
                        ink.stroke(1.5 * u);
                        ink.pen.draw(arrow);
                    },
                    "goes on round");
        }
        if (layout.ringWindow == null && shape.feed() != null) {
            legend.add((x, y) -> {}, "lengths along are true at the middle radius");
        }
    }
}
