package org.whither.eddy;

import java.util.ArrayList;
import java.util.List;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.ArrayRealVector;
import org.apache.commons.math3.linear.DecompositionSolver;
import org.apache.commons.math3.linear.LUDecomposition;

/**
 * Zeros of a field of as many components as directions, 2 or 3, that is linear along each direction of a cell. Within any
 * box such a component lies between its values at the corners, so a box in which one component has one sign holds no zero.
 * The other boxes are halved until they are small, and Newton's method goes on from there.
 */
final class CellRoots {
    private static final int HALVINGS = 5;
    private static final int NEWTON = 30;
    private static final double SAME = 1e-6;
    private static final double EDGE = 1e-9;

    private final int size;
    /** 2^size corners of each component; bit d of the index is set at the far end of direction d. */
    private final double[][] corner;

    private final List<double[]> found = new ArrayList<>();

    private CellRoots(double[][] corner) {
        this.size = corner.length;
        this.corner = corner;
    }

    /**
     * The zeros in the unit cell.
     *
     * @param corner values at the corners, size × 2^size; not modified
     * @return places, each coordinate 0 … 1
     */
    static List<double[]> of(double[][] corner) {
        CellRoots roots = new CellRoots(corner);
        roots.search(new double[roots.size], 1, 0);
        return roots.found;
    }

    /** Whether some component has one sign at all corners. */
    static boolean none(double[][] corner) {
        for (double[] values : corner) {
            boolean up = false;
            boolean down = false;
            for (double value : values) {
                up |= value >= 0;
                down |= value <= 0;
            }
            if (!up || !down) {
                return true;
            }
        }
        return false;
    }

    private void search(double[] low, double length, int depth) {
        double[][] values = new double[size][1 << size];
        double[] at = new double[size];
        for (int n = 0; n < 1 << size; n++) {
            for (int d = 0; d < size; d++) {
                at[d] = low[d] + (n >> d & 1) * length;
            }
            for (int c = 0; c < size; c++) {
                values[c][n] = value(c, at);
            }
        }
        if (none(values)) {
            return;
        }
        if (depth == HALVINGS) {
            for (int d = 0; d < size; d++) {
                at[d] = low[d] + 0.5 * length;
            }
            newton(at);
            return;
        }
        for (int n = 0; n < 1 << size; n++) {
            double[] part = new double[size];
            for (int d = 0; d < size; d++) {
                part[d] = low[d] + (n >> d & 1) * 0.5 * length;
            }
            search(part, 0.5 * length, depth + 1);
        }
    }

    private void newton(double[] at) {
        for (int n = 0; n < NEWTON; n++) {
            double[] residual = new double[size];
            for (int c = 0; c < size; c++) {
                residual[c] = value(c, at);
            }
            DecompositionSolver solver =
                    new LUDecomposition(new Array2DRowRealMatrix(gradient(at), false), 0).getSolver();
            if (!solver.isNonSingular()) {
                return;
            }
            double[] step = solver.solve(new ArrayRealVector(residual, false)).toArray();
            double longest = 0;
            for (int d = 0; d < size; d++) {
                at[d] -= step[d];
                longest = Math.max(longest, Math.abs(step[d]));
                if (!(Math.abs(at[d]) < 10)) {
                    return;
                }
            }
            if (longest < 1e-13) {
                keep(at);
                return;
            }
        }
    }

    private void keep(double[] at) {
        for (double x : at) {
            if (x < -EDGE || x > 1 + EDGE) {
                return;
            }
        }
        for (double[] other : found) {
            double away = 0;
            for (int d = 0; d < size; d++) {
                away = Math.max(away, Math.abs(other[d] - at[d]));
            }
            if (away < SAME) {
                return;
            }
        }
        found.add(at.clone());
    }

    private double value(int c, double[] at) {
        return value(corner[c], at);
    }

    /** A value between the corners. */
    static double value(double[] corner, double[] at) {
        double sum = 0;
        for (int n = 0; n < corner.length; n++) {
            double weight = 1;
            for (int d = 0; d < at.length; d++) {
                weight *= (n >> d & 1) == 1 ? at[d] : 1 - at[d];
            }
            sum += weight * corner[n];
        }
        return sum;
    }

    private double[][] gradient(double[] at) {
        return gradient(corner, at);
    }

    /** Derivatives of each component along each direction of the cell. */
    static double[][] gradient(double[][] corner, double[] at) {
        int size = at.length;
        double[][] gradient = new double[size][size];
        for (int e = 0; e < size; e++) {
            for (int n = 0; n < 1 << size; n++) {
                double weight = (n >> e & 1) == 1 ? 1 : -1;
                for (int d = 0; d < size; d++) {
                    if (d != e) {
                        weight *= (n >> d & 1) == 1 ? at[d] : 1 - at[d];
                    }
                }
                for (int c = 0; c < size; c++) {
                    gradient[c][e] += weight * corner[c][n];
                }
            }
        }
        return gradient;
    }
}
