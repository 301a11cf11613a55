package org.whither.eddy;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.LUDecomposition;
import org.apache.commons.math3.linear.RealMatrix;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * Where the flow stands still, seen from the frame in which the film is steady: the gas itself, the mean flow of the
 * columns, and the mean over the ring.
 *
 * <p>A flow that conserves mass cell by cell jumps along the borders of its cells, so that gas may turn round a corner of
 * cells at which no rate is zero. The mass fluxes at a node are therefore the mean of those of the pieces around it, and
 * are linear between the nodes: a continuous field, whose zeros can all be found.
 */
final class StillPoints {
    /** Heights at which the profile of a layer is looked at; more where there is but one layer. */
    private static final int OF_LAYER = 2;

    private static final int OF_ONE_LAYER = 16;

    private static final double GAUSS = 0.5 * Math.sqrt(0.6);
    private static final double[] GAUSS_AT = {0.5 - GAUSS, 0.5, 0.5 + GAUSS};
    private static final double[] GAUSS_WEIGHT = {5.0 / 18, 8.0 / 18, 5.0 / 18};
    /** As in {@link PlaneField}. */
    private static final double STILL = 1e-9;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final double[] heights;
    private final int[] layer;
    private final List<CriticalPoint> points = new ArrayList<>();
    private final List<Separatrix> separatrices = new ArrayList<>();

    StillPoints(FilmFlow flow) {
        this.flow = flow;
        this.grid = flow.film().grid();
        int each = flow.layers() == 1 ? OF_ONE_LAYER : OF_LAYER;
        heights = new double[flow.layers() * each];
        layer = new int[heights.length];
        for (int n = 0; n < heights.length; n++) {
            layer[n] = n / each;
            double low = flow.level(layer[n]);
            heights[n] = low + (n % each + 0.5) / each * (flow.level(layer[n] + 1) - low);
        }
    }

    /** Finds them all. */
    void find() {
        plane(columns(), CriticalPoint.Flow.COLUMNS);
        plane(meridian(), CriticalPoint.Flow.MERIDIAN);
        gas();
    }

    List<CriticalPoint> points() {
        return points;
    }

    List<Separatrix> separatrices() {
        return separatrices;
    }

    private void plane(PlaneField field, CriticalPoint.Flow which) {
        List<PlaneField.Zero> zeros = field.zeros();
        for (PlaneField.Zero zero : zeros) {
            CriticalPoint point = new CriticalPoint(
                    which, place(which, zero.x(), zero.y()), zero.kind(), list(zero.rates()), list(zero.turns()));
            points.add(point);
            if (zero.kind() == CriticalPoint.Kind.SADDLE) {
                for (PlaneField.Line line : field.lines(zero, zeros)) {
                    List<Place> along = line.points().stream()
                            .map(at -> place(which, at[0], at[1]))
                            .toList();
                    separatrices.add(new Separatrix(point, line.outwards(), along, line.closes()));
                }
            }
        }
    }

    private static Place place(CriticalPoint.Flow which, double x, double y) {
        return which == CriticalPoint.Flow.COLUMNS ? new Place(x, y, 0.5) : new Place(0, x, y);
    }

    private static List<Double> list(double[] values) {
        return Arrays.stream(values).boxed().toList();
    }

    // ---- flows in a plane ------------------------------------------------------------------------------------------

    /** The flow of whole columns over the face. */
    PlaneField columns() {
        int ni = grid.ni();
        int nj = grid.nj();
        double[] theta = new double[ni * nj];
        double[] radius = new double[ni * nj];
        double[] around = new double[ni * nj];
        double[] out = new double[ni * nj];
        double[] mass = new double[ni * nj];
        double[] rates = new double[3];
        for (int i = 0; i < ni; i++) {
            for (int j = 0; j < nj; j++) {
                int node = grid.node(i, j);
                theta[node] = grid.theta(i, j);
                radius[node] = grid.radius(j);
                int cells = 0;
                for (int side = 0; side < 4; side++) {
                    int ci = Math.floorMod(i - (side & 1), grid.cellsTheta());
                    int cj = j - (side >> 1);
                    if (cj < 0 || cj >= grid.cellsRadial()) {
                        continue;
                    }
                    cells++;
                    double at = grid.theta((side & 1) == 0 ? ci : ci + 1, j);
                    double thickness = flow.thickness(ci, cj, at, radius[node]);
                    for (int k = 0; k < flow.layers(); k++) {
                        double low = flow.level(k);
                        double thick = flow.level(k + 1) - low;
                        for (int g = 0; g < GAUSS_AT.length; g++) {
                            double sigma = low + GAUSS_AT[g] * thick;
                            flow.rates(ci, cj, k, at, radius[node], sigma, rates);
                            double part = GAUSS_WEIGHT[g]
                                    * thick
                                    * thickness
                                    * radius[node]
                                    * flow.density(ci, cj, k, at, radius[node], sigma);
                            around[node] += part * rates[0];
                            out[node] += part * rates[1];
                            mass[node] += part;
                        }
                    }
                }
                around[node] /= cells;
                out[node] /= cells;
                mass[node] /= cells;
            }
        }
        return new PlaneField(ni, nj, theta, radius, around, out, mass, (x, y, found) -> {
            if (!(y >= grid.innerRadius() && y <= grid.outerRadius())) {
                return false;
            }
            int j = grid.row(y);
            double within = x - grid.intoSector(x, j, y) * grid.pitch();
            found[0] = grid.column(within, j, y);
            found[1] = j;
            found[2] = within;
            return true;
        });
    }

    /** The mean flow over the ring, in the plane of radius and height. */
    PlaneField meridian() {
        int nj = grid.nj();
        int nl = heights.length;
        double[] radius = new double[nj * nl];
        double[] height = new double[nj * nl];
        double[] out = new double[nj * nl];
        double[] across = new double[nj * nl];
        double[] mass = new double[nj * nl];
        double[] rates = new double[3];
        for (int j = 0; j < nj; j++) {
            double r = grid.radius(j);
            for (int l = 0; l < nl; l++) {
                int node = j * nl + l;
                radius[node] = r;
                height[node] = heights[l];
                int sides = 0;
                for (int cj = Math.max(0, j - 1); cj <= Math.min(j, grid.cellsRadial() - 1); cj++) {
                    sides++;
                    for (int i = 0; i < grid.cellsTheta(); i++) {
                        double left = grid.theta(i, j);
                        double width = grid.theta(i + 1, j) - left;
                        for (int g = 0; g < GAUSS_AT.length; g++) {
                            double at = left + GAUSS_AT[g] * width;
                            flow.rates(i, cj, layer[l], at, r, heights[l], rates);
                            double part = GAUSS_WEIGHT[g]
                                    * width
                                    * r
                                    * flow.thickness(i, cj, at, r)
                                    * flow.density(i, cj, layer[l], at, r, heights[l]);
                            out[node] += part * rates[1];
                            across[node] += part * rates[2];
                            mass[node] += part;
                        }
                    }
                }
                out[node] /= sides;
                across[node] /= sides;
                mass[node] /= sides;
            }
        }
        return new PlaneField(nj, nl, radius, height, out, across, mass, (x, y, found) -> {
            if (!(x >= grid.innerRadius() && x <= grid.outerRadius() && y >= heights[0] && y <= heights[nl - 1])) {
                return false;
            }
            found[0] = grid.row(x);
            found[1] = below(y);
            found[2] = x;
            return true;
        });
    }

    private int below(double height) {
        int at = Arrays.binarySearch(heights, height);
        int n = at >= 0 ? at : -at - 2;
        return Math.max(0, Math.min(heights.length - 2, n));
    }

    // ---- the gas itself --------------------------------------------------------------------------------------------

    /** Fluxes at the nodes of one grid line and all heights: three components and the mass, nj × heights. */
    private double[][] slab(int i) {
        int nl = heights.length;
        double[][] slab = new double[4][grid.nj() * nl];
        double[] rates = new double[3];
        for (int j = 0; j < grid.nj(); j++) {
            double r = grid.radius(j);
            for (int l = 0; l < nl; l++) {
                int at = j * nl + l;
                int cells = 0;
                for (int side = 0; side < 4; side++) {
                    int ci = Math.floorMod(i - (side & 1), grid.cellsTheta());
                    int cj = j - (side >> 1);
                    if (cj < 0 || cj >= grid.cellsRadial()) {
                        continue;
                    }
                    cells++;
                    double theta = grid.theta((side & 1) == 0 ? ci : ci + 1, j);
                    flow.rates(ci, cj, layer[l], theta, r, heights[l], rates);
                    double mass =
                            flow.thickness(ci, cj, theta, r) * r * flow.density(ci, cj, layer[l], theta, r, heights[l]);
                    for (int c = 0; c < 3; c++) {
                        slab[c][at] += mass * rates[c];
                    }
                    slab[3][at] += mass;
                }
                for (double[] values : slab) {
                    values[at] /= cells;
                }
            }
        }
        return slab;
    }

    private void gas() {
        double[][] first = slab(0);
        double[][] left = first;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            double[][] right = i + 1 == grid.cellsTheta() ? first : slab(i + 1);
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int l = 0; l + 1 < heights.length; l++) {
                    block(i, j, l, left, right);
                }
            }
            left = right;
        }
    }

    private double[] corners(double[] left, double[] right, int j, int l) {
        int nl = heights.length;
        int n = j * nl + l;
        return new double[] {
            left[n],
            right[n],
            left[n + nl],
            right[n + nl],
            left[n + 1],
            right[n + 1],
            left[n + nl + 1],
            right[n + nl + 1]
        };
    }

    private void block(int i, int j, int l, double[][] left, double[][] right) {
        double[][] corner = new double[3][];
        for (int c = 0; c < 3; c++) {
            corner[c] = corners(left[c], right[c], j, l);
        }
        if (CellRoots.none(corner)) {
            return;
        }
        // Where one rate is nothing beside the others all over the block, its zeros are no points.
        double[] length = {
            grid.theta(i + 1, j) - grid.theta(i, j), grid.radius(j + 1) - grid.radius(j), heights[l + 1] - heights[l]
        };
        double[] pace = new double[3];
        for (int c = 0; c < 3; c++) {
            for (double value : corner[c]) {
                pace[c] = Math.max(pace[c], Math.abs(value) / length[c]);
            }
        }
        double fastest = Math.max(pace[0], Math.max(pace[1], pace[2]));
        for (double one : pace) {
            if (!(one > STILL * fastest)) {
                return;
            }
        }
        for (double[] at : CellRoots.of(corner)) {
            keep(i, j, l, corner, corners(left[3], right[3], j, l), at);
        }
    }

    private void keep(int i, int j, int l, double[][] corner, double[] mass, double[] at) {
        double[][] place = {
            both(new double[] {grid.theta(i, j), grid.theta(i + 1, j), grid.theta(i, j + 1), grid.theta(i + 1, j + 1)}),
            both(new double[] {grid.radius(j), grid.radius(j), grid.radius(j + 1), grid.radius(j + 1)}),
            {
                heights[l],
                heights[l],
                heights[l],
                heights[l],
                heights[l + 1],
                heights[l + 1],
                heights[l + 1],
                heights[l + 1]
            }
        };
        RealMatrix map = new Array2DRowRealMatrix(CellRoots.gradient(place, at), false);
        RealMatrix gradient = new Array2DRowRealMatrix(CellRoots.gradient(corner, at), false)
                .multiply(new LUDecomposition(map, 0).getSolver().getInverse())
                .scalarMultiply(1 / CellRoots.value(mass, at));
        // Lengths of the block as units, or the eigenvalues are lost beside the large numbers of mixed ones.
        RealMatrix scaled = gradient.copy();
        double[] unit = {map.getEntry(0, 0), map.getEntry(1, 1), map.getEntry(2, 2)};
        for (int row = 0; row < 3; row++) {
            for (int column = 0; column < 3; column++) {
                scaled.multiplyEntry(row, column, unit[column] / unit[row]);
            }
        }
        EigenDecomposition eigen = new EigenDecomposition(scaled);
        double[] rates = eigen.getRealEigenvalues();
        double[] turns = eigen.getImagEigenvalues();
        Place where =
                new Place(CellRoots.value(place[0], at), CellRoots.value(place[1], at), CellRoots.value(place[2], at));
        boolean known = points.stream()
                .anyMatch(other -> other.flow() == CriticalPoint.Flow.GAS
                        && Math.abs(other.place().theta() - where.theta()) < 1e-6 * unit[0]
                        && Math.abs(other.place().radius() - where.radius()) < 1e-6 * unit[1]
                        && Math.abs(other.place().sigma() - where.sigma()) < 1e-6 * unit[2]);
        if (!known) {
            points.add(new CriticalPoint(
                    CriticalPoint.Flow.GAS, where, PlaneField.kind(rates, turns), list(rates), list(turns)));
        }
    }

    private static double[] both(double[] four) {
        double[] eight = Arrays.copyOf(four, 8);
        System.arraycopy(four, 0, eight, 4, 4);
        return eight;
    }
}
