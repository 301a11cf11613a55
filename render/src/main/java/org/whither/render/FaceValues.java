package org.whither.render;

import java.util.Arrays;
import java.util.Map;
import java.util.Optional;
import org.whither.eddy.AgeMap;
import org.whither.fate.DestinationMap;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;

/** The values of a quantity over one sector of the face, and their meshes. */
final class FaceValues {
    /** Share of the values below the upper end of a range that is not the full one. */
    private static final double NEARLY = 0.98;

    private final FilmShape shape;
    private final FilmFlow flow;
    private final FilmGrid grid;
    private final Quantity quantity;
    private final double turning;
    private final Optional<AgeMap> ages;
    private final int middleLayer;

    FaceValues(FilmShape shape, Quantity quantity, Frame frame, Optional<AgeMap> ages) {
        this.shape = shape;
        this.flow = shape.flow();
        this.grid = shape.grid();
        this.quantity = quantity;
        this.ages = ages;
        this.turning = flow.film().steadyFrameSpeed()
                - frame.angularSpeed(flow.film().conditions().rotationRate());
        int k = 0;
        while (k + 1 < flow.layers() && flow.level(k + 1) <= 0.5) {
            k++;
        }
        this.middleLayer = k;
        if (quantity == Quantity.AGE && ages.isEmpty()) {
            throw new IllegalArgumentException("a plan of the age of the gas without a map of it; expected one");
        }
    }

    /** The value at a point of a cell (SI). */
    double value(int i, int j, double theta, double r) {
        switch (quantity) {
            case PRESSURE:
                return shape.pressure(i, j, theta, r);
            case THICKNESS:
                return flow.thickness(i, j, theta, r);
            case SPEED:
                double[] rates = new double[3];
                flow.rates(i, j, middleLayer, theta, r, 0.5, rates);
                return Math.hypot(rates[1], r * (rates[0] + turning));
            case AGE:
                double age = ages.orElseThrow().at(theta, r, -1);
                return Double.isNaN(age) ? 0 : Math.min(age, ages.get().limit());
            default:
                return 0;
        }
    }

    private double[] sorted() {
        double[] values = new double[4 * grid.cells()];
        int n = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int c = 0; c < 4; c++) {
                    values[n++] = value(i, j, shape.cornerTheta(i, j, c), shape.cornerRadius(j, c));
                }
            }
        }
        Arrays.sort(values);
        return values;
    }

    /** Lowest and highest value at the corners of the cells (SI). */
    PictureSettings.Range range() {
        double[] values = sorted();
        double low = values[0];
        double high = values[values.length - 1];
        double hair = Math.max(1e-9 * Math.abs(high), 1e-12);
        return high > low ? new PictureSettings.Range(low, high) : new PictureSettings.Range(low - hair, high + hair);
    }

    /** The range that a scale has where none is asked for: all of the pressure, and of others nearly all, from 0. */
    PictureSettings.Range roundRange() {
        if (quantity == Quantity.PRESSURE) {
            return shape.pressureRange();
        }
        double[] values = sorted();
        double high = quantity == Quantity.THICKNESS
                ? values[values.length - 1]
                : values[(int) (NEARLY * (values.length - 1))];
        double unit = quantity.unit();
        double step = Ticks.step(Math.max(1e-9, high * unit), 8);
        return new PictureSettings.Range(0, Math.max(step, step * Math.ceil(high * unit / step - 1e-9)) / unit);
    }

    /**
     * One sector as a mesh in the plane of a chart.
     *
     * @param range ends of the colour scale (SI)
     */
    Mesh mesh(Chart chart, PictureSettings.Range range) {
        MeshBuilder mesh = new MeshBuilder();
        double radial = (grid.outerRadius() - grid.innerRadius()) / (quantity == Quantity.AGE ? 80 : 24);
        double span = range.high() - range.low();
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double r0 = grid.radius(j);
                double r1 = grid.radius(j + 1);
                double wide = Math.max(
                        grid.theta(i + 1, j) - grid.theta(i, j), grid.theta(i + 1, j + 1) - grid.theta(i, j + 1));
                int across = (int) Math.ceil(wide / Math.toRadians(quantity == Quantity.AGE ? 0.5 : 1.5));
                int along = (int) Math.ceil((r1 - r0) / radial);
                int first = -1;
                for (int b = 0; b <= along; b++) {
                    double r = r0 + (r1 - r0) * b / along;
                    double from = grid.lineTheta(i, j, r);
                    double to = grid.lineTheta(i + 1, j, r);
                    for (int a = 0; a <= across; a++) {
                        double theta = from + (to - from) * a / across;
                        double value = (value(i, j, theta, r) - range.low()) / span;
                        int n = mesh.vertex(chart.x(theta, r), chart.y(theta, r), 0, 0, 0, 1, value);
                        first = first < 0 ? n : first;
                        if (a > 0 && b > 0) {
                            mesh.quad(n - across - 2, n - across - 1, n, n - 1);
                        }
                    }
                }
            }
        }
        return mesh.build();
    }

    /** One sector as a mesh for each destination, of the cells of a map. */
    void destinations(Chart chart, DestinationMap map, Map<org.whither.fate.Destination, MeshBuilder> meshes) {
        double width = grid.pitch() / map.phases();
        double height = (grid.outerRadius() - grid.innerRadius()) / map.radii();
        int parts = (int) Math.max(1, Math.ceil(width / Math.toRadians(1)));
        for (int q = 0; q < map.radii(); q++) {
            double r0 = map.radius(q) - 0.5 * height;
            double r1 = map.radius(q) + 0.5 * height;
            for (int p = 0; p < map.phases(); p++) {
                MeshBuilder mesh = meshes.computeIfAbsent(map.destination(p, q), key -> new MeshBuilder());
                int before = -1;
                for (int n = 0; n <= parts; n++) {
                    double f = (p + (double) n / parts) / map.phases() * grid.pitch();
                    double t0 = grid.lineTheta(0, grid.row(r0), Math.max(grid.innerRadius(), r0)) + f;
                    double t1 = grid.lineTheta(0, grid.row(r1), Math.min(grid.outerRadius(), r1)) + f;
                    int at = mesh.vertex(chart.x(t0, r0), chart.y(t0, r0), 0, 0, 0, 1, 0);
                    mesh.vertex(chart.x(t1, r1), chart.y(t1, r1), 0, 0, 0, 1, 0);
                    if (before >= 0) {
                        mesh.quad(before, before + 1, at + 1, at);
                    }
                    before = at;
                }
            }
        }
    }
}
