package org.whither.render;

import java.awt.Rectangle;
import java.awt.geom.Line2D;
import java.awt.geom.Path2D;
import java.awt.geom.Point2D;
import java.awt.geom.Rectangle2D;
import java.awt.image.BufferedImage;
import java.util.ArrayList;
import java.util.EnumSet;
import java.util.List;
import java.util.Optional;
import java.util.Set;
import org.whither.eddy.Zone;
import org.whither.film.Face;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Path;

/**
 * A look into the film, its thickness drawn too large by a factor that the picture states: the rotor with its grooves
 * below, a block of the stator above, the rest of it cut away, and paths as tubes coloured by speed. The eye is over the
 * bore and above, so that, as in a plan seen from the stator, the outer diameter is up and +θ runs to the left.
 */
public final class Gap {
    /**
     * Height of the eye above the plane of the faces (rad): a groove is drawn about as deep as it is wide, and from lower
     * down its floor is hidden by the land in front.
     */
    private static final double ELEVATION = Math.toRadians(54);

    /** The highest that the eye is put to see the floors of grooves that are drawn deeper than they are wide (rad). */
    private static final double HIGHEST = Math.toRadians(70);

    /** How far the eye is turned from the middle of the part shown towards the open end, to look into the grooves (rad). */
    private static final double ASIDE = Math.toRadians(6);

    private static final double FIELD_OF_VIEW = Math.toRadians(22);

    /** From beyond the outer diameter and from the left, so that walls and shadows fall towards the eye. */
    private static final Scene.Light LIGHT = Scene.Light.from(0.28, 0.26, 1.4);

    /** Share of the picture's width that a name may take. */
    private static final double NAME_SHARE = 0.3;

    /** A speed scale whose low end would lie below this share of its high end starts at 0. */
    private static final double FROM_ZERO = 0.3;

    /** Most markers on a path. */
    private static final int MARKERS = 12;

    private final GapScene gap;
    private final FilmShape shape;
    private final FilmGrid grid;
    private final PictureSettings settings;
    private final Viewpoint view;
    private final List<ShownPath> paths;
    private final PictureSettings.Range range;
    private final double fastest;
    private final double slowest;
    private final double every;

    private Gap(FilmFlow flow, List<Path> paths, GapSettings settings) {
        this.shape = new FilmShape(flow);
        this.grid = shape.grid();
        this.gap = new GapScene(shape, settings.exaggeration(), paths);
        this.settings = settings.picture();
        this.view = settings.camera().orElse(usualView(gap));
        this.paths = ShownPath.of(paths, gap);
        double[] speeds = ShownPath.speeds(this.paths, 0.005);
        this.slowest = speeds == null ? 0 : speeds[0];
        this.fastest = speeds == null ? 0 : speeds[2];
        this.range = this.settings
                .speedRange()
                .orElse(speeds == null ? new PictureSettings.Range(0, 1) : range(speeds[0], speeds[1]));
        this.every = interval(this.paths);
    }

    /** The narrowest range between round numbers that holds both speeds; from 0 where the lower one is not far from it. */
    static PictureSettings.Range range(double slowest, double high) {
        double low = slowest < FROM_ZERO * high ? 0 : slowest;
        double step = Ticks.step(Math.max(high - low, 0.05 * high), 8);
        if (!(step > 0)) {
            return new PictureSettings.Range(0, 1);
        }
        double first = step * Math.floor(low / step + 1e-9);
        double last = step * Math.ceil(high / step - 1e-9);
        return new PictureSettings.Range(first, last > first ? last : first + step);
    }

    /** A round time of which the longest shown path has as many as there may be markers (s). */
    private static double interval(List<ShownPath> paths) {
        double longest = paths.stream().mapToDouble(ShownPath::duration).max().orElse(0);
        return longest > 0 ? Ticks.step(longest, MARKERS - 1) : 1;
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
        return draw(flow, paths, List.of(), settings);
    }

    /**
     * As above, with zones of held gas.
     *
     * @param zones zones whose extents are drawn as boxes of dashed lines where the stator is cut away; may be empty
     */
    public static BufferedImage draw(FilmFlow flow, List<Path> paths, List<Zone> zones, GapSettings settings) {
        HeadlessGL.start();
        return new Gap(flow, List.copyOf(paths), settings).draw(List.copyOf(zones));
    }

    /** The view that a picture would have, for tests and for overlays. */
    static Camera camera(GapScene gap, PictureSettings settings) {
        return camera(gap, settings, usualView(gap));
    }

    /** From where a film is looked at from where nothing else is asked for. */
    private static Viewpoint usualView(GapScene gap) {
        double aside = gap.upstreamIsTo ? ASIDE : -ASIDE;
        return new Viewpoint(Math.PI + aside, gap.elevation(ELEVATION, HIGHEST), FIELD_OF_VIEW);
    }

    /**
     * From where a look into the film is taken.
     *
     * @param flow the film and its motion
     * @param paths the paths that would be drawn
     * @param settings what the picture is to be like
     */
    public static Viewpoint viewpoint(FilmFlow flow, List<Path> paths, GapSettings settings) {
        return settings.camera()
                .orElseGet(() -> usualView(new GapScene(new FilmShape(flow), settings.exaggeration(), paths)));
    }

    /** The range of speeds that a look into the film would show (m/s); empty where it shows no path. */
    public static Optional<PictureSettings.Range> speedRange(FilmFlow flow, List<Path> paths, GapSettings settings) {
        Gap gap = new Gap(flow, paths, settings);
        return gap.paths.isEmpty() ? Optional.empty() : Optional.of(gap.range);
    }

    static Camera camera(GapScene gap, PictureSettings settings, Viewpoint view) {
        Rectangle window = new Rectangle(0, 0, settings.width(), settings.height());
        BufferedImage blank = new BufferedImage(8, 8, BufferedImage.TYPE_INT_RGB);
        try (Ink ink = new Ink(blank, settings)) {
            double u = ink.unit;
            double names = ink.height(ink.heading) + ink.height(ink.small);
            Page page = page(ink, gap, settings);
            double top = page.top + names + 22 * u;
            // Under the front rim: what the rotor does, and the side of the bore; beside them the colour bar.
            double foot = Math.max(2 * names + 26 * u, barHeight(ink));
            double bottom = page.bottom - fullLegend(ink, page, gap).height() - foot;
            Rectangle2D room = new Rectangle2D.Double(74 * u, top, settings.width() - 128 * u, bottom - top);
            return view.fit(gap.extent(), window, room);
        }
    }

    private static Page page(Ink ink, GapScene gap, PictureSettings settings) {
        return new Page(ink, settings, Words.facts(gap.film()), exaggerationWords(gap));
    }

    /** How much room the colour bar takes with its words (pixels). */
    private static double barHeight(Ink ink) {
        return 30 * ink.unit + 1.2 * ink.height(ink.small) + 2 * ink.height(ink.heading);
    }

    /** A legend with everything that a look into the film may have to explain: the room that is kept for it. */
    private static Legend fullLegend(Ink ink, Page page, GapScene gap) {
        Set<Destination> all = EnumSet.of(Destination.INNER, Destination.OUTER);
        return legend(ink, page, gap, all, true, true, 1e-3);
    }

    private static Legend legend(
            Ink ink, Page page, GapScene gap, Set<Destination> seen, boolean ends, boolean goesOn, double every) {
        Legend legend = new Legend(ink, page.right - page.left);
        for (Destination destination : seen) {
            legend.add(destination, destination.words(gap.film().conditions()));
        }
        if (ends) {
            legend.addFilledHead("the path leaves the film");
        }
        if (goesOn) {
            legend.addOpenHead("it goes on outside the part shown");
        }
        if (ends || goesOn) {
            legend.add(
                    (x, y) -> {
                        Ink now = legend.ink();
                        now.mark(Destination.HELD.marker(x, y, 7 * now.unit), 0xf4f4f2, now.unit);
                    },
                    "one marker each " + time(every) + "; tubes not to size");
        }
        return legend.addLine(GapScene.STATOR, "edge of the cut-away stator");
    }

    private BufferedImage draw(List<Zone> zones) {
        Camera camera = camera(gap, settings, view);
        List<Scene.Item> items = new ArrayList<>(gap.rings());
        items.addAll(gap.paths(paths, range, every));
        Scene scene = new Scene(items, LIGHT);
        BufferedImage image;
        try (Canvas canvas = new Canvas(settings.width(), settings.height())) {
            image = canvas.draw(Ink.paper(settings), List.of(new Canvas.View(scene, camera)));
        }
        try (Ink ink = new Ink(image, settings)) {
            zones.forEach(zone -> box(ink, camera, zone));
            page(ink, zones);
            labels(ink, camera);
        }
        return image;
    }

    /** Draws how far a zone reaches along the radius and across the film, where the stator is cut away. */
    private void box(Ink ink, Camera camera, Zone zone) {
        boolean whole = zone.theta().length() >= 2 * Math.PI * (1 - 1e-9);
        int copies = whole ? 1 : zone.count();
        for (int copy = -copies; copy <= copies; copy++) {
            double turn = 2 * Math.PI * copy / copies;
            double from =
                    whole ? gap.openFrom : Math.max(gap.openFrom, zone.theta().low() + turn);
            double to = whole ? gap.openTo : Math.min(gap.openTo, zone.theta().high() + turn);
            if (from < to) {
                Path2D.Double lines = new Path2D.Double();
                for (double r : new double[] {zone.radius().low(), zone.radius().high()}) {
                    for (double sigma :
                            new double[] {zone.sigma().low(), zone.sigma().high()}) {
                        run(lines, camera, from, to, r, r, sigma, sigma);
                    }
                }
                for (double theta : new double[] {from, to}) {
                    for (int end = 0; end < 2; end++) {
                        double r =
                                end == 0 ? zone.radius().low() : zone.radius().high();
                        double sigma =
                                end == 0 ? zone.sigma().low() : zone.sigma().high();
                        run(
                                lines,
                                camera,
                                theta,
                                theta,
                                r,
                                r,
                                zone.sigma().low(),
                                zone.sigma().high());
                        run(
                                lines,
                                camera,
                                theta,
                                theta,
                                zone.radius().low(),
                                zone.radius().high(),
                                sigma,
                                sigma);
                    }
                }
                Meridian.zoneLine(ink, lines);
            }
            if (whole) {
                return;
            }
        }
    }

    /** Adds a line through the film, straight in angle, radius and part of the film thickness. */
    private void run(
            Path2D.Double lines,
            Camera camera,
            double theta0,
            double theta1,
            double r0,
            double r1,
            double sigma0,
            double sigma1) {
        int parts = 240;
        for (int n = 0; n <= parts; n++) {
            double f = (double) n / parts;
            double theta = ShownPath.mix(theta0, theta1, f);
            double r = ShownPath.mix(r0, r1, f);
            double z = ShownPath.mix(gap.rotorAt(theta, r), gap.statorAt(theta, r), ShownPath.mix(sigma0, sigma1, f));
            Point2D p = at(camera, theta, r, gap.height(z));
            if (n == 0) {
                lines.moveTo(p.getX(), p.getY());
            } else {
                lines.lineTo(p.getX(), p.getY());
            }
        }
    }

    private void page(Ink ink, List<Zone> zones) {
        double u = ink.unit;
        Page page = page(ink, gap, settings);
        page.write(ink);
        Set<Destination> seen = EnumSet.noneOf(Destination.class);
        paths.forEach(path -> seen.add(path.destination()));
        boolean ends = paths.stream().anyMatch(ShownPath::whole);
        boolean goesOn = paths.stream().anyMatch(path -> !path.whole());
        Legend legend = legend(ink, page, gap, seen, ends, goesOn, every);
        if (!zones.isEmpty()) {
            legend.add(
                    (x, y) -> Meridian.zoneLine(legend.ink(), new Line2D.Double(x - 8 * u, y, x + 8 * u, y)),
                    zones.size() == 1 ? "held gas (zone)" : "held gas (zones)");
        }
        double legendTop = page.bottom - legend.height();
        legend.draw(ink, page.left, legendTop);
        if (!paths.isEmpty()) {
            double length = 0.33 * settings.width();
            double y = legendTop - 12 * u - ink.ascent(ink.small) - 14 * u;
            ink.colourBar(
                    new Rectangle2D.Double(page.right - length, y, length, 12 * u),
                    ColourScale.SPEED,
                    range.low(),
                    range.high(),
                    slowest < range.low() - 1e-9,
                    fastest > range.high() + 1e-9,
                    "speed of the gas " + Words.frame(settings.speedFrame()) + ", m/s");
        }
    }

    private static String exaggerationWords(GapScene gap) {
        double factor = gap.exaggeration;
        if (factor == 1) {
            return "Drawn true to scale  ·  " + gap.part();
        }
        String number = Ticks.plain(factor);
        return "Lengths across the film are drawn " + number + " times " + (factor > 1 ? "too large" : "their size")
                + "  ·  " + gap.part();
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
        faceWords(ink, camera);
        ends(ink, camera);

        // The rotation arrow lies on the rotor's side, in front.
        double rate = conditions.rotationRate();
        double mid = 0.5 * (gap.bottom + gap.height(shape.rotorHigh()));
        if (rate != 0) {
            ink.arrow(rotationArrow(gap, camera, rate, 1e3 * inner, mid), 3 * u, 0xf6f3ee);
        }
        String rotor = rate == 0 ? "rotor stands still" : "rotor turns, " + Words.speed(rate);
        double x = at(camera, gap.middle, inner, gap.bottom).getX();
        String seen = "seen over the bore, stator above";
        double wide = 0.5 * Math.max(ink.width(ink.heading, rotor), ink.width(ink.small, seen)) + 8 * u;
        double y = below(camera, x - wide, x + wide) + 10 * u + ink.ascent(ink.heading);
        y = twoLines(ink, rotor, seen, x, y);
        twoLines(
                ink,
                conditions.innerSide() + " side",
                "inside, " + Words.bar(conditions.pressureInner()),
                x,
                y + 12 * u + ink.ascent(ink.heading));

        double statorTheta = gap.upstreamIsTo ? 0.5 * (gap.openTo + gap.to) : 0.5 * (gap.from + gap.openFrom);
        Point2D stator = at(camera, statorTheta, 0.5 * (inner + outer), gap.top);
        ink.write(
                ink.heading,
                0x14181c,
                "stator",
                stator.getX(),
                stator.getY() + 0.3 * ink.heading.getSize2D(),
                Ink.Side.MIDDLE);

        double downstream = gap.upstreamIsTo ? 1 : -1;
        String outside = "outside, " + Words.bar(conditions.pressureOuter());
        Point2D edge = at(camera, gap.middle, outer, gap.height(shape.rotorHigh()));
        double backX = edge.getX() + downstream * 0.2 * settings.width();
        overBack(ink, camera, backX, conditions.outerSide() + " side", outside);

        FilmShape.Band feed = shape.feed();
        if (feed != null) {
            boolean above = shape.flow().film().supply().orElseThrow().face() == Face.STATOR;
            double theta = gap.middle;
            double r = feed.to();
            Point2D p = at(camera, theta, r, gap.height(above ? gap.statorAt(theta, r) : gap.rotorAt(theta, r)));
            double wordsX = edge.getX() - downstream * 0.03 * settings.width();
            double base = overBack(
                    ink, camera, wordsX, "feed in the " + (above ? "stator" : "rotor"), "supply gas enters here");
            ink.colour(ink.faint);
            ink.stroke(Math.max(1, ink.unit));
            ink.line(wordsX, base + 4 * u, p.getX(), p.getY());
            ink.mark(Destination.HELD.marker(p.getX(), p.getY(), 5 * u), GapScene.FEED, u);
        }
        scales(ink, camera);
    }

    /** Names what the open rotor face shows. */
    private void faceWords(Ink ink, Camera camera) {
        List<Point2D> avoid = new ArrayList<>();
        for (ShownPath path : paths) {
            for (int n = 0; n < path.size(); n++) {
                double[] p = gap.place(path.theta(n), path.radius(n), path.z(n));
                avoid.add(camera.project(p[0], p[1], p[2]));
            }
        }
        FilmShape.Band feed = shape.feed();
        for (int n = 0; n <= 80; n++) {
            double theta = gap.openFrom + (gap.openTo - gap.openFrom) * n / 80;
            avoid.add(at(camera, theta, grid.innerRadius(), gap.height(gap.statorAt(theta, grid.innerRadius()))));
            avoid.add(at(camera, theta, grid.outerRadius(), gap.height(gap.statorAt(theta, grid.outerRadius()))));
            if (feed != null) {
                avoid.add(at(camera, theta, feed.from(), gap.height(gap.statorAt(theta, feed.from()))));
                avoid.add(at(camera, theta, feed.to(), gap.height(gap.statorAt(theta, feed.to()))));
            }
        }
        FaceWords places = new FaceWords(shape, gap, camera, avoid);
        for (FaceWords.Kind kind : FaceWords.Kind.values()) {
            double wide = ink.width(ink.body, kind.words());
            FaceWords.Place place = places.find(kind, wide, 0.9 * ink.body.getSize2D());
            if (place != null) {
                boolean groove = kind == FaceWords.Kind.GROOVE;
                double drop = 0.36 * ink.body.getSize2D();
                ink.writeOver(
                        ink.body,
                        groove ? 0xfff6e6 : 0x2a1d10,
                        groove ? 0x5c4630 : 0xdcb183,
                        kind.words(),
                        place.x() - drop * Math.sin(place.angle()),
                        place.y() + drop * Math.cos(place.angle()),
                        place.angle(),
                        Ink.Side.MIDDLE);
            }
        }
    }

    /** Marks at the paths' ends, as in the plan: where their gas goes. */
    private void ends(Ink ink, Camera camera) {
        double further = 9 * gap.tubeRadius();
        for (ShownPath path : paths) {
            double[][] end = gap.endOf(path, further);
            if (gap.hidden(end[0], camera.eye())) {
                continue;
            }
            Point2D p = camera.project(end[1][0], end[1][1], end[1][2]);
            ink.mark(
                    path.destination().marker(p.getX(), p.getY(), 11 * ink.unit),
                    path.destination().colour(),
                    1.2 * ink.unit);
        }
    }

    /** Writes two lines about a picture column and returns the second's baseline. */
    private double twoLines(Ink ink, String heading, String detail, double x, double y) {
        double room = NAME_SHARE * settings.width();
        ink.write(ink.heading, ink.text, ink.fitted(ink.heading, heading, room), x, y, Ink.Side.MIDDLE);
        double second = y + ink.height(ink.small);
        ink.write(ink.small, ink.faint, ink.fitted(ink.small, detail, room), x, second, Ink.Side.MIDDLE);
        return second;
    }

    /** Writes two lines over the far rim, clear of it, and returns the second's baseline. */
    private double overBack(Ink ink, Camera camera, double x, String heading, String detail) {
        double half = 0.5
                * Math.max(
                        ink.width(ink.heading, ink.fitted(ink.heading, heading, NAME_SHARE * settings.width())),
                        ink.width(ink.small, detail));
        double highest = settings.height();
        for (int n = 0; n <= 200; n++) {
            double theta = gap.from + (gap.to - gap.from) * n / 200;
            boolean open = theta >= gap.openFrom && theta <= gap.openTo;
            double r = grid.outerRadius();
            Point2D p = at(camera, theta, r, open ? gap.height(gap.statorAt(theta, r)) : gap.top);
            if (Math.abs(p.getX() - x) <= half + 6 * ink.unit) {
                highest = Math.min(highest, p.getY());
            }
        }
        return twoLines(ink, heading, detail, x, highest - 12 * ink.unit - ink.height(ink.small));
    }

    /** The lowest place of the drawn block between two picture columns (pixels from the top). */
    private double below(Camera camera, double left, double right) {
        double lowest = 0;
        for (int n = 0; n <= 200; n++) {
            Point2D p = at(camera, gap.from + (gap.to - gap.from) * n / 200, grid.innerRadius(), gap.bottom);
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

    /** Points along the rotation arrow, tail to tip, in the picture: on the rotor's inner side, in its sense of turning. */
    static Point2D[] rotationArrow(GapScene gap, Camera camera, double rate, double radius, double z) {
        double half = 0.12 * (gap.to - gap.from) * Math.signum(rate);
        Point2D[] points = new Point2D[41];
        for (int n = 0; n < points.length; n++) {
            double theta = gap.middle - half + 2 * half * n / (points.length - 1);
            points[n] = camera.project(radius * Math.cos(theta - gap.middle), radius * Math.sin(theta - gap.middle), z);
        }
        return points;
    }

    /** A scale along the lower front edge, and one across the film at the open end. */
    private void scales(Ink ink, Camera camera) {
        double u = ink.unit;
        double inner = grid.innerRadius();
        double outer = grid.outerRadius();
        // Along the front edge of the underside, from the open end inwards.
        double arc = 1e3 * inner * (gap.to - gap.from);
        double length = Ticks.step(0.16 * arc, 1);
        double way = gap.upstreamIsTo ? 1 : -1;
        double end = gap.upstreamIsTo ? gap.from : gap.to;
        double first = end + way * 0.02 * (gap.to - gap.from);
        double last = first + way * length / (1e3 * inner);
        double drop = 9 * u;
        Path2D.Double bar = new Path2D.Double();
        Point2D middle = null;
        double lowest = 0;
        for (int n = 0; n <= 24; n++) {
            Point2D p = at(camera, first + (last - first) * n / 24, inner, gap.bottom);
            double y = p.getY() + drop;
            lowest = Math.max(lowest, y);
            middle = n == 12 ? p : middle;
            if (n == 0 || n == 24) {
                bar.moveTo(p.getX(), y - 4 * u);
                bar.lineTo(p.getX(), y + 4 * u);
            }
            if (n == 0) {
                bar.moveTo(p.getX(), y);
            } else if (n == 24) {
                Point2D before = at(camera, first + (last - first) * 23 / 24, inner, gap.bottom);
                bar.moveTo(before.getX(), before.getY() + drop);
                bar.lineTo(p.getX(), y);
            } else {
                bar.lineTo(p.getX(), y);
            }
        }
        ink.colour(ink.text);
        ink.stroke(Math.max(1.2, 1.6 * u));
        ink.pen.draw(bar);
        ink.write(
                ink.small,
                ink.text,
                Ticks.plain(length) + " mm along the bore",
                middle.getX(),
                lowest + 6 * u + ink.ascent(ink.small),
                Ink.Side.MIDDLE);

        // Across the film, at the stator's end, where both faces are seen.
        end = gap.upstreamIsTo ? gap.to : gap.from;
        double base = gap.rotorAt(end, outer);
        double thick = gap.statorAt(end, outer) - base;
        double micrometres = Ticks.step(1e6 * thick, 1);
        micrometres = micrometres > 1e6 * thick * 1.05 ? Ticks.step(0.5e6 * thick, 1) : micrometres;
        Point2D a = at(camera, end, outer, gap.height(base));
        Point2D b = at(camera, end, outer, gap.height(base + 1e-6 * micrometres));
        Ink.Side side = gap.upstreamIsTo ? Ink.Side.RIGHT : Ink.Side.LEFT;
        double x = a.getX() - way * 10 * u;
        ink.colour(ink.text);
        ink.line(x, a.getY(), x, b.getY());
        ink.line(x - 4 * u, a.getY(), x + 4 * u, a.getY());
        ink.line(x - 4 * u, b.getY(), x + 4 * u, b.getY());
        String micro = Ticks.plain(micrometres) + " µm";
        double room = (gap.upstreamIsTo ? x : settings.width() - x) - 18 * u;
        double y = 0.5 * (a.getY() + b.getY());
        ink.write(ink.small, ink.text, ink.fitted(ink.small, micro, room), x - way * 7 * u, y, side);
        ink.write(
                ink.small,
                ink.faint,
                ink.fitted(ink.small, "across", room),
                x - way * 7 * u,
                y + ink.height(ink.small),
                side);
    }
}
