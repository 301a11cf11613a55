package org.whither.render;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.whither.film.Face;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/**
 * The film between two angles as a scene: the rotor below with its groove floors and walls, a part of the stator above
 * with the feed in it, paths between.
 *
 * <p>Coordinates in mm: x and y in the plane of the faces, x outwards at the middle of the part shown; z along the shaft,
 * measured from the highest point of the rotor face and drawn too large by the exaggeration. A direction at a point is
 * that of the motion there, (v_r, v_θ, v_z), carried into the drawing by the same stretch as the points. Normals for the
 * light are those of the drawn shape: light tells of the drawing, not of true slopes.
 */
final class GapScene {
    static final int ROTOR = 0xb9946c;
    private static final int ROTOR_CUT = 0x836a50;
    private static final int GROOVE_EDGE = 0x3d2c1c;
    static final int STATOR = 0x7f8b98;
    private static final int STATOR_CUT = 0x97a2ae;
    /** The feed: the reddish purple of Okabe and Ito, which no scale and no destination has. */
    static final int FEED = 0xcc79a7;

    /** How much of the ring is shown (rad): enough to follow a path along several grooves. */
    private static final double WISH = Math.toRadians(90);

    /** Share of the part shown over which the stator is left standing. */
    private static final double STANDING = 0.17;

    /** How open the stator face is to the sky, from 0 to 1. */
    private static final double UNDER = 0.7;

    private final FilmShape shape;
    /** Whether a part of the ring is shown, near enough for fine shades. */
    private final boolean part;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final Sky sky;
    final double exaggeration;
    /** First and last angle of the part shown (rad). */
    final double from;

    final double to;
    /** First and last angle of the open part, over which the stator is cut away (rad). */
    final double openFrom;

    final double openTo;
    /** Whether the gas comes from the end at {@link #to}, where the stator is left standing. */
    final boolean upstreamIsTo;
    /** Angle that points along x (rad). */
    final double middle;
    /** Height of the origin of z (m). */
    final double datum;
    /** Lowest and highest drawn z, faces of the two rings turned away from the film (mm). */
    final double bottom;

    final double top;
    /** Highest point of the stator face (m). */
    private final double statorHigh;

    private final double notch;

    GapScene(FilmShape shape, double exaggeration) {
        this(shape, exaggeration, List.of());
    }

    /**
     * A part of the ring.
     *
     * @param shape the film's shape
     * @param exaggeration factor on lengths across the film
     * @param paths the paths to be shown: they tell which end is upstream and, where a sector is longer than the part
     *     shown, which part is worth showing
     */
    GapScene(FilmShape shape, double exaggeration, List<Path> paths) {
        this.shape = shape;
        this.part = true;
        this.flow = shape.flow();
        this.grid = shape.grid();
        this.exaggeration = exaggeration;
        double span = grid.outerRadius() - grid.innerRadius();
        double mean = 0.5 * (grid.outerRadius() + grid.innerRadius());
        double pitch = grid.pitch();
        // Of a narrow face more of the ring, so that the picture does not grow flat and paths have room.
        double wish = Math.min(Math.toRadians(120), WISH * Math.max(1, 0.26 / (span / mean)));
        double whole = Math.max(1, Math.rint(wish / pitch)) * pitch;
        boolean cut = whole > 1.4 * wish;
        double width = cut ? wish : whole;
        this.upstreamIsTo = upstreamIsTo(paths);
        double start;
        if (cut && !paths.isEmpty() && !paths.get(0).points().isEmpty()) {
            double first = paths.get(0).points().get(0).steadyTheta();
            start = upstreamIsTo ? first - (1 - STANDING) * width + 0.01 : first - STANDING * width - 0.01;
        } else {
            start = landMiddle();
        }
        this.middle = start + 0.5 * width;
        this.from = start;
        this.to = start + width;
        this.openFrom = upstreamIsTo ? from : from + STANDING * width;
        this.openTo = upstreamIsTo ? to - STANDING * width : to;
        this.datum = shape.rotorHigh();
        this.statorHigh = statorHigh();
        double face = 1e3 * span;
        this.bottom = Math.min(height(shape.rotorLow()) - 0.16 * face, -0.36 * face);
        this.notch = 0.14 * face;
        this.top = height(statorHigh) + 0.22 * face;
        this.sky = new Sky(shape, this);
    }

    private GapScene(FilmShape shape, double exaggeration, double standFrom, double standTo) {
        this.shape = shape;
        this.part = false;
        this.flow = shape.flow();
        this.grid = shape.grid();
        this.exaggeration = exaggeration;
        this.upstreamIsTo = true;
        this.middle = 0;
        this.to = standTo;
        this.from = standTo - 2 * Math.PI;
        this.openFrom = from;
        this.openTo = standFrom;
        this.datum = shape.rotorHigh();
        this.statorHigh = statorHigh();
        double face = 1e3 * (grid.outerRadius() - grid.innerRadius());
        this.bottom = Math.min(height(shape.rotorLow()) - 0.16 * face, -0.36 * face);
        this.notch = 0.14 * face;
        this.top = height(statorHigh) + 0.22 * face;
        this.sky = new Sky(shape, this);
    }

    /**
     * The whole ring, x along θ = 0.
     *
     * @param shape the film's shape
     * @param exaggeration factor on lengths across the film
     * @param standFrom first angle over which the stator is left standing (rad)
     * @param standTo last such angle, at most 2π on (rad)
     */
    static GapScene ring(FilmShape shape, double exaggeration, double standFrom, double standTo) {
        return new GapScene(shape, exaggeration, standFrom, standTo);
    }

    private double statorHigh() {
        double high = Double.NEGATIVE_INFINITY;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int c = 0; c < 4; c++) {
                    high = Math.max(high, statorZ(i, j, shape.cornerTheta(i, j, c), shape.cornerRadius(j, c)));
                }
            }
        }
        return high;
    }

    /** Whether most paths run towards falling angles; where there are none, whether the gas lags behind a rotor that turns so. */
    private boolean upstreamIsTo(List<Path> paths) {
        double sum = 0;
        for (Path path : paths) {
            List<PathPoint> points = path.points();
            if (points.size() > 1) {
                sum += Math.signum(points.get(points.size() - 1).steadyTheta()
                        - points.get(0).steadyTheta());
            }
        }
        if (sum != 0) {
            return sum < 0;
        }
        double rate = flow.film().conditions().rotationRate();
        return flow.film().steadyIn() == Frame.ROTATING ? rate >= 0 : rate < 0;
    }

    /** The angle, a whole number of sectors, by which a path is moved so that it starts just downstream of the stator (rad). */
    double shift(double theta) {
        double pitch = grid.pitch();
        double hair = 1e-3 * pitch;
        return upstreamIsTo
                ? Math.floor((openTo + hair - theta) / pitch) * pitch
                : Math.ceil((openFrom - hair - theta) / pitch) * pitch;
    }

    /** The middle of the longest land between grooves, where a cut shows lands at both ends (rad). */
    private double landMiddle() {
        int row = grid.cellsRadial() - 1;
        List<FilmShape.Band> bands = shape.grooveBands();
        if (!bands.isEmpty()) {
            FilmShape.Band last = bands.get(bands.size() - 1);
            row = Math.max(0, grid.row(last.to() - 1e-9 * last.to()));
        }
        double r = 0.5 * (grid.radius(row) + grid.radius(row + 1));
        double half = 0.5 * (shape.rotorLow() + shape.rotorHigh());
        int columns = grid.cellsTheta();
        double best = -1;
        double result = grid.lineTheta(0, row, r);
        for (int start = 0; start < columns; start++) {
            int n = 0;
            double length = 0;
            while (n < columns) {
                int i = (start + n) % columns;
                double theta = 0.5 * (grid.lineTheta(i, row, r) + grid.lineTheta(i + 1, row, r));
                if (flow.rotorZ(i, row, theta, r) < half) {
                    break;
                }
                length += grid.lineTheta(i + 1, row, r) - grid.lineTheta(i, row, r);
                n++;
            }
            if (length > best + 1e-9 && n < columns) {
                best = length;
                result = grid.lineTheta(start, row, r) + 0.5 * length;
            }
        }
        return result;
    }

    private double statorZ(int i, int j, double theta, double r) {
        return flow.rotorZ(i, j, theta, r) + flow.thickness(i, j, theta, r);
    }

    /**
     * The elevation from which most of the narrowest groove's floor is seen over the land in front of it, looking straight
     * across the groove, within two bounds (rad).
     */
    double elevation(double least, double most) {
        double depth = height(shape.rotorHigh()) - height(shape.rotorLow());
        double narrow = Double.POSITIVE_INFINITY;
        for (FilmShape.Band band : shape.grooveBands()) {
            narrow = Math.min(narrow, grooveWidth(0.5 * (band.from() + band.to())));
        }
        if (depth <= 0 || Double.isInfinite(narrow)) {
            return least;
        }
        return Math.max(least, Math.min(most, Math.atan2(depth, SHADED * narrow)));
    }

    /** Share of a groove's floor that the land in front of it may hide. */
    private static final double SHADED = 0.4;

    /** Width of a groove across itself, about, at a radius: what a ray along the radius runs over its floor (mm). */
    private double grooveWidth(double r) {
        double half = 0.5 * (shape.rotorLow() + shape.rotorHigh());
        int steps = 720;
        int floor = 0;
        int edges = 0;
        boolean before = rotorAt(from, r) < half;
        for (int n = 1; n <= steps; n++) {
            boolean in = rotorAt(from + grid.pitch() * n / steps, r) < half;
            floor += in ? 1 : 0;
            edges += in != before ? 1 : 0;
            before = in;
        }
        double along = 1e3 * r * grid.pitch() * floor / steps / Math.max(1, edges / 2);
        // The edges lean: of a spiral at an angle to the circle the width across is the smaller part.
        double lean = 0;
        for (FilmShape.Edge edge : shape.rotorEdges()) {
            if (edge.r0() != edge.r1()) {
                lean = Math.max(lean, Math.abs(r * (edge.theta1() - edge.theta0()) / (edge.r1() - edge.r0())));
            }
        }
        return floor == 0 ? Double.POSITIVE_INFINITY : along / Math.hypot(1, lean);
    }

    /** The film. */
    Film film() {
        return flow.film();
    }

    /** Which part of the ring is shown, in words. */
    String part() {
        double sectors = (to - from) / grid.pitch();
        if (Math.abs(sectors - Math.rint(sectors)) < 1e-6) {
            return Ticks.number(sectors, 0) + " of " + grid.sectors() + " equal sectors shown";
        }
        return Ticks.number(Math.toDegrees(to - from), 0) + "° of the ring shown";
    }

    /** The drawn z of a height (mm). */
    double height(double z) {
        return 1e3 * exaggeration * (z - datum);
    }

    /** The drawn place of a point of the film: x, y, z (mm). */
    double[] place(double theta, double r, double z) {
        return at(theta, r, height(z));
    }

    private double[] at(double theta, double r, double drawnZ) {
        return new double[] {1e3 * r * Math.cos(theta - middle), 1e3 * r * Math.sin(theta - middle), drawnZ};
    }

    /** Corners of the block, for setting up the view; x, y, z (mm). */
    List<double[]> extent() {
        List<double[]> points = new ArrayList<>();
        for (int n = 0; n <= 12; n++) {
            double theta = from + (to - from) * n / 12;
            double above = theta >= openFrom && theta <= openTo ? height(statorHigh) : top;
            for (double r : new double[] {grid.innerRadius(), grid.outerRadius()}) {
                points.add(at(theta, r, bottom));
                points.add(at(theta, r, above));
            }
        }
        return points;
    }

    /** The rotor and the stator, the feed, and the edges of what was cut away. */
    List<Scene.Item> rings() {
        List<Scene.Item> items = new ArrayList<>();
        boolean above =
                flow.film().supply().isEmpty() || flow.film().supply().get().face() == Face.STATOR;
        double low = upstreamIsTo ? openTo : from;
        double high = upstreamIsTo ? to : openFrom;
        add(items, ring(false, from, to, !above, false), Scene.Material.solid(ROTOR, 0.12));
        add(items, cuts(false, from, to, !above), Scene.Material.solid(ROTOR_CUT, 0.05));
        add(items, ring(true, low, high, above, false), Scene.Material.solid(STATOR, 0.15));
        add(items, cuts(true, low, high, above), Scene.Material.solid(STATOR_CUT, 0.05));
        add(items, ring(true, low, high, above, true), Scene.Material.solid(FEED, 0.1));
        add(items, ring(false, from, to, !above, true), Scene.Material.solid(FEED, 0.1));
        add(items, grooveEdges(), Scene.Material.plain(GROOVE_EDGE, 1));
        add(items, rim(), Scene.Material.plain(STATOR, 1));
        if (above) {
            add(items, feedLines(), Scene.Material.plain(FEED, 1));
            add(items, feedCuts(low, high), Scene.Material.plain(FEED, 1));
        }
        return items;
    }

    private boolean fedFromAbove() {
        return flow.film().supply().isEmpty() || flow.film().supply().get().face() == Face.STATOR;
    }

    /** The rotor of one sector, which turned by whole sectors makes the ring. */
    List<Scene.Item> rotorSector() {
        List<Scene.Item> items = new ArrayList<>();
        double pitch = grid.pitch();
        boolean recess = !fedFromAbove();
        add(items, ring(false, 0, pitch, recess, false), Scene.Material.solid(ROTOR, 0.12));
        add(items, sides(false, 0, pitch, recess), Scene.Material.solid(ROTOR_CUT, 0.05));
        add(items, ring(false, 0, pitch, recess, true), Scene.Material.solid(FEED, 0.1));
        MeshBuilder edges = new MeshBuilder();
        double radius = 0.0032 * 1e3 * (grid.outerRadius() - grid.innerRadius());
        for (FilmShape.Edge edge : shape.rotorEdges()) {
            rotorLine(edges, edge.theta0(), edge.r0(), edge.theta1(), edge.r1(), radius);
        }
        add(items, edges, Scene.Material.plain(GROOVE_EDGE, 1));
        return items;
    }

    /** The stator of one sector with its side towards the film alone, for an eye inside the film. */
    List<Scene.Item> statorSector() {
        List<Scene.Item> items = new ArrayList<>();
        double pitch = grid.pitch();
        boolean recess = fedFromAbove();
        add(items, ring(true, 0, pitch, recess, false), Scene.Material.solid(STATOR, 0.15));
        add(items, ring(true, 0, pitch, recess, true), Scene.Material.solid(FEED, 0.1));
        List<Scene.Item> shadowless = new ArrayList<>();
        items.forEach(item -> shadowless.add(item.shadowless()));
        return shadowless;
    }

    /** What is left standing of the stator. */
    List<Scene.Item> standingStator() {
        List<Scene.Item> items = new ArrayList<>();
        boolean recess = fedFromAbove();
        double low = upstreamIsTo ? openTo : from;
        double high = upstreamIsTo ? to : openFrom;
        add(items, ring(true, low, high, recess, false), Scene.Material.solid(STATOR, 0.15));
        add(items, cuts(true, low, high, recess), Scene.Material.solid(STATOR_CUT, 0.05));
        add(items, ring(true, low, high, recess, true), Scene.Material.solid(FEED, 0.1));
        if (recess) {
            add(items, feedCuts(low, high), Scene.Material.plain(FEED, 1));
        }
        return items;
    }

    /** Dashed lines along the borders of the feed where the stator is cut away. */
    List<Scene.Item> feedBorders() {
        List<Scene.Item> items = new ArrayList<>();
        if (fedFromAbove()) {
            add(items, feedLines(), Scene.Material.plain(FEED, 1));
        }
        return items;
    }

    /** Thin rods across the stator face at equal angles round the whole ring, by which its motion is seen. */
    Scene.Item statorMarks(int count) {
        MeshBuilder mesh = new MeshBuilder();
        double radius = 0.0022 * 1e3 * (grid.outerRadius() - grid.innerRadius());
        for (int n = 0; n < count; n++) {
            double theta = 2 * Math.PI * n / count;
            for (int m = 0; m < ARC; m++) {
                double a = grid.innerRadius() + (grid.outerRadius() - grid.innerRadius()) * m / ARC;
                double b = grid.innerRadius() + (grid.outerRadius() - grid.innerRadius()) * (m + 1) / ARC;
                if (!fed(theta, 0.5 * (a + b))) {
                    Tubes.bar(
                            mesh,
                            at(theta, a, height(statorAt(theta, a))),
                            at(theta, b, height(statorAt(theta, b))),
                            radius);
                }
            }
        }
        return new Scene.Item(mesh.build(), Scene.Material.plain(0x56606b, 1), 0);
    }

    private boolean fed(double theta, double r) {
        int j = grid.row(r);
        double within = theta - grid.intoSector(theta, j, r) * grid.pitch();
        return fedFromAbove() && flow.film().feeds(grid.cell(grid.column(within, j, r), j));
    }

    private static void add(List<Scene.Item> items, MeshBuilder mesh, Scene.Material material) {
        if (!mesh.isEmpty()) {
            items.add(new Scene.Item(mesh.build(), material, 0));
        }
    }

    /** Drawn z of a face at a point of a cell, the feed's recess included (mm). */
    private double faceZ(boolean stator, int i, int j, double theta, double r, boolean recess) {
        double z = height(stator ? statorZ(i, j, theta, r) : flow.rotorZ(i, j, theta, r));
        return recess && flow.film().feeds(grid.cell(i, j)) ? z + (stator ? notch : -0.5 * notch) : z;
    }

    private interface CellVisit {
        void visit(int i, int j, double turn);
    }

    /** Visits the cells of all sectors that reach into a range of angles. */
    private void cells(double low, double high, CellVisit visit) {
        for (int j = 0; j < grid.cellsRadial(); j++) {
            double least = Math.min(grid.theta(0, j), grid.theta(0, j + 1));
            double most = Math.max(grid.theta(grid.ni() - 1, j), grid.theta(grid.ni() - 1, j + 1));
            int first = (int) Math.floor((low - most) / grid.pitch());
            int last = (int) Math.ceil((high - least) / grid.pitch());
            for (int n = first; n <= last; n++) {
                double turn = n * grid.pitch();
                for (int i = 0; i < grid.cellsTheta(); i++) {
                    double a = Math.min(grid.theta(i, j), grid.theta(i, j + 1)) + turn;
                    double b = Math.max(grid.theta(i + 1, j), grid.theta(i + 1, j + 1)) + turn;
                    if (b > low && a < high) {
                        visit.visit(i, j, turn);
                    }
                }
            }
        }
    }

    /**
     * A face with its walls.
     *
     * @param stator which ring
     * @param low first angle (rad)
     * @param high last angle (rad)
     * @param recess whether the feed is a recess in this ring
     * @param feedOnly only the walls and ceiling of that recess, or only all else
     */
    private MeshBuilder ring(boolean stator, double low, double high, boolean recess, boolean feedOnly) {
        MeshBuilder mesh = new MeshBuilder();
        if (feedOnly && !recess) {
            return mesh;
        }
        cells(low, high, (i, j, turn) -> {
            boolean feed = recess && flow.film().feeds(grid.cell(i, j));
            if (feed == feedOnly) {
                patch(mesh, stator, i, j, turn, low, high, recess);
            }
            wall(mesh, stator, i, j, turn, low, high, recess, feedOnly);
            step(mesh, stator, i, j, turn, low, high, recess, feedOnly);
        });
        return mesh;
    }

    /** The face over one cell, cut at the two angles. */
    private void patch(
            MeshBuilder mesh, boolean stator, int i, int j, double turn, double low, double high, boolean recess) {
        double r0 = grid.radius(j);
        double r1 = grid.radius(j + 1);
        double span =
                Math.max(grid.theta(i + 1, j) - grid.theta(i, j), grid.theta(i + 1, j + 1) - grid.theta(i, j + 1));
        double fine = (grid.outerRadius() - grid.innerRadius()) / (shape.rotorGrooved() && part ? 44 : 24);
        int across = (int) Math.ceil(span * r1 / fine);
        int along = (int) Math.ceil((r1 - r0) / fine);
        double midTheta = between(i, j, 0.5 * (r0 + r1), 0.5);
        double midR = 0.5 * (r0 + r1);
        for (int b = 0; b < along; b++) {
            double ra = r0 + (r1 - r0) * b / along;
            double rb = r0 + (r1 - r0) * (b + 1) / along;
            for (int a = 0; a < across; a++) {
                double f = (double) a / across;
                double g = (double) (a + 1) / across;
                double[] corners = {
                    between(i, j, ra, f),
                    ra,
                    between(i, j, ra, g),
                    ra,
                    between(i, j, rb, g),
                    rb,
                    between(i, j, rb, f),
                    rb
                };
                double[] inside = clip(clip(corners, low - turn, true), high - turn, false);
                int points = inside.length / 2;
                int first = -1;
                for (int n = 0; n < points; n++) {
                    int at = faceVertex(
                            mesh, stator, i, j, inside[2 * n], inside[2 * n + 1], turn, recess, midTheta, midR);
                    first = first < 0 ? at : first;
                    if (n >= 2) {
                        mesh.triangle(first, at - 1, at);
                    }
                }
            }
        }
    }

    private double between(int i, int j, double r, double fraction) {
        double a = grid.lineTheta(i, j, r);
        return a + fraction * (grid.lineTheta(i + 1, j, r) - a);
    }

    private int faceVertex(
            MeshBuilder mesh,
            boolean stator,
            int i,
            int j,
            double theta,
            double r,
            double turn,
            boolean recess,
            double midTheta,
            double midR) {
        double z = faceZ(stator, i, j, theta, r, recess);
        double dr = 0.2 * (grid.radius(j + 1) - grid.radius(j));
        double dt = 0.2 * (grid.theta(i + 1, j) - grid.theta(i, j));
        double zr =
                (faceZ(stator, i, j, theta, r + dr, recess) - faceZ(stator, i, j, theta, r - dr, recess)) / (2e3 * dr);
        double zt = (faceZ(stator, i, j, theta + dt, r, recess) - faceZ(stator, i, j, theta - dt, r, recess))
                / (2e3 * r * dt);
        double cos = Math.cos(theta + turn - middle);
        double sin = Math.sin(theta + turn - middle);
        double length = Math.sqrt(1 + zr * zr + zt * zt);
        double sign = stator ? -1 : 1;
        return mesh.vertex(
                1e3 * r * cos,
                1e3 * r * sin,
                z,
                -sign * (zr * cos - zt * sin) / length,
                -sign * (zr * sin + zt * cos) / length,
                sign / length,
                // Looked for a little inside the cell, so that a wall at its border is on the right side.
                stator ? UNDER : sky.open(theta + 0.3 * (midTheta - theta), r + 0.3 * (midR - r), z));
    }

    /** How open a point of a wall is to the sky: less at its foot. */
    private double openness(boolean stator, double z) {
        if (stator) {
            return UNDER;
        }
        double depth = height(shape.rotorHigh()) - height(shape.rotorLow());
        return depth <= 0 ? 1 : 0.4 - 0.35 * Math.min(1, Math.max(0, -z / depth));
    }

    /** The part of a polygon (θ, r in turn) on one side of an angle; Sutherland and Hodgman, 1974. */
    static double[] clip(double[] polygon, double angle, boolean above) {
        int points = polygon.length / 2;
        double[] result = new double[polygon.length + 4];
        int count = 0;
        for (int n = 0; n < points; n++) {
            int m = (n + 1) % points;
            double a = above ? polygon[2 * n] - angle : angle - polygon[2 * n];
            double b = above ? polygon[2 * m] - angle : angle - polygon[2 * m];
            if (a >= 0) {
                result[count++] = polygon[2 * n];
                result[count++] = polygon[2 * n + 1];
            }
            if (a >= 0 != b >= 0) {
                double f = a / (a - b);
                result[count++] = angle;
                result[count++] = polygon[2 * n + 1] + f * (polygon[2 * m + 1] - polygon[2 * n + 1]);
            }
        }
        return Arrays.copyOf(result, count);
    }

    /** The wall along grid line i between cells (i − 1, j) and (i, j), where the face jumps there. */
    private void wall(
            MeshBuilder mesh,
            boolean stator,
            int i,
            int j,
            double turn,
            double low,
            double high,
            boolean recess,
            boolean feedOnly) {
        int before = i == 0 ? grid.cellsTheta() - 1 : i - 1;
        double seam = i == 0 ? grid.pitch() : 0;
        boolean ofFeed =
                recess && flow.film().feeds(grid.cell(i, j)) != flow.film().feeds(grid.cell(before, j));
        if (ofFeed != feedOnly) {
            return;
        }
        double ra = grid.radius(j);
        double rb = grid.radius(j + 1);
        double ta = grid.theta(i, j);
        double tb = grid.theta(i, j + 1);
        // The piece of the line between the two angles.
        double f0 = 0;
        double f1 = 1;
        double slope = tb - ta;
        if (Math.abs(slope) < 1e-12) {
            if (ta + turn < low || ta + turn > high) {
                return;
            }
        } else {
            double a = (low - turn - ta) / slope;
            double b = (high - turn - ta) / slope;
            f0 = Math.max(0, Math.min(a, b));
            f1 = Math.min(1, Math.max(a, b));
            if (f0 >= f1) {
                return;
            }
        }
        double r0 = ra + f0 * (rb - ra);
        double r1 = ra + f1 * (rb - ra);
        double t0 = ta + f0 * slope;
        double t1 = ta + f1 * slope;
        double below0 = faceZ(stator, before, j, t0 + seam, r0, recess);
        double here0 = faceZ(stator, i, j, t0, r0, recess);
        double below1 = faceZ(stator, before, j, t1 + seam, r1, recess);
        double here1 = faceZ(stator, i, j, t1, r1, recess);
        upright(mesh, stator, t0 + turn, r0, t1 + turn, r1, below0, here0, below1, here1);
    }

    /** The wall along ring j between cells (i, j − 1) and (i, j), where the face jumps there. */
    private void step(
            MeshBuilder mesh,
            boolean stator,
            int i,
            int j,
            double turn,
            double low,
            double high,
            boolean recess,
            boolean feedOnly) {
        if (j == 0) {
            return;
        }
        boolean ofFeed =
                recess && flow.film().feeds(grid.cell(i, j)) != flow.film().feeds(grid.cell(i, j - 1));
        if (ofFeed != feedOnly) {
            return;
        }
        double r = grid.radius(j);
        double[] pieces = pieces(i, j, turn, low, high);
        for (int n = 0; n + 1 < pieces.length; n++) {
            double t0 = pieces[n];
            double t1 = pieces[n + 1];
            upright(
                    mesh,
                    stator,
                    t0 + turn,
                    r,
                    t1 + turn,
                    r,
                    faceZ(stator, i, j - 1, t0, r, recess),
                    faceZ(stator, i, j, t0, r, recess),
                    faceZ(stator, i, j - 1, t1, r, recess),
                    faceZ(stator, i, j, t1, r, recess));
        }
    }

    /** Angles that part the arc of ring node j over column i, between two angles, into short pieces. */
    private double[] pieces(int i, int j, double turn, double low, double high) {
        double a = Math.max(grid.theta(i, j), low - turn);
        double b = Math.min(grid.theta(i + 1, j), high - turn);
        if (!(b > a)) {
            return new double[0];
        }
        int parts = (int) Math.ceil((b - a) / Math.toRadians(1));
        double[] result = new double[parts + 1];
        for (int n = 0; n <= parts; n++) {
            result[n] = a + (b - a) * n / parts;
        }
        return result;
    }

    private void upright(
            MeshBuilder mesh,
            boolean stator,
            double t0,
            double r0,
            double t1,
            double r1,
            double a0,
            double b0,
            double a1,
            double b1) {
        if (Math.abs(a0 - b0) < 1e-9 && Math.abs(a1 - b1) < 1e-9) {
            return;
        }
        double[] p = at(t0, r0, a0);
        double[] q = at(t1, r1, a1);
        double nx = q[1] - p[1];
        double ny = p[0] - q[0];
        double length = Math.hypot(nx, ny);
        nx /= length;
        ny /= length;
        int v0 = mesh.vertex(p[0], p[1], a0, nx, ny, 0, openness(stator, a0));
        int v1 = mesh.vertex(q[0], q[1], a1, nx, ny, 0, openness(stator, a1));
        int v2 = mesh.vertex(q[0], q[1], b1, nx, ny, 0, openness(stator, b1));
        int v3 = mesh.vertex(p[0], p[1], b0, nx, ny, 0, openness(stator, b0));
        mesh.quad(v0, v1, v2, v3);
    }

    /** The side of a ring at a diameter, and the far face beyond it. */
    private void side(
            MeshBuilder mesh,
            boolean stator,
            int i,
            int j,
            int node,
            double turn,
            double low,
            double high,
            boolean recess) {
        double r = grid.radius(node);
        double far = stator ? top : bottom;
        double sign = node == 0 ? -1 : 1;
        double[] pieces = pieces(i, node, turn, low, high);
        for (int n = 0; n + 1 < pieces.length; n++) {
            int[] v = new int[4];
            for (int m = 0; m < 2; m++) {
                double theta = pieces[n + m] + turn;
                double nx = sign * Math.cos(theta - middle);
                double ny = sign * Math.sin(theta - middle);
                double[] p = at(theta, r, faceZ(stator, i, j, pieces[n + m], r, recess));
                v[m] = mesh.vertex(p[0], p[1], p[2], nx, ny, 0, 1);
                v[2 + m] = mesh.vertex(p[0], p[1], far, nx, ny, 0, 1);
            }
            mesh.quad(v[0], v[1], v[3], v[2]);
            if (node > 0) {
                // The far face, from diameter to diameter.
                double up = stator ? 1 : -1;
                double inner = grid.innerRadius();
                int[] w = new int[4];
                for (int m = 0; m < 2; m++) {
                    double[] p = at(pieces[n + m] + turn, r, far);
                    double[] q = at(pieces[n + m] + turn, inner, far);
                    w[m] = mesh.vertex(p[0], p[1], far, 0, 0, up, 1);
                    w[2 + m] = mesh.vertex(q[0], q[1], far, 0, 0, up, 1);
                }
                mesh.quad(w[0], w[1], w[3], w[2]);
            }
        }
    }

    /** The sides of a ring at the two diameters, and its far face. */
    private MeshBuilder sides(boolean stator, double low, double high, boolean recess) {
        MeshBuilder mesh = new MeshBuilder();
        cells(low, high, (i, j, turn) -> {
            if (j == 0) {
                side(mesh, stator, i, 0, 0, turn, low, high, recess);
            }
            if (j + 1 == grid.cellsRadial()) {
                side(mesh, stator, i, j, j + 1, turn, low, high, recess);
            }
        });
        return mesh;
    }

    /** The sides of a ring at the two diameters, its far face, and the plane faces where it is cut at two angles. */
    private MeshBuilder cuts(boolean stator, double low, double high, boolean recess) {
        MeshBuilder mesh = sides(stator, low, high, recess);
        for (int end = 0; end < 2; end++) {
            double theta = end == 0 ? low : high;
            double side = end == 0 ? -1 : 1;
            double nx = -side * Math.sin(theta - middle);
            double ny = side * Math.cos(theta - middle);
            double far = stator ? top : bottom;
            // A hair inside, so that a cut along a grid line takes the cells within.
            double look = theta - side * 1e-9;
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double[] r = Section.crossings(grid, j, look);
                for (int n = 0; n + 1 < r.length; n++) {
                    double mid = 0.5 * (r[n] + r[n + 1]);
                    double turn = grid.intoSector(look, j, mid) * grid.pitch();
                    int i = grid.column(look - turn, j, mid);
                    int[] v = new int[4];
                    for (int m = 0; m < 2; m++) {
                        double[] p = at(theta, r[n + m], faceZ(stator, i, j, look - turn, r[n + m], recess));
                        v[m] = mesh.vertex(p[0], p[1], p[2], nx, ny, 0, 1);
                        v[2 + m] = mesh.vertex(p[0], p[1], far, nx, ny, 0, 1);
                    }
                    mesh.quad(v[0], v[1], v[3], v[2]);
                }
            }
        }
        return mesh;
    }

    /** Thin rods along the edges of the stator face where the stator is cut away. */
    private MeshBuilder rim() {
        MeshBuilder mesh = new MeshBuilder();
        double radius = 0.003 * 1e3 * (grid.outerRadius() - grid.innerRadius());
        Tubes.tube(mesh, arc(grid.innerRadius(), openFrom, openTo), new double[ARC + 1], radius);
        Tubes.tube(mesh, arc(grid.outerRadius(), openFrom, openTo), new double[ARC + 1], radius);
        double theta = upstreamIsTo ? from : to;
        double[] line = new double[3 * (ARC + 1)];
        for (int n = 0; n <= ARC; n++) {
            double r = grid.innerRadius() + (grid.outerRadius() - grid.innerRadius()) * n / ARC;
            put(line, n, at(theta, r, height(statorAt(theta, r))));
        }
        Tubes.tube(mesh, line, new double[ARC + 1], radius);
        return mesh;
    }

    private static final int ARC = 48;

    /** Points of an arc on the stator face. */
    private double[] arc(double r, double low, double high) {
        double[] line = new double[3 * (ARC + 1)];
        for (int n = 0; n <= ARC; n++) {
            double theta = low + (high - low) * n / ARC;
            put(line, n, at(theta, r, height(statorAt(theta, r))));
        }
        return line;
    }

    /** Dashed lines along the borders of the feed at the stator face, where the stator is cut away. */
    private MeshBuilder feedLines() {
        MeshBuilder mesh = new MeshBuilder();
        double radius = 0.0055 * 1e3 * (grid.outerRadius() - grid.innerRadius());
        double dash = 0.055 * (grid.outerRadius() - grid.innerRadius());
        FilmShape.Band feed = shape.feed();
        List<FilmShape.Edge> ports = shape.feedEdges();
        if (feed == null) {
            return mesh;
        }
        if (ports.isEmpty()) {
            for (double r : new double[] {feed.from(), feed.to()}) {
                int dashes = (int) Math.max(1, Math.rint((openTo - openFrom) * r / (2 * dash)));
                double step = (openTo - openFrom) / dashes;
                for (int n = 0; n < dashes; n++) {
                    double a = openFrom + (n + 0.25) * step;
                    segment(mesh, a, r, a + 0.5 * step, r, radius, true);
                }
            }
        }
        for (int n = sector(openFrom) - 2; n <= sector(openTo) + 2; n++) {
            for (FilmShape.Edge edge : ports) {
                double turn = n * grid.pitch();
                segment(mesh, edge.theta0() + turn, edge.r0(), edge.theta1() + turn, edge.r1(), radius, true);
            }
        }
        return mesh;
    }

    /** The feed's channel where the stator is cut, as a filled surface, so that it shows in the cut. */
    private MeshBuilder feedCuts(double low, double high) {
        MeshBuilder mesh = new MeshBuilder();
        FilmShape.Band feed = shape.feed();
        if (feed == null || !shape.feedEdges().isEmpty()) {
            return mesh;
        }
        for (double theta : new double[] {low, high}) {
            int[] corners = new int[4];
            for (int n = 0; n < 4; n++) {
                double r = n == 1 || n == 2 ? feed.to() : feed.from();
                double[] p = at(theta, r, height(statorAt(theta, r)) + (n >= 2 ? notch : 0));
                corners[n] = mesh.vertex(p[0], p[1], p[2], 0, 0, 1, 1);
            }
            mesh.quad(corners[0], corners[1], corners[2], corners[3]);
        }
        return mesh;
    }

    private int sector(double theta) {
        return (int) Math.floor(theta / grid.pitch());
    }

    /** Crisp lines along the upper edges of the grooves, and finer ones along the feet of their walls. */
    private MeshBuilder grooveEdges() {
        MeshBuilder mesh = new MeshBuilder();
        double radius = 0.0032 * 1e3 * (grid.outerRadius() - grid.innerRadius());
        int reach = 1 + (int) Math.ceil(Math.abs(grid.theta(0, grid.nj() - 1) - grid.theta(0, 0)) / grid.pitch());
        for (int n = sector(from) - reach; n <= sector(to) + reach; n++) {
            double turn = n * grid.pitch();
            for (FilmShape.Edge edge : shape.rotorEdges()) {
                segment(mesh, edge.theta0() + turn, edge.r0(), edge.theta1() + turn, edge.r1(), radius, false);
            }
        }
        return mesh;
    }

    /** A thin straight line on a face, in the middle of the open part or on the rotor anywhere in the part shown. */
    private void segment(MeshBuilder mesh, double t0, double r0, double t1, double r1, double radius, boolean stator) {
        double low = stator ? openFrom : from;
        double high = stator ? openTo : to;
        if (Math.max(t0, t1) < low || Math.min(t0, t1) > high) {
            return;
        }
        // A piece that runs over the border of the part shown is cut there.
        double f = t1 == t0 ? 0 : Math.max(0, Math.min((low - t0) / (t1 - t0), (high - t0) / (t1 - t0)));
        double g = t1 == t0 ? 1 : Math.min(1, Math.max((low - t0) / (t1 - t0), (high - t0) / (t1 - t0)));
        int parts = 1 + (int) (Math.abs(t1 - t0) / Math.toRadians(1));
        for (int n = 0; n < parts; n++) {
            double a = f + (g - f) * n / parts;
            double b = f + (g - f) * (n + 1) / parts;
            double ta = t0 + a * (t1 - t0);
            double tb = t0 + b * (t1 - t0);
            double ra = r0 + a * (r1 - r0);
            double rb = r0 + b * (r1 - r0);
            if (stator) {
                double z = height(statorAt(ta, ra));
                Tubes.bar(mesh, at(ta, ra, z), at(tb, rb, z), radius);
                continue;
            }
            rotorBar(mesh, ta, ra, tb, rb, radius);
        }
    }

    /** A thin straight line on the rotor, wherever it is. */
    private void rotorLine(MeshBuilder mesh, double t0, double r0, double t1, double r1, double radius) {
        int parts = 1 + (int) (Math.abs(t1 - t0) / Math.toRadians(1));
        for (int n = 0; n < parts; n++) {
            double a = (double) n / parts;
            double b = (double) (n + 1) / parts;
            rotorBar(mesh, t0 + a * (t1 - t0), r0 + a * (r1 - r0), t0 + b * (t1 - t0), r0 + b * (r1 - r0), radius);
        }
    }

    private void rotorBar(MeshBuilder mesh, double ta, double ra, double tb, double rb, double radius) {
        double[] z = lowestAndHighest(0.5 * (ta + tb), 0.5 * (ra + rb));
        Tubes.bar(mesh, at(ta, ra, z[1]), at(tb, rb, z[1]), radius);
        Tubes.bar(mesh, at(ta, ra, z[0]), at(tb, rb, z[0]), 0.6 * radius);
    }

    /** The lowest and the highest of the rotor face round a point: foot and upper edge of a wall there (mm). */
    private double[] lowestAndHighest(double theta, double r) {
        double near = 2e-4 * (grid.outerRadius() - grid.innerRadius());
        double low = Double.POSITIVE_INFINITY;
        double high = Double.NEGATIVE_INFINITY;
        for (int n = 0; n < 4; n++) {
            double dr = n == 0 ? near : n == 1 ? -near : 0;
            double dt = n == 2 ? near / r : n == 3 ? -near / r : 0;
            double z = rotorAt(theta + dt, inside(r + dr));
            low = Math.min(low, z);
            high = Math.max(high, z);
        }
        return new double[] {height(low), height(high)};
    }

    private double inside(double r) {
        return Math.max(grid.innerRadius(), Math.min(grid.outerRadius(), r));
    }

    private static void put(double[] line, int n, double[] point) {
        System.arraycopy(point, 0, line, 3 * n, 3);
    }

    /** Height of the stator face at any angle (m). */
    double statorAt(double theta, double r) {
        int j = grid.row(r);
        double within = theta - grid.intoSector(theta, j, r) * grid.pitch();
        int i = grid.column(within, j, r);
        return statorZ(i, j, within, r);
    }

    /** Height of the rotor face at any angle (m). */
    double rotorAt(double theta, double r) {
        int j = grid.row(r);
        double within = theta - grid.intoSector(theta, j, r) * grid.pitch();
        return flow.rotorZ(grid.column(within, j, r), j, within, r);
    }

    /** Radius of the tubes of paths (mm): a small share of the film's drawn thickness, but never too thin to see. */
    double tubeRadius() {
        double face = 1e3 * (grid.outerRadius() - grid.innerRadius());
        return Math.max(0.005 * face, Math.min(0.0115 * face, 0.075 * 1e3 * exaggeration * shape.leastThickness()));
    }

    /** Shares of the tube's opacity along the end of a path that goes on outside the part shown. */
    private static final double[] FADE = {0.85, 0.65, 0.42, 0.2};

    /**
     * Tubes along the paths and round markers on them at equal times; a filled cone where a path ends, and an open
     * arrowhead, behind a tube that fades, where it goes on outside the part shown.
     *
     * @param shown the paths
     * @param range ends of the speed scale (m/s)
     * @param every time between markers (s)
     */
    List<Scene.Item> paths(List<ShownPath> shown, PictureSettings.Range range, double every) {
        MeshBuilder tubes = new MeshBuilder();
        MeshBuilder markers = new MeshBuilder();
        MeshBuilder[] fades = new MeshBuilder[FADE.length];
        for (int n = 0; n < fades.length; n++) {
            fades[n] = new MeshBuilder();
        }
        double radius = tubeRadius();
        for (ShownPath path : shown) {
            double[][] line = line(path, range, 0.8 * radius);
            int points = line[1].length;
            if (points < 2) {
                continue;
            }
            int solid = points - 1;
            double fade = path.whole() ? 0 : FADE_LENGTH * radius;
            while (solid > 1 && distance(line[0], solid, points - 1) < fade) {
                solid--;
            }
            solid = path.whole() ? points - 1 : solid;
            Tubes.tube(tubes, Arrays.copyOf(line[0], 3 * (solid + 1)), Arrays.copyOf(line[1], solid + 1), radius);
            for (int n = 0; n < fades.length && solid < points - 1; n++) {
                int a = solid + (points - 1 - solid) * n / fades.length;
                int b = solid + (points - 1 - solid) * (n + 1) / fades.length;
                if (b > a) {
                    Tubes.open(
                            fades[n],
                            Arrays.copyOfRange(line[0], 3 * a, 3 * (b + 1)),
                            Arrays.copyOfRange(line[1], a, b + 1),
                            radius);
                }
            }
            markers(path, every, markers, 1.65 * radius, fade);
            head(path, line, tubes, radius);
        }
        List<Scene.Item> items = new ArrayList<>();
        add(items, tubes, Scene.Material.scaled(ColourScale.SPEED, true));
        add(items, markers, Scene.Material.solid(0xf4f4f2, 0.5));
        for (int n = 0; n < fades.length; n++) {
            add(items, fades[n], new Scene.Material(0, ColourScale.SPEED, true, 0.25, FADE[n]));
        }
        return items;
    }

    /** Length of the fading end of a tube, in radii of the tube. */
    private static final double FADE_LENGTH = 22;

    /** The drawn points of a path, x, y, z in turn, and the place of each point's speed on the scale. */
    private double[][] line(ShownPath path, PictureSettings.Range range, double least) {
        double[] points = new double[3 * path.size()];
        double[] values = new double[path.size()];
        int count = 0;
        for (int n = 0; n < path.size(); n++) {
            put(points, count, place(path.theta(n), path.radius(n), path.z(n)));
            values[count] = (path.speed(n) - range.low()) / (range.high() - range.low());
            boolean last = n + 1 == path.size();
            if (count == 0 || distance(points, count - 1, count) >= least) {
                count++;
            } else if (last) {
                // The last point replaces one that is too near.
                put(points, count - 1, place(path.theta(n), path.radius(n), path.z(n)));
            }
        }
        return new double[][] {rounded(Arrays.copyOf(points, 3 * count)), Arrays.copyOf(values, count)};
    }

    /** Points with sharp corners, where a path passes over a groove's edge, rounded off a little, for a tube. */
    static double[] rounded(double[] points) {
        double[] line = points;
        for (int round = 0; round < 3; round++) {
            double[] next = line.clone();
            for (int n = 3; n + 3 < line.length; n++) {
                next[n] = 0.5 * line[n] + 0.25 * (line[n - 3] + line[n + 3]);
            }
            line = next;
        }
        return line;
    }

    private static double distance(double[] points, int a, int b) {
        return Math.hypot(
                Math.hypot(points[3 * b] - points[3 * a], points[3 * b + 1] - points[3 * a + 1]),
                points[3 * b + 2] - points[3 * a + 2]);
    }

    private void markers(ShownPath path, double every, MeshBuilder mesh, double radius, double fade) {
        int count = (int) Math.ceil(path.time(0) / every - 1e-9);
        int last = path.size() - 1;
        double[] end = place(path.theta(last), path.radius(last), path.z(last));
        for (int n = 1; n <= last; n++) {
            while (count * every <= path.time(n)) {
                double step = path.time(n) - path.time(n - 1);
                double f = step > 0 ? (count * every - path.time(n - 1)) / step : 0;
                double[] p = place(
                        ShownPath.mix(path.theta(n - 1), path.theta(n), f),
                        ShownPath.mix(path.radius(n - 1), path.radius(n), f),
                        ShownPath.mix(path.z(n - 1), path.z(n), f));
                if (Math.hypot(Math.hypot(p[0] - end[0], p[1] - end[1]), p[2] - end[2]) >= 0.6 * fade) {
                    Tubes.ball(mesh, p[0], p[1], p[2], radius, 1);
                }
                count++;
            }
        }
    }

    /** The drawn direction in which a path runs at the end of its line, unit length. */
    private static double[] heading(double[] points, double back) {
        int last = points.length / 3 - 1;
        int before = last - 1;
        while (before > 0 && distance(points, before, last) < back) {
            before--;
        }
        double[] direction = {1, 0, 0};
        if (before < 0) {
            return direction;
        }
        double length = distance(points, before, last);
        for (int c = 0; c < 3 && length > 0; c++) {
            direction[c] = (points[3 * last + c] - points[3 * before + c]) / length;
        }
        return direction;
    }

    private static void head(ShownPath path, double[][] line, MeshBuilder mesh, double radius) {
        int last = line[1].length - 1;
        double[] end = Arrays.copyOfRange(line[0], 3 * last, 3 * last + 3);
        double[] way = heading(line[0], 2 * radius);
        double value = line[1][last];
        if (path.whole()) {
            // A cone longer than the path that it ends would hang in the air.
            if (distance(line[0], 0, last) > 4 * radius) {
                Tubes.cone(mesh, end, way, 6.4 * radius, 2.7 * radius, value);
            }
            return;
        }
        double flat = Math.hypot(way[0], way[1]);
        if (flat < 1e-9) {
            return;
        }
        double[] wings = new double[9];
        for (int n = 0; n < 3; n++) {
            double back = n == 1 ? 0 : -OPEN_HEAD * radius;
            double aside = (n - 1) * 0.62 * OPEN_HEAD * radius;
            wings[3 * n] = end[0] + back * way[0] - aside * way[1] / flat;
            wings[3 * n + 1] = end[1] + back * way[1] + aside * way[0] / flat;
            wings[3 * n + 2] = end[2] + back * way[2];
        }
        for (int n = 0; n < 2; n++) {
            double[] wing = Arrays.copyOfRange(wings, 3 * n, 3 * n + 6);
            Tubes.tube(mesh, wing, new double[] {value, value}, 0.62 * radius);
        }
    }

    /** Length of an open arrowhead, in radii of the tube. */
    static final double OPEN_HEAD = 6.5;

    /** Where a path's end is drawn, and a point a little further on, where the marker of its destination stands (mm). */
    double[][] endOf(ShownPath path, double further) {
        double[][] line = line(path, new PictureSettings.Range(0, 1), 0.8 * tubeRadius());
        int last = line[1].length - 1;
        double[] end = Arrays.copyOfRange(line[0], 3 * last, 3 * last + 3);
        double[] way = heading(line[0], 2 * tubeRadius());
        double[] beyond = end.clone();
        for (int c = 0; c < 3; c++) {
            beyond[c] += further * way[c];
        }
        return new double[][] {end, beyond};
    }

    /**
     * Whether a place is hidden by the rotor or by what is left of the stator.
     *
     * @param place drawn place (mm)
     * @param eye where the eye is (mm)
     */
    boolean hidden(double[] place, double[] eye) {
        double[] way = new double[3];
        double length = 0;
        for (int c = 0; c < 3; c++) {
            way[c] = eye[c] - place[c];
            length += way[c] * way[c];
        }
        length = Math.sqrt(length);
        double step = 0.006e3 * (grid.outerRadius() - grid.innerRadius());
        for (double s = 1.5 * step; s < length; s += step) {
            double x = place[0] + s * way[0] / length;
            double y = place[1] + s * way[1] / length;
            double z = place[2] + s * way[2] / length;
            double r = 1e-3 * Math.hypot(x, y);
            if (z > top || z < bottom || r < grid.innerRadius() || r > grid.outerRadius()) {
                return false;
            }
            double theta = middle + Math.atan2(y, x);
            if (theta < from || theta > to) {
                return false;
            }
            boolean open = theta >= openFrom && theta <= openTo;
            if (z < height(rotorAt(theta, r)) || (!open && z > height(statorAt(theta, r)))) {
                return true;
            }
        }
        return false;
    }

    /**
     * The drawn direction, unit length, of a physical one.
     *
     * @param theta angle of its place (rad)
     * @param outwards component along r
     * @param round component along θ, same unit
     * @param axial component along z, same unit
     */
    double[] drawnDirection(double theta, double outwards, double round, double axial) {
        double cos = Math.cos(theta - middle);
        double sin = Math.sin(theta - middle);
        double z = exaggeration * axial;
        double length = Math.sqrt(outwards * outwards + round * round + z * z);
        if (length == 0) {
            return new double[] {1, 0, 0};
        }
        return new double[] {
            (outwards * cos - round * sin) / length, (outwards * sin + round * cos) / length, z / length
        };
    }
}
