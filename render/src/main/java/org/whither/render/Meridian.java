package org.whither.render;

import java.awt.BasicStroke;
import java.awt.Rectangle;
import java.awt.Shape;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.List;
import java.util.OptionalDouble;
import org.whither.eddy.Place;
import org.whither.eddy.Zone;
import org.whither.film.Conditions;
import org.whither.film.Face;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * A section of the film in the (r, z) plane, at an angle or averaged round the ring, its thickness drawn too large: speed
 * in colour, stream lines, reversed flow hatched, zones of held gas outlined; the rotor below, the stator above, radius to
 * the right.
 *
 * <p>The lines of an average are those of its stream function: between two of them runs the same mass flow. At an angle
 * the flow has a part across the plane, so that there are no such lines; drawn are lines along its part in the plane.
 */
public final class Meridian {
    private static final int HATCH = 0x14181c;

    /** Most intervals between stream lines of an average. */
    private static final int TUBES = 24;

    private final FilmShape shape;
    private final FilmGrid grid;
    private final FilmFlow flow;
    private final PictureSettings settings;
    private final OptionalDouble angle;
    private final Section section;
    private final List<Zone> zones;
    private final PictureSettings.Range speeds;
    private final MeridianSettings wanted;

    private Meridian(FilmFlow flow, List<Zone> zones, MeridianSettings settings) {
        this.shape = new FilmShape(flow);
        this.grid = shape.grid();
        this.flow = flow;
        this.wanted = settings;
        this.settings = settings.picture();
        this.angle = settings.angle();
        this.section = new Section(shape, angle, this.settings.speedFrame());
        this.zones = zones;
        this.speeds = this.settings.speedRange().orElse(Gap.range(0, Math.max(1e-9, section.nearlyFastest())));
    }

    /**
     * Draws a section.
     *
     * @param flow the film and its motion
     * @param zones zones of held gas; may be empty
     * @param settings what the picture is to be like
     * @return the picture, opaque
     * @throws NoOpenGL where pictures cannot be drawn on this machine
     * @throws IllegalArgumentException where the size is beyond the memory
     */
    public static BufferedImage draw(FilmFlow flow, List<Zone> zones, MeridianSettings settings) {
        HeadlessGL.start();
        return new Meridian(flow, List.copyOf(zones), settings).draw();
    }

    /** The range of speeds that a section would show (m/s). */
    public static PictureSettings.Range speedRange(FilmFlow flow, MeridianSettings settings) {
        return new Meridian(flow, List.of(), settings).speeds;
    }

    /** How many times too large a section would draw lengths across the film. */
    public static double exaggeration(FilmFlow flow, MeridianSettings settings) {
        return layout(flow, settings).exaggeration;
    }

    /** Mass flow between two neighbouring stream lines of an average (kg/s), and the lines themselves, for tests. */
    static double tube(FilmFlow flow, MeridianSettings settings) {
        return new Meridian(flow, List.of(), settings).tube();
    }

    static List<double[]> contours(FilmFlow flow, MeridianSettings settings) {
        return new Meridian(flow, List.of(), settings).contours(layout(flow, settings));
    }

    /** The layout that a section would have, for tests. */
    static Layout layout(FilmFlow flow, MeridianSettings settings) {
        BufferedImage blank = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        try (Ink ink = new Ink(blank, settings.picture())) {
            return new Meridian(flow, List.of(), settings).new Layout(ink);
        }
    }

    /** Where things lie in the picture. */
    final class Layout {
        final Page page;
        final Legend legend;
        /** The section itself. */
        final Rectangle window;

        final Rectangle2D bar;
        final double exaggeration;
        /** Pixels for one mm along the radius, and for one m across the film. */
        final double scale;

        final double across;
        private final double low;
        private final double base;
        /** Extent of the two rings beyond the film (pixels). */
        final double ring;

        Layout(Ink ink) {
            double u = ink.unit;
            double span = 1e3 * (grid.outerRadius() - grid.innerRadius());
            double lowest = Double.POSITIVE_INFINITY;
            double highest = Double.NEGATIVE_INFINITY;
            for (int c = 0; c < section.stations(); c++) {
                lowest = Math.min(lowest, section.rotorZ(c));
                highest = Math.max(highest, section.statorZ(c));
            }
            double side = 70 * u + 24;
            // A first page only tells how high the words are; the exaggeration in them changes nothing.
            Page first = new Page(ink, settings, Words.facts(flow.film()), words(1000));
            double left = first.left + side;
            double width = first.right - side - left;
            scale = width / span;
            Legend signs = new Legend(ink, first.right - first.left);
            fill(signs, 0);
            double barHeight = 12 * u;
            double foot = signs.height() + 30 * u + 1.7 * ink.height(ink.small) + ink.height(ink.heading) + barHeight;
            double below = 2.4 * ink.height(ink.small) + 8 * u;
            double height = first.bottom - first.top - foot - below - ink.height(ink.heading);
            double film = 1e3 * (highest - lowest);
            ring = 0.13 * height;
            exaggeration = wanted.exaggeration().orElse(round(0.74 * height / scale / film));
            page = new Page(ink, settings, Words.facts(flow.film()), words(exaggeration));
            across = 1e3 * exaggeration * scale;
            low = lowest;
            double drawn = across * (highest - lowest);
            double top = page.top + ink.height(ink.heading) + Math.max(0, 0.5 * (height - drawn - 2 * ring));
            // What is taller than its room is cut at the upper edge; only a wanted exaggeration can make it so.
            base = Math.min(top + ring + drawn, page.top + ink.height(ink.heading) + height - ring);
            double upper = Math.max(page.top + ink.height(ink.heading), base - drawn - ring);
            window = new Rectangle((int) Math.round(left), (int) Math.round(upper), (int) Math.round(width), (int)
                    Math.round(base + ring - upper));
            legend = new Legend(ink, page.right - page.left);
            fill(legend, tube());
            double legendTop = page.bottom - legend.height();
            bar = new Rectangle2D.Double(
                    page.left + 8 * u,
                    legendTop - 14 * u - ink.ascent(ink.small) - barHeight,
                    0.6 * (page.right - page.left),
                    barHeight);
        }

        private double round(double most) {
            double power = Math.pow(10, Math.floor(Math.log10(most)));
            double best = power;
            for (double factor : new double[] {1.25, 1.5, 2, 2.5, 3, 4, 5, 6, 8}) {
                best = factor * power <= most ? factor * power : best;
            }
            return best;
        }

        /** Picture column of a radius (pixels). */
        double x(double r) {
            return window.x + 1e3 * (r - grid.innerRadius()) * scale;
        }

        /** Picture row of a height (pixels). */
        double y(double z) {
            return base - across * (z - low);
        }

        Point2D.Double at(double r, double sigma) {
            return new Point2D.Double(x(r), y(section.z(r, sigma)));
        }

        /** Radius at a picture column (m). */
        double radius(double x) {
            return grid.innerRadius() + 1e-3 * (x - window.x) / scale;
        }

        /** Share of the film thickness at a picture place. */
        double sigma(double r, double y) {
            double z = low + (base - y) / across;
            double from = section.z(r, 0);
            return (z - from) / (section.z(r, 1) - from);
        }
    }

    private String words(double exaggeration) {
        String where = angle.isPresent()
                ? "Section at θ = " + Ticks.number(Math.toDegrees(angle.getAsDouble()), 1)
                        + "° in the frame of the film"
                : "Section averaged round the ring: mean faces, mass-weighted velocities";
        return where
                + Ink.DOT
                + (exaggeration == 1
                        ? "true to scale"
                        : "lengths across the film are drawn " + Ticks.plain(exaggeration) + " times "
                                + (exaggeration > 1 ? "too large" : "their size"));
    }

    /** Mass flow between two neighbouring lines of an average (kg/s); 0 where there is none. */
    private double tube() {
        if (angle.isPresent()) {
            return 0;
        }
        double[] psi = streamFunction();
        double low = 0;
        double high = 0;
        for (double value : psi) {
            low = Math.min(low, value);
            high = Math.max(high, value);
        }
        return high - low > 1e-15 ? Ticks.step((high - low) * 3.6e6, TUBES) / 3.6e6 : 0;
    }

    private void fill(Legend legend, double tube) {
        legend.addLine(
                legend.ink().text,
                angle.isPresent()
                        ? "along the flow in this plane (the gas also crosses it)"
                        : tube > 0
                                ? "stream lines: " + Ticks.plain(Math.rint(tube * 3.6e9) / 1e3)
                                        + " g/h between two of them"
                                : "stream lines");
        legend.add(
                (x, y) -> {
                    Ink ink = legend.ink();
                    double u = ink.unit;
                    Rectangle2D patch = new Rectangle2D.Double(x - 8 * u, y - 6 * u, 16 * u, 12 * u);
                    ink.colour(ColourScale.SPEED.colour(0.6));
                    ink.pen.fill(patch);
                    Shape before = ink.pen.getClip();
                    ink.pen.clip(patch);
                    ink.colour(HATCH, 0.8);
                    ink.stroke(1.2 * u);
                    for (int n = -3; n <= 3; n++) {
                        ink.line(x + (n * 5 - 8) * u, y + 8 * u, x + (n * 5 + 8) * u, y - 8 * u);
                    }
                    ink.pen.setClip(before);
                },
                "runs against the net radial flow of its column");
        if (shape.feed() != null) {
            legend.addPatch(GapScene.FEED, "feed");
        }
        if (!zones.isEmpty()) {
            legend.add(
                    (x, y) -> {
                        Ink ink = legend.ink();
                        zoneLine(
                                ink,
                                new Rectangle2D.Double(
                                        x - 7 * ink.unit, y - 5 * ink.unit, 14 * ink.unit, 10 * ink.unit));
                    },
                    "zones of held gas");
        }
    }

    private BufferedImage draw() {
        BufferedImage blank = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        Layout layout;
        try (Ink ink = new Ink(blank, settings)) {
            layout = new Layout(ink);
        }
        BufferedImage image;
        try (Canvas canvas = new Canvas(settings.width(), settings.height())) {
            Camera camera = Camera.plan(
                    layout.window.width / 2.0, -layout.window.height / 2.0, 1, Math.PI / 2, false, layout.window);
            Scene scene = new Scene(items(layout), Scene.Light.from(0, 0, 1));
            image = canvas.draw(Ink.paper(settings), List.of(new Canvas.View(scene, camera)));
        }
        hatch(image, layout);
        try (Ink ink = new Ink(image, settings)) {
            layout.page.write(ink);
            Shape before = ink.pen.getClip();
            ink.pen.clip(layout.window);
            lines(ink, layout);
            outlineZones(ink, layout);
            faces(ink, layout);
            ink.pen.setClip(before);
            names(ink, layout);
            axes(ink, layout);
            ink.colourBar(
                    layout.bar,
                    ColourScale.SPEED,
                    speeds.low(),
                    speeds.high(),
                    speeds.low() > 0,
                    section.fastest() > speeds.high() + 1e-9,
                    "speed of the gas " + Words.frame(settings.speedFrame()) + ", m/s");
            layout.legend.draw(ink, layout.page.left, layout.page.bottom - layout.legend.height());
        }
        return image;
    }

    /** The film, the two rings and the feed; x to the right and y up from the upper left corner of the window (pixels). */
    private List<Scene.Item> items(Layout layout) {
        MeshBuilder film = new MeshBuilder();
        MeshBuilder rotor = new MeshBuilder();
        MeshBuilder stator = new MeshBuilder();
        MeshBuilder feed = new MeshBuilder();
        boolean fromStator =
                flow.film().supply().map(supply -> supply.face() == Face.STATOR).orElse(true);
        double span = speeds.high() - speeds.low();
        double bottom = layout.window.getMaxY();
        double top = layout.window.getMinY();
        for (int n = 0; n < section.pieces(); n++) {
            for (int c = section.start(n); c < section.start(n + 1); c++) {
                double x = layout.x(section.radius(c)) - layout.window.x;
                double low = layout.y(section.rotorZ(c));
                double high = layout.y(section.statorZ(c));
                boolean first = c == section.start(n);
                int at = -1;
                for (int k = 0; k <= Section.LEVELS; k++) {
                    double y = low + (high - low) * k / Section.LEVELS;
                    at = film.vertex(x, layout.window.y - y, 0, 0, 0, 1, (section.speed(c, k) - speeds.low()) / span);
                    if (k > 0 && !first) {
                        film.quad(at - Section.LEVELS - 2, at - 1, at, at - Section.LEVELS - 1);
                    }
                }
                strip(rotor, x, layout.window.y - low, layout.window.y - bottom, first);
                strip(stator, x, layout.window.y - high, layout.window.y - top, first);
                boolean fed = section.feeds(c) && !first && section.feeds(c - 1);
                double from = layout.window.y - (fromStator ? high : low);
                double depth = 0.8 * layout.ring;
                strip(feed, x, from, from + (fromStator ? depth : -depth), !fed);
            }
        }
        List<Scene.Item> items = new ArrayList<>();
        items.add(new Scene.Item(film.build(), Scene.Material.scaled(ColourScale.SPEED, false), 0));
        items.add(new Scene.Item(rotor.build(), Scene.Material.plain(GapScene.ROTOR, 1), 0));
        items.add(new Scene.Item(stator.build(), Scene.Material.plain(GapScene.STATOR, 1), 0));
        if (!feed.isEmpty()) {
            items.add(new Scene.Item(feed.build(), Scene.Material.plain(GapScene.FEED, 1), 0));
        }
        return items;
    }

    private static void strip(MeshBuilder mesh, double x, double a, double b, boolean first) {
        int at = mesh.vertex(x, a, 0, 0, 0, 1, 0);
        mesh.vertex(x, b, 0, 0, 0, 1, 0);
        if (!first) {
            mesh.quad(at - 2, at - 1, at + 1, at);
        }
    }

    /** Hatches the reversed flow, pixel by pixel. */
    private void hatch(BufferedImage image, Layout layout) {
        double u = Ink.unit(settings);
        double pitch = 7 * u;
        double wide = Math.max(1, 1.3 * u);
        for (int x = layout.window.x; x < layout.window.getMaxX(); x++) {
            double r = layout.radius(x + 0.5);
            if (r <= grid.innerRadius() || r >= grid.outerRadius()) {
                continue;
            }
            int from = (int) Math.max(layout.window.y, Math.floor(layout.y(section.z(r, 1))));
            int to = (int) Math.min(layout.window.getMaxY(), Math.ceil(layout.y(section.z(r, 0))));
            for (int y = from; y < to; y++) {
                double sigma = layout.sigma(r, y + 0.5);
                if (sigma <= 0 || sigma >= 1 || !section.reversed(r, sigma)) {
                    continue;
                }
                double along = (x + y) / Math.sqrt(2);
                boolean line = along - pitch * Math.floor(along / pitch) < wide;
                image.setRGB(x, y, ColourScale.mix(image.getRGB(x, y) & 0xffffff, HATCH, line ? 0.7 : 0.12));
            }
        }
    }

    /** Ψ at the two sides of each ring of nodes: the flow outwards below each level, of the whole ring (kg/s). */
    private double[] streamFunction() {
        int rows = Section.LEVELS + 1;
        double[] psi = new double[2 * grid.cellsRadial() * rows];
        for (int j = 0; j < grid.nj(); j++) {
            for (int k = 0; k < rows; k++) {
                double sum = 0;
                for (int i = 0; i < grid.cellsTheta(); i++) {
                    sum += flow.radialFlowBelow(i, j, (double) k / Section.LEVELS);
                }
                sum *= grid.sectors();
                if (j > 0) {
                    psi[(2 * j - 1) * rows + k] = sum;
                }
                if (j + 1 < grid.nj()) {
                    psi[2 * j * rows + k] = sum;
                }
            }
        }
        return psi;
    }

    private List<double[]> contours(Layout layout) {
        double step = tube();
        List<double[]> lines = new ArrayList<>();
        if (!(step > 0)) {
            return lines;
        }
        double[] psi = streamFunction();
        int rows = Section.LEVELS + 1;
        double[] x = new double[psi.length];
        double[] y = new double[psi.length];
        double low = 0;
        double high = 0;
        for (int n = 0; n < psi.length; n++) {
            int side = n / rows;
            int j = (side + 1) / 2;
            // A hair inside the row of cells whose side it is.
            double inside = side % 2 == 0 ? grid.radius(j + 1) : grid.radius(j - 1);
            double r = grid.radius(j) + 1e-9 * (inside - grid.radius(j));
            x[n] = layout.x(grid.radius(j));
            y[n] = layout.y(section.z(r, (double) (n % rows) / Section.LEVELS));
            low = Math.min(low, psi[n]);
            high = Math.max(high, psi[n]);
        }
        // Half-way between multiples: Ψ = 0 is the rotor face itself.
        for (double level = (Math.floor(low / step) + 0.5) * step; level < high; level += step) {
            lines.addAll(Isobars.lines(rows, x, y, psi, level));
        }
        return lines;
    }

    private List<double[]> flowLines(Layout layout, double apart) {
        double[] rates = new double[3];
        EvenLines.Direction direction = (at, way) -> {
            double r = layout.radius(at[0]);
            if (r <= grid.innerRadius() || r >= grid.outerRadius()) {
                return false;
            }
            double sigma = layout.sigma(r, at[1]);
            if (sigma <= 0.004 || sigma >= 0.996) {
                return false;
            }
            section.rates(r, sigma, rates);
            double dr = 1e-6 * (grid.outerRadius() - grid.innerRadius());
            // In the picture: along the radius, and up with the gas, which keeps its share of the film thickness.
            double slope = (section.z(r + dr, sigma) - section.z(r - dr, sigma)) / (2 * dr);
            if (Math.abs(slope) > 0.2) {
                slope = 0;
            }
            double vx = 1e3 * layout.scale * rates[1];
            double vy = -layout.across * (rates[2] * (section.z(r, 1) - section.z(r, 0)) + rates[1] * slope);
            double length = Math.hypot(vx, vy);
            way[0] = vx / length;
            way[1] = vy / length;
            return length > 0 && Double.isFinite(length);
        };
        List<double[]> seeds = new ArrayList<>();
        for (int a = 1; a < 10; a++) {
            double sigma = a % 2 == 1 ? 0.5 + 0.05 * (a - 1) : 0.5 - 0.05 * a;
            for (int b = 0; b < 120; b++) {
                double r = grid.innerRadius() + (b + 0.5) / 120 * (grid.outerRadius() - grid.innerRadius());
                Point2D p = layout.at(r, sigma);
                seeds.add(new double[] {p.getX(), p.getY()});
            }
        }
        for (int a = 1; a < 40; a++) {
            for (int b = 0; b < 200; b++) {
                double r = grid.innerRadius() + (b + 0.5) / 200 * (grid.outerRadius() - grid.innerRadius());
                Point2D p = layout.at(r, a / 40.0);
                seeds.add(new double[] {p.getX(), p.getY()});
            }
        }
        return new EvenLines(
                        direction, layout.window.x, layout.window.y, layout.window.width, layout.window.height, apart)
                .from(seeds);
    }

    private void lines(Ink ink, Layout layout) {
        double u = ink.unit;
        List<double[]> lines = angle.isPresent() ? flowLines(layout, 15 * u) : contours(layout);
        double next = 0;
        for (double[] line : lines) {
            Path2D.Double path = new Path2D.Double();
            double length = 0;
            path.moveTo(line[0], line[1]);
            for (int n = 2; n < line.length; n += 2) {
                path.lineTo(line[n], line[n + 1]);
                length += Math.hypot(line[n] - line[n - 2], line[n + 1] - line[n - 1]);
            }
            ink.colour(0xffffff, 0.35);
            ink.stroke(2.6 * u);
            ink.pen.draw(path);
            ink.colour(HATCH, 0.9);
            ink.stroke(1.1 * u);
            ink.pen.draw(path);
            // Arrowheads a good way apart, at changing places.
            double every = 190 * u;
            double at = (0.25 + 0.5 * next) * Math.min(length, every);
            next = (next + 0.382) % 1;
            double walked = 0;
            for (int n = 2; n < line.length && length > 26 * u; n += 2) {
                walked += Math.hypot(line[n] - line[n - 2], line[n + 1] - line[n - 1]);
                if (walked >= at) {
                    head(ink, layout, line, n);
                    at += every;
                }
            }
        }
    }

    private void head(Ink ink, Layout layout, double[] line, int n) {
        double size = 4.6 * ink.unit;
        int a = n;
        while (a > 0 && Math.hypot(line[n] - line[a], line[n + 1] - line[a + 1]) < size) {
            a -= 2;
        }
        double dx = line[n] - line[a];
        double dy = line[n + 1] - line[a + 1];
        double length = Math.hypot(dx, dy);
        if (length == 0 || Math.abs(dx) < 0.2 * length) {
            return;
        }
        double r = layout.radius(line[n]);
        double out = section.outwards(r, layout.sigma(r, line[n + 1]));
        double sign = out * dx > 0 ? 1 : -1;
        dx *= sign / length;
        dy *= sign / length;
        Path2D.Double head = new Path2D.Double();
        head.moveTo(line[n] + size * dx, line[n + 1] + size * dy);
        head.lineTo(line[n] - 0.75 * size * (dx - dy), line[n + 1] - 0.75 * size * (dy + dx));
        head.lineTo(line[n] - 0.75 * size * (dx + dy), line[n + 1] - 0.75 * size * (dy - dx));
        head.closePath();
        ink.colour(HATCH);
        ink.pen.fill(head);
    }

    static void zoneLine(Ink ink, Shape shape) {
        ink.colour(0xffffff);
        ink.stroke(3.4 * ink.unit);
        ink.pen.draw(shape);
        ink.colour(0x000000);
        ink.pen.setStroke(new BasicStroke(
                (float) (1.8 * ink.unit),
                BasicStroke.CAP_BUTT,
                BasicStroke.JOIN_ROUND,
                10,
                new float[] {(float) (7 * ink.unit), (float) (3 * ink.unit)},
                0));
        ink.pen.draw(shape);
    }

    private void outlineZones(Ink ink, Layout layout) {
        for (int n = 0; n < zones.size(); n++) {
            Zone zone = zones.get(n);
            if (angle.isPresent() && !reaches(zone, angle.getAsDouble())) {
                continue;
            }
            double[] outline = outline(zone);
            Path2D.Double path = new Path2D.Double();
            int corners = outline.length / 2;
            for (int c = 0; c <= corners; c++) {
                int b = c % corners;
                int a = Math.max(0, c - 1);
                for (int m = c == 0 ? 12 : 1; m <= 12; m++) {
                    double f = m / 12.0;
                    double r = ShownPath.mix(outline[2 * a], outline[2 * b], f);
                    double sigma = ShownPath.mix(outline[2 * a + 1], outline[2 * b + 1], f);
                    Point2D p = layout.at(r, sigma);
                    if (c == 0) {
                        path.moveTo(p.getX(), p.getY());
                    } else {
                        path.lineTo(p.getX(), p.getY());
                    }
                }
            }
            zoneLine(ink, path);
            Point2D middle = layout.at(zone.centre().radius(), zone.centre().sigma());
            ink.writeOver(
                    ink.heading,
                    0x000000,
                    0xffffff,
                    Integer.toString(n + 1),
                    middle.getX(),
                    middle.getY() + 0.36 * ink.heading.getSize2D(),
                    0,
                    Ink.Side.MIDDLE);
        }
    }

    private boolean reaches(Zone zone, double theta) {
        double turns = Math.ceil((zone.theta().low() - theta) / grid.pitch() - 1e-9);
        return theta + turns * grid.pitch() <= zone.theta().high() + 1e-9;
    }

    /** Corners of a zone in the plane, (r, σ) in turn: the convex hull of its gas, else the box round it. */
    static double[] outline(Zone zone) {
        if (zone.points().size() < 3) {
            double a = zone.radius().low();
            double b = zone.radius().high();
            double c = zone.sigma().low();
            double d = zone.sigma().high();
            return new double[] {a, c, b, c, b, d, a, d};
        }
        return hull(zone.points());
    }

    /** The convex hull of some places in the plane: its corners in turn, r and σ of each. */
    static double[] hull(List<Place> places) {
        List<double[]> points = new ArrayList<>();
        for (Place place : places) {
            points.add(new double[] {place.radius(), place.sigma()});
        }
        points.sort((p, q) -> p[0] != q[0] ? Double.compare(p[0], q[0]) : Double.compare(p[1], q[1]));
        // The monotone chain of A. M. Andrew, Information Processing Letters 9(5), 1979.
        List<double[]> hull = new ArrayList<>();
        for (int way = 0; way < 2; way++) {
            int start = hull.size();
            for (int m = 0; m < points.size(); m++) {
                double[] p = points.get(way == 0 ? m : points.size() - 1 - m);
                while (hull.size() >= start + 2 && turn(hull.get(hull.size() - 2), hull.get(hull.size() - 1), p) <= 0) {
                    hull.remove(hull.size() - 1);
                }
                hull.add(p);
            }
            hull.remove(hull.size() - 1);
        }
        double[] corners = new double[2 * hull.size()];
        for (int m = 0; m < hull.size(); m++) {
            corners[2 * m] = hull.get(m)[0];
            corners[2 * m + 1] = hull.get(m)[1];
        }
        return corners;
    }

    private static double turn(double[] a, double[] b, double[] c) {
        return (b[0] - a[0]) * (c[1] - a[1]) - (b[1] - a[1]) * (c[0] - a[0]);
    }

    /** Crisp lines along the two faces. */
    private void faces(Ink ink, Layout layout) {
        ink.colour(HATCH);
        ink.stroke(1.3 * ink.unit);
        for (boolean stator : new boolean[] {false, true}) {
            Path2D.Double path = new Path2D.Double();
            for (int c = 0; c < section.stations(); c++) {
                double x = layout.x(section.radius(c));
                double y = layout.y(stator ? section.statorZ(c) : section.rotorZ(c));
                if (c == 0) {
                    path.moveTo(x, y);
                } else {
                    path.lineTo(x, y);
                }
            }
            ink.pen.draw(path);
        }
    }

    private void names(Ink ink, Layout layout) {
        double u = ink.unit;
        Conditions conditions = flow.film().conditions();
        Rectangle window = layout.window;
        double y = window.y - 7 * u;
        double half = 0.46 * (layout.page.right - layout.page.left);
        ink.write(
                ink.heading,
                ink.text,
                ink.first(
                        ink.heading,
                        half,
                        "← " + conditions.innerSide() + " side, " + Words.bar(conditions.pressureInner()),
                        "← " + conditions.innerSide() + " side",
                        "← " + conditions.innerSide()),
                window.x,
                y,
                Ink.Side.LEFT);
        ink.write(
                ink.heading,
                ink.text,
                ink.first(
                        ink.heading,
                        half,
                        conditions.outerSide() + " side, " + Words.bar(conditions.pressureOuter()) + " →",
                        conditions.outerSide() + " side →",
                        conditions.outerSide() + " →"),
                window.getMaxX(),
                y,
                Ink.Side.RIGHT);
        // Names on the rings, where they are high enough.
        if (layout.ring > 1.2 * ink.height(ink.body)) {
            double mid = 0.5 * (window.getMinX() + window.getMaxX());
            double rate = conditions.rotationRate();
            String turns = rate == 0
                    ? "rotor, stands still"
                    : "rotor, turns " + (rate > 0 ? "away from" : "towards") + " the viewer, " + Words.speed(rate);
            ink.writeOver(
                    ink.body,
                    0x1c2126,
                    0xd9bd9b,
                    ink.first(ink.body, 0.8 * window.width, turns, "rotor"),
                    mid,
                    window.getMaxY() - 0.3 * layout.ring,
                    0,
                    Ink.Side.MIDDLE);
            FilmShape.Band feed = shape.feed();
            double clear = feed == null ? mid : layout.x(feed.to()) + 12 * u;
            boolean right = feed == null || window.getMaxX() - clear > 0.3 * window.width;
            ink.writeOver(
                    ink.body,
                    0x1c2126,
                    0xc3cad2,
                    "stator",
                    feed == null ? mid : right ? clear + 20 * u : layout.x(feed.from()) - 20 * u,
                    window.y + 0.3 * layout.ring + ink.ascent(ink.body),
                    0,
                    feed == null ? Ink.Side.MIDDLE : right ? Ink.Side.LEFT : Ink.Side.RIGHT);
        }
    }

    /** The radius along the foot, the bands of the face under it, and a length across the film beside it. */
    private void axes(Ink ink, Layout layout) {
        double u = ink.unit;
        Rectangle window = layout.window;
        double foot = window.getMaxY();
        ink.colour(ink.text);
        ink.stroke(Math.max(1, 1.2 * u));
        ink.line(window.x, foot, window.getMaxX(), foot);
        int most = Math.max(2, (int) (window.width / (6 * ink.small.getSize2D())));
        double inner = 1e3 * grid.innerRadius();
        double outer = 1e3 * grid.outerRadius();
        int decimals = Ticks.decimals(Ticks.step(outer - inner, most));
        double labels = foot + 5 * u + ink.ascent(ink.small);
        for (double tick : Ticks.between(inner, outer, most)) {
            double x = layout.x(1e-3 * tick);
            ink.colour(ink.text);
            ink.line(x, foot, x, foot + 4 * u);
            ink.write(ink.small, ink.text, Ticks.number(tick, decimals), x, labels + 1, Ink.Side.MIDDLE);
        }
        ink.write(ink.small, ink.faint, "radius, mm", window.x - 12 * u, labels + 1, Ink.Side.RIGHT);
        double y = labels + 7 * u;
        double words = y + 5 * u + ink.ascent(ink.small);
        for (FilmShape.Band band : shape.grooveBands()) {
            band(ink, layout, band, "grooves", y, words);
        }
        for (FilmShape.Band band : shape.ungrooved()) {
            band(ink, layout, band, band.equals(shape.dam()) ? "dam" : "land", y, words);
        }
        // Across the film, at the right end.
        double thick = section.statorZ(section.stations() - 1) - section.rotorZ(section.stations() - 1);
        double micrometres = Ticks.step(1e6 * thick, 1);
        micrometres = micrometres > 1e6 * thick * 1.01 ? Ticks.step(0.5e6 * thick, 1) : micrometres;
        double z = section.rotorZ(section.stations() - 1);
        double x = window.getMaxX() + 12 * u;
        double a = layout.y(z);
        double b = layout.y(z + 1e-6 * micrometres);
        ink.colour(ink.text);
        ink.stroke(Math.max(1.2, 1.5 * u));
        ink.line(x, a, x, b);
        ink.line(x - 4 * u, a, x + 4 * u, a);
        ink.line(x - 4 * u, b, x + 4 * u, b);
        ink.write(
                ink.small,
                ink.text,
                Ticks.plain(micrometres) + " µm",
                x + 8 * u,
                0.5 * (a + b) + 0.36 * ink.small.getSize2D(),
                Ink.Side.LEFT);
    }

    private static void band(Ink ink, Layout layout, FilmShape.Band band, String name, double y, double base) {
        double u = ink.unit;
        double a = layout.x(band.from()) + 2 * u;
        double b = layout.x(band.to()) - 2 * u;
        ink.colour(ink.faint);
        ink.stroke(Math.max(1, u));
        ink.line(a, y, b, y);
        ink.line(a, y - 3 * u, a, y);
        ink.line(b, y - 3 * u, b, y);
        if (ink.width(ink.small, name) < b - a) {
            ink.write(ink.small, ink.text, name, 0.5 * (a + b), base + 2, Ink.Side.MIDDLE);
        }
    }
}
