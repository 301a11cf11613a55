package org.whither.render;

import java.util.ArrayList;
import java.util.HashMap;
import java.util.List;
import java.util.Map;
import org.whither.film.Face;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * The two rings of a seal as meshes for other programs to show, with lengths across the film drawn too large.
 *
 * <p>Right-handed coordinates in m: x and y in the plane of the faces, at angle 0 along x; z along the shaft, measured from
 * the highest point of the rotor face and multiplied by the exaggeration. Meshes are those of one sector; the others are
 * the same turned about z. No OpenGL is needed.
 */
public final class SealModel {
    /** Depth of the rotor below its deepest groove, as a share of the face's width. */
    private static final double BODY = 0.12;

    /** Steps of the face smaller than this are rounding (m). */
    private static final double STEP = 1e-12;

    private static final float NO_VALUE = 1;

    /**
     * A part of the scene. The arrays are handed out without a copy; nobody may write to them.
     *
     * @param name what it is
     * @param positions x, y, z of each vertex (m)
     * @param normals unit normal of each vertex
     * @param values position of each vertex on the speed scale, 0 … 1; of a meaning for paths only
     * @param triangles three vertex numbers a triangle, anticlockwise seen from where the normals point
     * @param colour its colour, sRGB 0xRRGGBB
     * @param opacity 1 hides what is behind
     */
    public record Part(
            String name,
            float[] positions,
            float[] normals,
            float[] values,
            int[] triangles,
            int colour,
            double opacity) {}

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final double exaggeration;
    private final double datum;
    private final double base;
    private final double tube;

    /**
     * A model.
     *
     * @param flow the film
     * @param exaggeration factor on lengths across the film, above 0
     */
    public SealModel(FilmFlow flow, double exaggeration) {
        FilmShape shape = new FilmShape(flow);
        this.flow = flow;
        this.grid = flow.film().grid();
        this.exaggeration = exaggeration;
        this.datum = shape.rotorHigh();
        double face = grid.outerRadius() - grid.innerRadius();
        this.base = height(shape.rotorLow()) - BODY * face;
        this.tube = Math.max(0.004 * face, Math.min(0.008 * face, 0.05 * exaggeration * shape.leastThickness()));
    }

    /** The drawn height of a height along the shaft (m). */
    public double height(double z) {
        return exaggeration * (z - datum);
    }

    /** The height along the shaft that is drawn at 0 (m). */
    public double datum() {
        return datum;
    }

    /** The colour of a place on the speed scale, sRGB 0xRRGGBB. */
    public static int speedColour(double fraction) {
        return ColourScale.SPEED.colour(fraction);
    }

    /** The source of the speed scale's colours. */
    public static String speedScaleSource() {
        return "imola, F. Crameri, Scientific colour maps, doi:10.5281/zenodo.1243862";
    }

    /** The parts of one sector: the rotor, the stator's face, and the feed where there is one. */
    public List<Part> sector() {
        List<Part> parts = new ArrayList<>();
        boolean feedInStator =
                flow.film().supply().isPresent() && flow.film().supply().get().face() == Face.STATOR;
        boolean feedInRotor = flow.film().supply().isPresent() && !feedInStator;
        Surface rotor = new Surface(false);
        Surface stator = new Surface(true);
        Surface feed = new Surface(feedInStator);
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                boolean feeds = flow.film().feeds(grid.cell(i, j));
                (feeds && feedInRotor ? feed : rotor).cell(i, j);
                (feeds && feedInStator ? feed : stator).cell(i, j);
                rotor.walls(i, j);
                stator.walls(i, j);
            }
        }
        rotor.body();
        parts.add(rotor.part("rotor", GapScene.ROTOR, 1));
        parts.add(stator.part("stator", GapScene.STATOR, 0.28));
        if (!feed.mesh.isEmpty()) {
            parts.add(feed.part("feed", GapScene.FEED, feedInStator ? 0.6 : 1));
        }
        return parts;
    }

    /**
     * A path as a tube.
     *
     * @param name its name
     * @param points θ (rad), radius (m), height along the shaft (m) and position on the speed scale of each point; not
     *     modified
     * @return the tube, or null where the path is too short to be seen
     */
    public Part path(String name, List<double[]> points) {
        double[] line = new double[3 * points.size()];
        double[] values = new double[points.size()];
        int count = 0;
        for (int n = 0; n < values.length; n++) {
            double[] point = points.get(n);
            double x = point[1] * Math.cos(point[0]);
            double y = point[1] * Math.sin(point[0]);
            double z = height(point[2]);
            boolean last = n + 1 == values.length;
            if (count > 0 && last && count > 1 && near(line, count - 1, x, y, z)) {
                count--; // the last point replaces one that is too near
            }
            if (count == 0 || last || !near(line, count - 1, x, y, z)) {
                line[3 * count] = x;
                line[3 * count + 1] = y;
                line[3 * count + 2] = z;
                values[count++] = point[3];
            }
        }
        if (count < 2) {
            return null;
        }
        MeshBuilder mesh = new MeshBuilder();
        Tubes.tube(mesh, java.util.Arrays.copyOf(line, 3 * count), java.util.Arrays.copyOf(values, count), tube);
        return part(name, mesh.build(), ColourScale.SPEED.colour(0.5), 1);
    }

    private boolean near(double[] line, int n, double x, double y, double z) {
        return Math.hypot(Math.hypot(line[3 * n] - x, line[3 * n + 1] - y), line[3 * n + 2] - z) < 0.5 * tube;
    }

    private static Part part(String name, Mesh mesh, int colour, double opacity) {
        int[] triangles = mesh.triangles();
        for (int n = 0; n < triangles.length; n += 3) {
            turn(triangles, n, mesh.positions(), mesh.normals());
        }
        return new Part(name, mesh.positions(), mesh.normals(), mesh.values(), triangles, colour, opacity);
    }

    /** Puts the corners of a triangle in the order that its normals ask for. */
    private static void turn(int[] triangles, int n, float[] p, float[] normals) {
        int a = 3 * triangles[n];
        int b = 3 * triangles[n + 1];
        int c = 3 * triangles[n + 2];
        double[] u = {p[b] - p[a], p[b + 1] - p[a + 1], p[b + 2] - p[a + 2]};
        double[] v = {p[c] - p[a], p[c + 1] - p[a + 1], p[c + 2] - p[a + 2]};
        double[] w = cross(u, v);
        double along = 0;
        for (int k = 0; k < 3; k++) {
            along += w[k] * ((double) normals[a + k] + normals[b + k] + normals[c + k]);
        }
        if (along < 0) {
            int swap = triangles[n + 1];
            triangles[n + 1] = triangles[n + 2];
            triangles[n + 2] = swap;
        }
    }

    private static double[] cross(double[] u, double[] v) {
        return new double[] {u[1] * v[2] - u[2] * v[1], u[2] * v[0] - u[0] * v[2], u[0] * v[1] - u[1] * v[0]};
    }

    /** One of the two faces; vertices where cells meet at one height are shared, and steps become walls. */
    private final class Surface {
        private final boolean stator;
        private final MeshBuilder mesh = new MeshBuilder();
        private final Map<String, Integer> corners = new HashMap<>();
        private final Map<String, double[]> normals = new HashMap<>();

        Surface(boolean stator) {
            this.stator = stator;
            for (int i = 0; i < grid.cellsTheta(); i++) {
                for (int j = 0; j < grid.cellsRadial(); j++) {
                    addNormals(i, j);
                }
            }
        }

        Part part(String name, int colour, double opacity) {
            return SealModel.part(name, mesh.build(), colour, opacity);
        }

        /** Height of the face at corner c of a cell; corners run (i, j), (i + 1, j), (i + 1, j + 1), (i, j + 1) (m). */
        private double z(int i, int j, int c) {
            double theta = theta(i, j, c);
            double r = radius(j, c);
            double rotor = flow.rotorZ(i, j, theta, r);
            return stator ? rotor + flow.thickness(i, j, theta, r) : rotor;
        }

        private double theta(int i, int j, int c) {
            return grid.theta(i + (c == 1 || c == 2 ? 1 : 0), j + (c >= 2 ? 1 : 0));
        }

        private double radius(int j, int c) {
            return grid.radius(j + (c >= 2 ? 1 : 0));
        }

        private double[] corner(int i, int j, int c) {
            double theta = theta(i, j, c);
            double r = radius(j, c);
            return new double[] {r * Math.cos(theta), r * Math.sin(theta), height(z(i, j, c))};
        }

        /** Names a corner by its node, the seam closed, and its height. */
        private String key(int i, int j, int c, boolean seam) {
            int line = i + (c == 1 || c == 2 ? 1 : 0);
            int ring = j + (c >= 2 ? 1 : 0);
            return (seam ? line % grid.cellsTheta() : line) + " " + ring + " " + Math.round(z(i, j, c) / STEP);
        }

        /** Adds the normal of a cell to those of its corners, as components along r, θ and z at each corner. */
        private void addNormals(int i, int j) {
            double[] p = corner(i, j, 0);
            double[] q = corner(i, j, 2);
            double[] s = corner(i, j, 1);
            double[] t = corner(i, j, 3);
            double[] n = cross(
                    new double[] {q[0] - p[0], q[1] - p[1], q[2] - p[2]},
                    new double[] {t[0] - s[0], t[1] - s[1], t[2] - s[2]});
            double way = (n[2] > 0) == stator ? -1 : 1; // towards the film
            for (int c = 0; c < 4; c++) {
                double cos = Math.cos(theta(i, j, c));
                double sin = Math.sin(theta(i, j, c));
                double[] sum = normals.computeIfAbsent(key(i, j, c, true), name -> new double[3]);
                sum[0] += way * (n[0] * cos + n[1] * sin);
                sum[1] += way * (n[1] * cos - n[0] * sin);
                sum[2] += way * n[2];
            }
        }

        void cell(int i, int j) {
            int[] at = new int[4];
            for (int c = 0; c < 4; c++) {
                int corner = c;
                at[c] = corners.computeIfAbsent(key(i, j, c, false), name -> add(i, j, corner));
            }
            mesh.quad(at[0], at[1], at[2], at[3]);
        }

        private int add(int i, int j, int c) {
            double[] p = corner(i, j, c);
            double[] n = normals.get(key(i, j, c, true));
            double length = Math.sqrt(n[0] * n[0] + n[1] * n[1] + n[2] * n[2]);
            double cos = Math.cos(theta(i, j, c));
            double sin = Math.sin(theta(i, j, c));
            return mesh.vertex(
                    p[0],
                    p[1],
                    p[2],
                    (n[0] * cos - n[1] * sin) / length,
                    (n[0] * sin + n[1] * cos) / length,
                    n[2] / length,
                    NO_VALUE);
        }

        /** The walls where the face steps between a cell and those before it in θ and in r. */
        void walls(int i, int j) {
            int before = i == 0 ? grid.cellsTheta() - 1 : i - 1;
            double[] here = {z(i, j, 0), z(i, j, 3)};
            double[] there = {z(before, j, 1), z(before, j, 2)};
            wall(corner(i, j, 0), corner(i, j, 3), here, there, tangent(corner(i, j, 0), corner(i, j, 3)));
            if (j > 0) {
                double[] up = {z(i, j, 0), z(i, j, 1)};
                double[] down = {z(i, j - 1, 3), z(i, j - 1, 2)};
                double middle = 0.5 * (theta(i, j, 0) + theta(i, j, 1));
                wall(corner(i, j, 0), corner(i, j, 1), up, down, new double[] {Math.cos(middle), Math.sin(middle), 0});
            }
        }

        /** The level direction across a line of the grid, towards rising θ. */
        private double[] tangent(double[] a, double[] b) {
            double x = -(b[1] - a[1]);
            double y = b[0] - a[0];
            double length = Math.hypot(x, y);
            return new double[] {x / length, y / length, 0};
        }

        /**
         * A wall over the line from a to b between the height here and the height there, the cell on the side against the
         * direction. The wall faces the side where the film is thicker.
         */
        private void wall(double[] a, double[] b, double[] here, double[] there, double[] direction) {
            if (Math.abs(here[0] - there[0]) <= STEP && Math.abs(here[1] - there[1]) <= STEP) {
                return;
            }
            double rise = here[0] + here[1] - there[0] - there[1];
            double way = (rise > 0) == stator ? 1 : -1;
            double nx = way * direction[0];
            double ny = way * direction[1];
            int p = mesh.vertex(a[0], a[1], height(here[0]), nx, ny, 0, NO_VALUE);
            int q = mesh.vertex(b[0], b[1], height(here[1]), nx, ny, 0, NO_VALUE);
            int s = mesh.vertex(b[0], b[1], height(there[1]), nx, ny, 0, NO_VALUE);
            int t = mesh.vertex(a[0], a[1], height(there[0]), nx, ny, 0, NO_VALUE);
            mesh.quad(p, q, s, t);
        }

        /** The rest of the rotor: its two rims and its underside. */
        void body() {
            for (int i = 0; i < grid.cellsTheta(); i++) {
                int last = grid.cellsRadial() - 1;
                rim(corner(i, 0, 0), corner(i, 0, 1), -1);
                rim(corner(i, last, 3), corner(i, last, 2), 1);
                double[][] under = {corner(i, 0, 0), corner(i, 0, 1), corner(i, last, 2), corner(i, last, 3)};
                int[] at = new int[4];
                for (int c = 0; c < 4; c++) {
                    at[c] = mesh.vertex(under[c][0], under[c][1], base, 0, 0, -1, NO_VALUE);
                }
                mesh.quad(at[0], at[1], at[2], at[3]);
            }
        }

        private void rim(double[] a, double[] b, int way) {
            double ra = way / Math.hypot(a[0], a[1]);
            double rb = way / Math.hypot(b[0], b[1]);
            int p = mesh.vertex(a[0], a[1], a[2], ra * a[0], ra * a[1], 0, NO_VALUE);
            int q = mesh.vertex(b[0], b[1], b[2], rb * b[0], rb * b[1], 0, NO_VALUE);
            int s = mesh.vertex(b[0], b[1], base, rb * b[0], rb * b[1], 0, NO_VALUE);
            int t = mesh.vertex(a[0], a[1], base, ra * a[0], ra * a[1], 0, NO_VALUE);
            mesh.quad(p, q, s, t);
        }
    }
}
