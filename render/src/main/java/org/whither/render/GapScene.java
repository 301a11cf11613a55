package org.whither.render;

import java.util.ArrayList;
import java.util.List;
import org.whither.film.Face;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
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
    private static final int ROTOR = 0xb3a594;
    private static final int ROTOR_CUT = 0x877b6e;
    static final int STATOR = 0x7f8b98;
    private static final int STATOR_CUT = 0x929eab;
    /** The feed: the reddish purple of Okabe and Ito, which no scale and no destination has. */
    static final int FEED = 0xcc79a7;

    private final FilmShape shape;
    private final FilmFlow flow;
    private final FilmGrid grid;
    final double exaggeration;
    /** First and last angle of the part shown (rad). */
    final double from;

    final double to;
    /** Angle up to which the stator is cut away (rad). */
    final double cut;
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
        this.shape = shape;
        this.flow = shape.flow();
        this.grid = shape.grid();
        this.exaggeration = exaggeration;
        double span = grid.outerRadius() - grid.innerRadius();
        double mean = 0.5 * (grid.outerRadius() + grid.innerRadius());
        double pitch = grid.pitch();
        // Whole sectors, about three times as long as the face is wide; of a longer sector, as much.
        double wish = 2.9 * span / mean;
        double whole = Math.max(1, Math.rint(wish / pitch)) * pitch;
        double width = Math.min(whole > 1.5 * wish ? wish : whole, Math.toRadians(100));
        double centre = landMiddle() + 0.5 * width;
        this.middle = centre;
        this.from = centre - 0.5 * width;
        this.to = centre + 0.5 * width;
        this.cut = from + 0.68 * width;
        this.datum = shape.rotorHigh();
        double high = Double.NEGATIVE_INFINITY;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int c = 0; c < 4; c++) {
                    high = Math.max(high, statorZ(i, j, shape.cornerTheta(i, j, c), shape.cornerRadius(j, c)));
                }
            }
        }
        this.statorHigh = high;
        double face = 1e3 * span;
        this.bottom = height(shape.rotorLow()) - 0.12 * face;
        this.notch = 0.14 * face;
        this.top = height(high) + 0.24 * face;
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

    /** Which part of the ring is shown, in words. */
    String part() {
        double sectors = (to - from) / grid.pitch();
        String back = "; a path that leaves at one end comes back at the other";
        if (Math.abs(sectors - Math.rint(sectors)) < 1e-6) {
            return Ticks.number(sectors, 0) + " of " + grid.sectors() + " equal sectors" + back;
        }
        return Ticks.number(Math.toDegrees(to - from), 0) + "° of the ring; paths are shown only there";
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
            double above = theta >= cut ? top : height(statorHigh);
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
        add(items, ring(false, from, to, !above, false), Scene.Material.solid(ROTOR, 0.22));
        add(items, cuts(false, from, to, !above), Scene.Material.solid(ROTOR_CUT, 0.05));
        add(items, ring(true, cut, to, above, false), Scene.Material.solid(STATOR, 0.15));
        add(items, cuts(true, cut, to, above), Scene.Material.solid(STATOR_CUT, 0.05));
        add(items, ring(true, cut, to, above, true), Scene.Material.solid(FEED, 0.1));
        add(items, ring(false, from, to, !above, true), Scene.Material.solid(FEED, 0.1));
        add(items, rim(), Scene.Material.plain(STATOR, 1));
        if (above) {
            add(items, feedBand(), Scene.Material.plain(FEED, 0.6));
        }
        return items;
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
        int across = (int) Math.ceil(span / Math.toRadians(1));
        int along = (int) Math.ceil((r1 - r0) / ((grid.outerRadius() - grid.innerRadius()) / 24));
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
                    int at = faceVertex(mesh, stator, i, j, inside[2 * n], inside[2 * n + 1], turn, recess);
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
            MeshBuilder mesh, boolean stator, int i, int j, double theta, double r, double turn, boolean recess) {
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
                openness(stator, z));
    }

    /** How open a place of a face is to the sky: groove floors get less of it. */
    private double openness(boolean stator, double z) {
        if (stator) {
            return 0.8;
        }
        double depth = height(shape.rotorHigh()) - height(shape.rotorLow());
        return depth <= 0 ? 1 : 1 - 0.75 * Math.min(1, Math.max(0, -z / depth));
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
        return java.util.Arrays.copyOf(result, count);
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

    /** The sides of a ring at the two diameters, its far face, and the plane faces where it is cut at two angles. */
    private MeshBuilder cuts(boolean stator, double low, double high, boolean recess) {
        MeshBuilder mesh = new MeshBuilder();
        cells(low, high, (i, j, turn) -> {
            if (j == 0) {
                side(mesh, stator, i, 0, 0, turn, low, high, recess);
            }
            if (j + 1 == grid.cellsRadial()) {
                side(mesh, stator, i, j, j + 1, turn, low, high, recess);
            }
        });
        for (int end = 0; end < 2; end++) {
            double theta = end == 0 ? low : high;
            double side = end == 0 ? -1 : 1;
            double nx = -side * Math.sin(theta - middle);
            double ny = side * Math.cos(theta - middle);
            double far = stator ? top : bottom;
            // A hair inside, so that a cut along a grid line takes the cells within.
            double look = theta - side * 1e-9;
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double[] r = crossings(j, look);
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

    /** Radii of row j, ends included and rising, at which the ray at an angle crosses grid lines. */
    private double[] crossings(int j, double theta) {
        List<Double> radii = new ArrayList<>();
        double r0 = grid.radius(j);
        double r1 = grid.radius(j + 1);
        radii.add(r0);
        radii.add(r1);
        long first = Math.min(grid.intoSector(theta, j, r0), grid.intoSector(theta, j, r1)) - 1;
        long last = Math.max(grid.intoSector(theta, j, r0), grid.intoSector(theta, j, r1)) + 1;
        for (long n = first; n <= last; n++) {
            for (int i = 0; i < grid.ni(); i++) {
                double a = grid.theta(i, j) + n * grid.pitch() - theta;
                double b = grid.theta(i, j + 1) + n * grid.pitch() - theta;
                if (a < 0 != b < 0) {
                    radii.add(r0 + a / (a - b) * (r1 - r0));
                }
            }
        }
        return radii.stream().mapToDouble(Double::doubleValue).sorted().toArray();
    }

    /** Thin rods along the edges of the stator face where the stator is cut away. */
    private MeshBuilder rim() {
        MeshBuilder mesh = new MeshBuilder();
        double radius = 0.0035 * 1e3 * (grid.outerRadius() - grid.innerRadius());
        rod(mesh, grid.innerRadius(), radius);
        rod(mesh, grid.outerRadius(), radius);
        for (double theta : new double[] {from}) {
            int parts = 40;
            double[] line = new double[3 * (parts + 1)];
            for (int n = 0; n <= parts; n++) {
                double r = grid.innerRadius() + (grid.outerRadius() - grid.innerRadius()) * n / parts;
                put(line, n, at(theta, r, height(statorAt(theta, r))));
            }
            Tubes.tube(mesh, line, new double[parts + 1], radius);
        }
        return mesh;
    }

    private void rod(MeshBuilder mesh, double r, double radius) {
        int parts = 60;
        double[] line = new double[3 * (parts + 1)];
        for (int n = 0; n <= parts; n++) {
            double theta = from + (cut - from) * n / parts;
            put(line, n, at(theta, r, height(statorAt(theta, r))));
        }
        double[] open = new double[parts + 1];
        java.util.Arrays.fill(open, 1);
        Tubes.tube(mesh, line, open, radius);
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

    /** The feed as a translucent band at the stator face, where the stator is cut away. */
    private MeshBuilder feedBand() {
        MeshBuilder mesh = new MeshBuilder();
        cells(from, cut, (i, j, turn) -> {
            if (flow.film().feeds(grid.cell(i, j))) {
                patch(mesh, true, i, j, turn, from, cut, false);
            }
        });
        return mesh;
    }

    /** Radius of the tubes of paths (mm): a small share of the film's drawn thickness, but never too thin to see. */
    double tubeRadius() {
        double face = 1e3 * (grid.outerRadius() - grid.innerRadius());
        return Math.max(0.005 * face, Math.min(0.0115 * face, 0.075 * 1e3 * exaggeration * shape.leastThickness()));
    }

    /** A piece of a path inside the part shown. */
    private static final class Piece {
        final List<double[]> points = new ArrayList<>();
        final List<Double> values = new ArrayList<>();

        /** Length of the straight line from its first to its last point (mm). */
        double length() {
            return points.isEmpty() ? 0 : distance(points.get(0), points.get(points.size() - 1));
        }

        private static double distance(double[] a, double[] b) {
            return Math.hypot(Math.hypot(b[0] - a[0], b[1] - a[1]), b[2] - a[2]);
        }

        /** Adds a point, unless it is nearer to the one before than a least distance. */
        void add(double[] point, double value, double least) {
            if (!points.isEmpty()) {
                double distance = distance(points.get(points.size() - 1), point);
                if (distance < least || distance == 0) {
                    return;
                }
            }
            points.add(point);
            values.add(value);
        }
    }

    /**
     * Tubes along the paths, round markers on them at equal times, and a cone at each path's end. A path that leaves the
     * part shown at one angle comes back at the other, in the place that all sectors share.
     *
     * @param paths the paths
     * @param range ends of the speed scale (m/s)
     * @param every time between markers (s)
     */
    List<Scene.Item> paths(List<Path> paths, PictureSettings.Range range, double every) {
        MeshBuilder tubes = new MeshBuilder();
        MeshBuilder markers = new MeshBuilder();
        double radius = tubeRadius();
        for (Path path : paths) {
            List<Piece> pieces = fold(path, range);
            for (Piece piece : pieces) {
                double[] line = new double[3 * piece.points.size()];
                double[] values = new double[piece.points.size()];
                for (int n = 0; n < values.length; n++) {
                    put(line, n, piece.points.get(n));
                    values[n] = piece.values.get(n);
                }
                Tubes.tube(tubes, line, values, radius);
            }
            markers(path, every, markers, 2.3 * radius);
            // A cone longer than the piece it ends would hang in the air.
            if (!pieces.isEmpty() && pieces.get(pieces.size() - 1).length() > 4 * radius) {
                head(path, range, tubes, radius);
            }
        }
        List<Scene.Item> items = new ArrayList<>();
        add(items, tubes, Scene.Material.scaled(ColourScale.SPEED, true));
        add(items, markers, Scene.Material.solid(0xf4f4f2, 0.5));
        return items;
    }

    /** The angle of the part shown that stands for any angle, or NaN where a long sector is not shown there. */
    double folded(double theta) {
        double period = Math.max(to - from, grid.pitch());
        if (to - from < grid.pitch() * (1 - 1e-9)) {
            period = grid.pitch();
        }
        double turns = Math.floor((theta - from) / period);
        double result = theta - turns * period;
        return result <= to + 1e-9 ? result : Double.NaN;
    }

    private List<Piece> fold(Path path, PictureSettings.Range range) {
        List<Piece> pieces = new ArrayList<>();
        Piece piece = null;
        double last = Double.NaN;
        List<PathPoint> points = path.points();
        for (int n = 0; n < points.size(); n++) {
            PathPoint b = points.get(n);
            PathPoint a = n == 0 ? b : points.get(n - 1);
            double turn = b.steadyTheta() - a.steadyTheta();
            int parts = Math.max(1, (int) Math.ceil(Math.abs(turn) / Math.toRadians(0.6)));
            for (int m = n == 0 ? parts : 1; m <= parts; m++) {
                double f = (double) m / parts;
                double theta = folded(a.steadyTheta() + f * turn);
                if (Double.isNaN(theta)) {
                    piece = null;
                    last = Double.NaN;
                    continue;
                }
                if (piece == null || Math.abs(theta - last) > 0.5 * (to - from)) {
                    piece = new Piece();
                    pieces.add(piece);
                }
                double[] point = place(theta, mix(a.radius(), b.radius(), f), mix(a.z(), b.z(), f));
                double value = (mix(a.speed(), b.speed(), f) - range.low()) / (range.high() - range.low());
                boolean end = n + 1 == points.size() && m == parts;
                piece.add(point, value, end ? 0 : 0.8 * tubeRadius());
                last = theta;
            }
        }
        return pieces;
    }

    private static double mix(double a, double b, double f) {
        return a + f * (b - a);
    }

    private void markers(Path path, double every, MeshBuilder mesh, double radius) {
        List<PathPoint> points = path.points();
        int count = 0;
        for (int n = 1; n < points.size(); n++) {
            PathPoint a = points.get(n - 1);
            PathPoint b = points.get(n);
            while (count * every <= b.time()) {
                double f = b.time() > a.time() ? (count * every - a.time()) / (b.time() - a.time()) : 0;
                double theta = folded(mix(a.steadyTheta(), b.steadyTheta(), f));
                if (!Double.isNaN(theta)) {
                    double[] p = place(theta, mix(a.radius(), b.radius(), f), mix(a.z(), b.z(), f));
                    Tubes.ball(mesh, p[0], p[1], p[2], radius, 1);
                }
                count++;
            }
        }
    }

    private void head(Path path, PictureSettings.Range range, MeshBuilder mesh, double radius) {
        List<PathPoint> points = path.points();
        if (points.size() < 2) {
            return;
        }
        PathPoint b = points.get(points.size() - 1);
        int back = points.size() - 2;
        while (back > 0
                && 1e3
                                * Math.hypot(
                                        b.radius() - points.get(back).radius(),
                                        b.radius()
                                                * (b.steadyTheta()
                                                        - points.get(back).steadyTheta()))
                        < radius) {
            back--;
        }
        PathPoint a = points.get(back);
        double theta = folded(b.steadyTheta());
        if (Double.isNaN(theta)) {
            return;
        }
        double[] direction = drawnDirection(
                theta,
                b.radius() - a.radius(),
                0.5 * (a.radius() + b.radius()) * (b.steadyTheta() - a.steadyTheta()),
                b.z() - a.z());
        Tubes.cone(
                mesh,
                place(theta, b.radius(), b.z()),
                direction,
                5.6 * radius,
                2.3 * radius,
                (b.speed() - range.low()) / (range.high() - range.low()));
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
