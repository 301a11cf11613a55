package org.whither.render;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.whither.film.FilmGrid;
import org.whither.trace.Path;
import org.whither.trace.PathPoint;

/**
 * The film pressure as height over the ring, or over some of its sectors, as a scene: plain data that stills, animations
 * and a window can all draw. Its meshes are built once, in the constructor; a frame of an animation needs another
 * {@link Camera} and nothing else, and whatever moves is a {@link Scene.Item} that is shifted.
 *
 * <p>Coordinates in mm: x and y in the plane of the faces, θ = 0 along x, seen from the stator; z is the height of the
 * pressure above that of the base plane. The surface joins the pressures at the nodes of the grid. Normals are those of
 * the drawn surface.
 */
final class ReliefScene {
    private static final int SIDE = 0x8a8f96;
    private static final int LINE = 0x14181c;

    /** Longest step round the shaft of the drawn surface, and of a tube (rad). */
    private static final double STEP = Math.toRadians(1);

    private final FilmShape shape;
    private final FilmGrid grid;
    private final double base;
    private final double millimetrePerPascal;
    private final int sectors;
    private final int fine;
    private final int columns;
    /** Drawn height at each point of the lattice over one sector, the last line included; columns × nj (mm). */
    private final double[] heights;

    private final double low;
    private final double high;
    private final List<Scene.Item> surface;
    private final List<Scene.Item> lines;

    /**
     * A relief.
     *
     * @param shape the film's shape
     * @param range ends of the colour scale; its low end is the height of the base plane (Pa)
     * @param barPerMillimetre pressure for one mm of height (bar/mm)
     * @param sectors how many sectors are shown, counted from the grid's own; all of them: the whole ring
     */
    ReliefScene(FilmShape shape, PictureSettings.Range range, double barPerMillimetre, int sectors) {
        this.shape = shape;
        this.grid = shape.grid();
        this.base = range.low();
        this.millimetrePerPascal = 1e-5 / barPerMillimetre;
        this.sectors = Math.min(sectors, grid.sectors());
        this.fine = Math.max(1, (int) Math.ceil(grid.pitch() / grid.cellsTheta() / STEP));
        this.columns = grid.cellsTheta() * fine + 1;
        double[] pressures = shape.nodePressures();
        this.heights = new double[columns * grid.nj()];
        double least = Double.POSITIVE_INFINITY;
        double most = Double.NEGATIVE_INFINITY;
        for (int c = 0; c < columns; c++) {
            int i = Math.min(c / fine, grid.cellsTheta() - 1);
            double f = (double) (c - i * fine) / fine;
            for (int j = 0; j < grid.nj(); j++) {
                double a = pressures[grid.node(i, j)];
                double b = pressures[grid.node(i + 1, j)];
                double z = height(a + f * (b - a));
                heights[c * grid.nj() + j] = z;
                least = Math.min(least, z);
                most = Math.max(most, z);
            }
        }
        this.high = most;
        double face = 1e3 * (grid.outerRadius() - grid.innerRadius());
        this.low = Math.min(0, least) - 0.12 * face;
        this.surface = List.copyOf(build(range));
        this.lines = List.copyOf(buildLines());
    }

    /** Whether the whole ring is shown. */
    boolean whole() {
        return sectors == grid.sectors();
    }

    /** Drawn height of a pressure (mm). */
    double height(double pressure) {
        return millimetrePerPascal * (pressure - base);
    }

    /** Pressure for one mm of height (bar/mm). */
    double barPerMillimetre() {
        return 1e-5 / millimetrePerPascal;
    }

    /** Lowest and highest drawn z (mm). */
    double bottom() {
        return low;
    }

    double top() {
        return high;
    }

    /** Angle of the middle of what is shown, at the middle radius (rad). */
    double middle() {
        double r = 0.5 * (grid.innerRadius() + grid.outerRadius());
        return grid.lineTheta(0, grid.row(r), r) + 0.5 * sectors * grid.pitch();
    }

    /** Drawn height of the surface at any angle of the film and radius (mm). */
    double heightAt(double theta, double r) {
        double within = inside(r);
        int j = grid.row(within);
        double t = theta - grid.intoSector(theta, j, within) * grid.pitch();
        int i = grid.column(t, j, within);
        double from = grid.lineTheta(i, j, within);
        double a = (t - from) / (grid.lineTheta(i + 1, j, within) - from);
        double b = (within - grid.radius(j)) / (grid.radius(j + 1) - grid.radius(j));
        double c = Math.max(0, Math.min(columns - 1.0, (i + a) * fine));
        int column = Math.min(columns - 2, (int) c);
        double f = c - column;
        int n = column * grid.nj() + j;
        int m = n + grid.nj();
        return (1 - f) * ((1 - b) * heights[n] + b * heights[n + 1]) + f * ((1 - b) * heights[m] + b * heights[m + 1]);
    }

    /**
     * The drawn place of a point on the surface, or over it: x, y, z (mm).
     *
     * @param theta angle in the frame in which the film is steady (rad)
     * @param r radius (m)
     * @param lift height over the surface (mm)
     */
    double[] place(double theta, double r, double lift) {
        return new double[] {1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), heightAt(theta, r) + lift};
    }

    /** Points that a camera must see: the body's rims, at its foot and at the surface; x, y, z (mm). */
    List<double[]> extent() {
        List<double[]> points = new ArrayList<>();
        int steps = whole() ? 72 : 24;
        for (int end = 0; end < 2; end++) {
            int j = end == 0 ? 0 : grid.nj() - 1;
            double r = grid.radius(j);
            for (int n = 0; n <= steps; n++) {
                double theta = grid.theta(0, j) + sectors * grid.pitch() * n / steps;
                points.add(new double[] {1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), low});
                points.add(place(theta, r, 0));
            }
        }
        for (int end = 0; end < 2 && !whole(); end++) {
            for (int j = 0; j < grid.nj(); j++) {
                double theta = grid.theta(0, j) + end * sectors * grid.pitch();
                double r = 1e3 * grid.radius(j);
                points.add(new double[] {r * Math.cos(theta), r * Math.sin(theta), low});
            }
        }
        double r = 0.5 * (grid.innerRadius() + grid.outerRadius());
        for (int n = 0; n <= steps; n++) {
            double theta = grid.lineTheta(0, grid.row(r), r) + sectors * grid.pitch() * n / steps;
            points.add(new double[] {1e3 * r * Math.cos(theta), 1e3 * r * Math.sin(theta), high});
        }
        return points;
    }

    /** The surface and the sides of the body. */
    List<Scene.Item> surface() {
        return surface;
    }

    /** Edges of the grooves and of the feed, laid on the surface. */
    List<Scene.Item> lines() {
        return lines;
    }

    private List<Scene.Item> build(PictureSettings.Range range) {
        List<Scene.Item> items = new ArrayList<>();
        Mesh mesh = surfaceMesh(range);
        Mesh sides = sideMesh();
        Scene.Material scaled = new Scene.Material(0, ColourScale.PRESSURE, true, 0.06, 1);
        Scene.Material side = Scene.Material.solid(SIDE, 0.05);
        for (int n = 0; n < sectors; n++) {
            items.add(new Scene.Item(mesh, scaled, n * grid.pitch()));
            items.add(new Scene.Item(sides, side, n * grid.pitch()));
        }
        if (!whole()) {
            items.add(new Scene.Item(endMesh(), side, 0));
        }
        return items;
    }

    /** A point of the lattice, also of columns before and after the sector: x, y, z (mm). */
    private void point(int c, int j, double[] result) {
        int per = columns - 1;
        int turns = Math.floorDiv(c, per);
        int within = c - turns * per;
        int i = within / fine;
        double f = (double) (within - i * fine) / fine;
        double a = grid.theta(i, j);
        double theta = a + f * (grid.theta(i + 1, j) - a) + turns * grid.pitch();
        double r = 1e3 * grid.radius(j);
        result[0] = r * Math.cos(theta);
        result[1] = r * Math.sin(theta);
        result[2] = heights[within * grid.nj() + j];
    }

    private Mesh surfaceMesh(PictureSettings.Range range) {
        MeshBuilder mesh = new MeshBuilder();
        int rows = grid.nj();
        double[] p = new double[3];
        double[] a = new double[3];
        double[] b = new double[3];
        double[] d = new double[3];
        double[] e = new double[3];
        double scale = 1 / (millimetrePerPascal * (range.high() - range.low()));
        for (int c = 0; c < columns; c++) {
            for (int j = 0; j < rows; j++) {
                point(c, j, p);
                point(c - 1, j, a);
                point(c + 1, j, b);
                point(c, Math.max(0, j - 1), d);
                point(c, Math.min(rows - 1, j + 1), e);
                // Outwards × along +θ points up.
                double ux = e[0] - d[0];
                double uy = e[1] - d[1];
                double uz = e[2] - d[2];
                double vx = b[0] - a[0];
                double vy = b[1] - a[1];
                double vz = b[2] - a[2];
                double nx = uy * vz - uz * vy;
                double ny = uz * vx - ux * vz;
                double nz = ux * vy - uy * vx;
                double length = Math.sqrt(nx * nx + ny * ny + nz * nz);
                int n = mesh.vertex(p[0], p[1], p[2], nx / length, ny / length, nz / length, p[2] * scale);
                if (c > 0 && j > 0) {
                    mesh.quad(n - rows - 1, n - rows, n, n - 1);
                }
            }
        }
        return mesh.build();
    }

    /** The sides of the body at the two diameters, of one sector. */
    private Mesh sideMesh() {
        MeshBuilder mesh = new MeshBuilder();
        double[] p = new double[3];
        for (int j : new int[] {0, grid.nj() - 1}) {
            double sign = j == 0 ? -1 : 1;
            for (int c = 0; c < columns; c++) {
                point(c, j, p);
                double r = Math.hypot(p[0], p[1]);
                int n = mesh.vertex(p[0], p[1], p[2], sign * p[0] / r, sign * p[1] / r, 0, 1);
                mesh.vertex(p[0], p[1], low, sign * p[0] / r, sign * p[1] / r, 0, 0.55);
                if (c > 0) {
                    mesh.quad(n - 2, n - 1, n + 1, n);
                }
            }
        }
        return mesh.build();
    }

    /** The plane ends of a part of the ring. */
    private Mesh endMesh() {
        MeshBuilder mesh = new MeshBuilder();
        double[] p = new double[3];
        double[] q = new double[3];
        for (int end = 0; end < 2; end++) {
            int c = end == 0 ? 0 : sectors * (columns - 1);
            for (int j = 0; j + 1 < grid.nj(); j++) {
                point(c, j, p);
                point(c, j + 1, q);
                double nx = q[1] - p[1];
                double ny = p[0] - q[0];
                double length = (end == 0 ? 1 : -1) * Math.hypot(nx, ny);
                int a = mesh.vertex(p[0], p[1], p[2], nx / length, ny / length, 0, 1);
                int b = mesh.vertex(q[0], q[1], q[2], nx / length, ny / length, 0, 1);
                int d = mesh.vertex(q[0], q[1], low, nx / length, ny / length, 0, 0.55);
                int e = mesh.vertex(p[0], p[1], low, nx / length, ny / length, 0, 0.55);
                mesh.quad(a, b, d, e);
            }
        }
        return mesh.build();
    }

    private List<Scene.Item> buildLines() {
        MeshBuilder mesh = new MeshBuilder();
        double radius = lineRadius();
        for (FilmShape.Edge edge : shape.grooveEdges()) {
            segment(mesh, edge.theta0(), edge.r0(), edge.theta1(), edge.r1(), radius);
        }
        FilmShape.Band feed = shape.feed();
        if (feed != null && shape.feedEdges().isEmpty()) {
            double dash = 0.012 * grid.outerRadius();
            for (double r : new double[] {feed.from(), feed.to()}) {
                int dashes = (int) Math.max(1, Math.rint(grid.pitch() * r / (2 * dash)));
                double start = grid.lineTheta(0, grid.row(r), r);
                for (int n = 0; n < dashes; n++) {
                    double t = start + (n + 0.25) * grid.pitch() / dashes;
                    segment(mesh, t, r, t + 0.5 * grid.pitch() / dashes, r, radius);
                }
            }
        }
        for (FilmShape.Edge edge : shape.feedEdges()) {
            segment(mesh, edge.theta0(), edge.r0(), edge.theta1(), edge.r1(), radius);
        }
        List<Scene.Item> items = new ArrayList<>();
        if (!mesh.isEmpty()) {
            Mesh built = mesh.build();
            for (int n = 0; n < sectors; n++) {
                items.add(new Scene.Item(built, Scene.Material.plain(LINE, 1), n * grid.pitch()));
            }
        }
        return items;
    }

    /** Radius of the lines on the surface (mm): of a ring and of a few sectors about equally wide in the picture. */
    private double lineRadius() {
        return (whole() ? 0.0012 : 0.0007) * 1e3 * grid.outerRadius();
    }

    private void segment(MeshBuilder mesh, double t0, double r0, double t1, double r1, double radius) {
        int parts = 1 + (int) (Math.abs(t1 - t0) / (0.5 * STEP));
        double[] a = place(t0, r0, radius);
        for (int n = 1; n <= parts; n++) {
            double f = (double) n / parts;
            double[] b = place(t0 + f * (t1 - t0), r0 + f * (r1 - r0), radius);
            Tubes.bar(mesh, a, b, radius);
            a = b;
        }
    }

    /** Radius of the tubes of paths (mm). */
    double tubeRadius() {
        return (whole() ? 0.0052 : 0.0031) * 1e3 * grid.outerRadius();
    }

    /**
     * Tubes along paths, laid on the surface, coloured by speed.
     *
     * @param paths the paths
     * @param range ends of the speed scale (m/s)
     */
    List<Scene.Item> tubes(List<Path> paths, PictureSettings.Range range) {
        MeshBuilder mesh = new MeshBuilder();
        for (Path path : paths) {
            double[][] line = line(path, range);
            Tubes.tube(mesh, line[0], line[1], tubeRadius());
        }
        return mesh.isEmpty()
                ? List.of()
                : List.of(new Scene.Item(mesh.build(), Scene.Material.scaled(ColourScale.SPEED, true), 0));
    }

    /** The drawn points of a path, x, y, z in turn, and the place of each point's speed on the scale. */
    double[][] line(Path path, PictureSettings.Range range) {
        double least = 0.5 * tubeRadius();
        double[] xyz = new double[3 * 256];
        double[] values = new double[256];
        int count = 0;
        List<PathPoint> points = path.points();
        double shift = shift(path);
        for (int n = 0; n < points.size(); n++) {
            PathPoint b = points.get(n);
            PathPoint a = points.get(Math.max(0, n - 1));
            double turn = b.steadyTheta() - a.steadyTheta();
            int parts = Math.max(1, (int) Math.ceil(Math.abs(turn) / STEP));
            for (int m = 1; m <= parts; m++) {
                double f = (double) m / parts;
                double theta = a.steadyTheta() + f * turn + shift;
                double r = ShownPath.mix(a.radius(), b.radius(), f);
                if (!shown(theta, r)) {
                    return new double[][] {Arrays.copyOf(xyz, 3 * count), Arrays.copyOf(values, count)};
                }
                double[] p = place(theta, r, 0.8 * tubeRadius());
                boolean last = n + 1 == points.size() && m == parts;
                int at = 3 * count;
                boolean near = count > 0
                        && Math.hypot(Math.hypot(p[0] - xyz[at - 3], p[1] - xyz[at - 2]), p[2] - xyz[at - 1]) < least;
                if (near && !last) {
                    continue;
                }
                if (near && count > 1) {
                    count--;
                }
                if (count == values.length) {
                    xyz = Arrays.copyOf(xyz, 2 * xyz.length);
                    values = Arrays.copyOf(values, 2 * count);
                }
                System.arraycopy(p, 0, xyz, 3 * count, 3);
                double speed = ShownPath.mix(a.speed(), b.speed(), f);
                values[count++] = (speed - range.low()) / (range.high() - range.low());
            }
        }
        return new double[][] {Arrays.copyOf(xyz, 3 * count), Arrays.copyOf(values, count)};
    }

    /**
     * How far a path is turned, by whole sectors, so that it starts in the part that is shown, at the end it comes from;
     * of the whole ring not at all (rad).
     */
    double shift(Path path) {
        List<PathPoint> points = path.points();
        if (whole() || points.isEmpty()) {
            return 0;
        }
        PathPoint first = points.get(0);
        boolean falling = points.get(points.size() - 1).steadyTheta() < first.steadyTheta();
        double r = inside(first.radius());
        double turns = -grid.intoSector(first.steadyTheta(), grid.row(r), r);
        return (turns + (falling ? sectors - 1 : 0)) * grid.pitch();
    }

    /** Whether a place of the ring is shown. */
    private boolean shown(double theta, double r) {
        if (whole()) {
            return true;
        }
        double within = inside(r);
        double along = theta - grid.lineTheta(0, grid.row(within), within);
        return along >= -1e-9 && along <= sectors * grid.pitch() + 1e-9;
    }

    private double inside(double r) {
        return Math.max(grid.innerRadius(), Math.min(grid.outerRadius(), r));
    }

    /** Whether a path leaves the part that is shown before its end. */
    boolean goesOn(Path path) {
        double shift = shift(path);
        return path.points().stream().anyMatch(p -> !shown(p.steadyTheta() + shift, p.radius()));
    }

    /** Whether a place is hidden by the surface (mm). */
    boolean hidden(double[] place, double[] eye) {
        double[] way = new double[3];
        double length = 0;
        for (int c = 0; c < 3; c++) {
            way[c] = eye[c] - place[c];
            length += way[c] * way[c];
        }
        length = Math.sqrt(length);
        double step = 4e-3 * 1e3 * grid.outerRadius();
        for (double s = 2 * step; s < length; s += step) {
            double x = place[0] + s * way[0] / length;
            double y = place[1] + s * way[1] / length;
            double z = place[2] + s * way[2] / length;
            if (z > high) {
                return false;
            }
            double r = 1e-3 * Math.hypot(x, y);
            double theta = Math.atan2(y, x);
            double middle = middle();
            theta += 2 * Math.PI * Math.rint((middle - theta) / (2 * Math.PI));
            boolean over = r > grid.innerRadius() && r < grid.outerRadius() && shown(theta, r);
            if (over && z > low && z < heightAt(theta, r)) {
                return true;
            }
        }
        return false;
    }
}
