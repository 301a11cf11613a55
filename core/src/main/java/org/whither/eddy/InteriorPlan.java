package org.whither.eddy;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import java.util.SplittableRandom;
import org.apache.commons.math3.random.SobolSequenceGenerator;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.trace.Release;

/**
 * Releases inside the film, one for each equal mass of gas. A point of the unit cube is carried into the film so that
 * equal volumes become equal masses: its first coordinate runs round the sector, its second along the column of cells, its
 * third across the film. The points are Sobol's (I. M. Sobol, USSR Comput. Math. Math. Phys. 7(4), 1967) with a random
 * digital shift, which are stratified every way.
 */
final class InteriorPlan {
    private static final double TWO_TO_52 = 0x1p52;

    private final FilmFlow flow;
    private final FilmGrid grid;
    private final double[] columnTotal;
    private final double[][] cellTotal;

    InteriorPlan(FilmFlow flow) {
        this.flow = flow;
        this.grid = flow.film().grid();
        int nci = grid.cellsTheta();
        int ncj = grid.cellsRadial();
        columnTotal = new double[nci + 1];
        cellTotal = new double[nci][ncj + 1];
        double[] corner = new double[4];
        for (int i = 0; i < nci; i++) {
            for (int j = 0; j < ncj; j++) {
                corners(i, j, corner);
                double mass =
                        0.25 * (corner[0] + corner[1] + corner[2] + corner[3]) * (grid.radius(j + 1) - grid.radius(j));
                cellTotal[i][j + 1] = cellTotal[i][j] + mass;
            }
            columnTotal[i + 1] = columnTotal[i] + cellTotal[i][ncj];
        }
    }

    /** Mass of gas of one sector, as the plan sees it (kg). */
    double mass() {
        return columnTotal[columnTotal.length - 1];
    }

    /** Mass a unit of a and of r at the four corners of a cell (kg/m): lower left, upper left, lower right, upper right. */
    private void corners(int i, int j, double[] corner) {
        double width0 = grid.theta(i + 1, j) - grid.theta(i, j);
        double width1 = grid.theta(i + 1, j + 1) - grid.theta(i, j + 1);
        for (int n = 0; n < 4; n++) {
            int up = n & 1;
            double r = grid.radius(j + up);
            double theta = grid.theta(n < 2 ? i : i + 1, j + up);
            double width = up == 0 ? width0 : width1;
            double density = 0;
            for (int k = 0; k < flow.layers(); k++) {
                double low = flow.level(k);
                double high = flow.level(k + 1);
                density += (high - low) * flow.density(i, j, k, theta, r, 0.5 * (low + high));
            }
            corner[n] = density * flow.thickness(i, j, theta, r) * r * width;
        }
    }

    /**
     * Releases, each of the same mass.
     *
     * @param seed seed of the random shift
     * @param first index of the first point of the sequence
     * @param count how many
     */
    List<Release> releases(long seed, int first, int count) {
        SplittableRandom random = new SplittableRandom(seed);
        long[] shift = {random.nextLong() >>> 12, random.nextLong() >>> 12, random.nextLong() >>> 12};
        SobolSequenceGenerator sobol = new SobolSequenceGenerator(3);
        List<Release> releases = new ArrayList<>(count);
        for (int n = first; n < first + count; n++) {
            double[] point = n == first ? sobol.skipTo(n) : sobol.nextVector();
            releases.add(at(shifted(point[0], shift[0]), shifted(point[1], shift[1]), shifted(point[2], shift[2])));
        }
        return releases;
    }

    static double shifted(double coordinate, long shift) {
        return ((((long) (coordinate * TWO_TO_52)) ^ shift) + 0.5) / TWO_TO_52;
    }

    private Release at(double u, double v, double w) {
        double column = u * mass();
        int i = step(columnTotal, column);
        double a = (column - columnTotal[i]) / (columnTotal[i + 1] - columnTotal[i]);
        double[] total = cellTotal[i];
        double within = v * total[total.length - 1];
        int j = step(total, within);
        double b = (within - total[j]) / (total[j + 1] - total[j]);
        double[] corner = new double[4];
        corners(i, j, corner);
        b = linear(corner[0] + corner[2], corner[1] + corner[3], b);
        a = linear((1 - b) * corner[0] + b * corner[1], (1 - b) * corner[2] + b * corner[3], a);
        double r = grid.radius(j) + b * (grid.radius(j + 1) - grid.radius(j));
        double theta = (1 - a) * grid.lineTheta(i, j, r) + a * grid.lineTheta(i + 1, j, r);
        return new Release(theta, r, height(i, j, theta, r, w), 0);
    }

    /** The height below which a share of the gas of a column lies. */
    private double height(int i, int j, double theta, double r, double share) {
        int layers = flow.layers();
        if (layers == 1) {
            return share;
        }
        double[] total = new double[layers + 1];
        for (int k = 0; k < layers; k++) {
            double low = flow.level(k);
            double high = flow.level(k + 1);
            total[k + 1] = total[k] + (high - low) * flow.density(i, j, k, theta, r, 0.5 * (low + high));
        }
        double wanted = share * total[layers];
        int k = step(total, wanted);
        double c = (wanted - total[k]) / (total[k + 1] - total[k]);
        return flow.level(k) + c * (flow.level(k + 1) - flow.level(k));
    }

    /** Where in 0 … 1 a share lies of what is spread with a density that goes linearly from f0 to f1. */
    private static double linear(double f0, double f1, double share) {
        double mean = 0.5 * (f0 + f1);
        double rest = f0 * f0 + 2 * (f1 - f0) * mean * share;
        return 2 * mean * share / (f0 + Math.sqrt(Math.max(0, rest)));
    }

    private static int step(double[] total, double value) {
        int at = Arrays.binarySearch(total, value);
        int n = at >= 0 ? at : -at - 2;
        return Math.max(0, Math.min(total.length - 2, n));
    }
}
