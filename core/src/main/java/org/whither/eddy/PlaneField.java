package org.whither.eddy;

import java.util.ArrayList;
import java.util.List;
import org.apache.commons.math3.linear.Array2DRowRealMatrix;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.LUDecomposition;
import org.apache.commons.math3.linear.RealMatrix;
import org.apache.commons.math3.linear.RealVector;

/**
 * A flow in a plane, given by its mass fluxes at the nodes of a grid of quadrilateral cells and linear between them both
 * ways: its zeros, what it does around them, and the lines that run into its saddles and out of them. First coordinate x,
 * second y; the grid's first direction a, its second b.
 */
final class PlaneField {
    /** Finds the cell of a place. */
    @FunctionalInterface
    interface Finder {
        /**
         * Finds a cell.
         *
         * @param x first coordinate; may lie in another period
         * @param y second coordinate
         * @param found cell along a and along b, and x brought into the first period; overwritten
         * @return whether the place lies in the field
         */
        boolean find(double x, double y, double[] found);
    }

    /**
     * A zero.
     *
     * @param x first coordinate
     * @param y second coordinate
     * @param kind what the flow does around it
     * @param rates real parts of the eigenvalues of the gradient of the rates (1/s)
     * @param turns imaginary parts (rad/s)
     * @param gradient gradient of the rates by x and y
     */
    record Zero(double x, double y, CriticalPoint.Kind kind, double[] rates, double[] turns, double[][] gradient) {}

    /** A line from a saddle on; pairs x, y. */
    record Line(boolean outwards, List<double[]> points, boolean closes) {}

    /** Below this share of the largest flux, a component is zero all over a cell, and its zeros are no points. */
    private static final double STILL = 1e-9;

    /** A focus whose paths come nearer by less than this share of a turn's angle is a centre. */
    private static final double CENTRE = 0.02;

    /** Two zeros nearer than this part of a cell are one, met in two cells. */
    private static final double SAME = 1e-5;

    private static final int MOST_STEPS = 20_000;
    private static final double STEP = 0.1;

    private final int na;
    private final int nb;
    private final double[] x;
    private final double[] y;
    private final double[] fluxX;
    private final double[] fluxY;
    private final double[] mass;
    private final Finder finder;
    private final double largestX;
    private final double largestY;

    /**
     * A field.
     *
     * @param na nodes along a
     * @param nb nodes along b
     * @param x first coordinate of each node, na × nb, row-major; kept
     * @param y second coordinate; kept
     * @param fluxX mass flux along x; kept
     * @param fluxY mass flux along y; kept
     * @param mass what to divide a flux by to get a rate; kept
     * @param finder finds the cell of a place
     */
    PlaneField(int na, int nb, double[] x, double[] y, double[] fluxX, double[] fluxY, double[] mass, Finder finder) {
        this.na = na;
        this.nb = nb;
        this.x = x;
        this.y = y;
        this.fluxX = fluxX;
        this.fluxY = fluxY;
        this.mass = mass;
        this.finder = finder;
        double mostX = 0;
        double mostY = 0;
        for (int n = 0; n < fluxX.length; n++) {
            mostX = Math.max(mostX, Math.abs(fluxX[n]));
            mostY = Math.max(mostY, Math.abs(fluxY[n]));
        }
        largestX = mostX;
        largestY = mostY;
    }

    private double[] corners(double[] values, int i, int j) {
        int n = i * nb + j;
        return new double[] {values[n], values[n + nb], values[n + 1], values[n + nb + 1]};
    }

    private static boolean still(double[] values, double largest) {
        for (double value : values) {
            if (Math.abs(value) > STILL * largest) {
                return false;
            }
        }
        return true;
    }

    /** All zeros that are points. */
    List<Zero> zeros() {
        List<Zero> zeros = new ArrayList<>();
        for (int i = 0; i + 1 < na; i++) {
            for (int j = 0; j + 1 < nb; j++) {
                double[][] corner = {corners(fluxX, i, j), corners(fluxY, i, j)};
                if (CellRoots.none(corner) || still(corner[0], largestX) || still(corner[1], largestY)) {
                    continue;
                }
                for (double[] at : CellRoots.of(corner)) {
                    Zero zero = zero(i, j, corner, at);
                    double[] cell = size(i, j);
                    boolean known = zeros.stream()
                            .anyMatch(other -> Math.abs(other.x() - zero.x()) < SAME * cell[0]
                                    && Math.abs(other.y() - zero.y()) < SAME * cell[1]);
                    if (!known) {
                        zeros.add(zero);
                    }
                }
            }
        }
        return zeros;
    }

    private Zero zero(int i, int j, double[][] corner, double[] at) {
        double[][] place = {corners(x, i, j), corners(y, i, j)};
        RealMatrix byCell = new Array2DRowRealMatrix(CellRoots.gradient(corner, at), false);
        RealMatrix map = new Array2DRowRealMatrix(CellRoots.gradient(place, at), false);
        RealMatrix gradient = byCell.multiply(
                        new LUDecomposition(map, 0).getSolver().getInverse())
                .scalarMultiply(1 / CellRoots.value(corners(mass, i, j), at));
        double trace = gradient.getTrace();
        double det = new LUDecomposition(gradient, 0).getDeterminant();
        double part = 0.25 * trace * trace - det;
        double root = Math.sqrt(Math.abs(part));
        double[] rates = part >= 0
                ? new double[] {0.5 * trace - root, 0.5 * trace + root}
                : new double[] {0.5 * trace, 0.5 * trace};
        double[] turns = part >= 0 ? new double[2] : new double[] {-root, root};
        return new Zero(
                CellRoots.value(place[0], at),
                CellRoots.value(place[1], at),
                kind(rates, turns),
                rates,
                turns,
                gradient.getData());
    }

    /** The kind of a zero from the eigenvalues of its gradient. */
    static CriticalPoint.Kind kind(double[] rates, double[] turns) {
        int lead = 0;
        double turn = 0;
        boolean in = false;
        boolean out = false;
        for (int n = 0; n < rates.length; n++) {
            if (Math.abs(turns[n]) > turn) {
                turn = Math.abs(turns[n]);
                lead = n;
            }
            in |= rates[n] < 0;
            out |= rates[n] > 0;
        }
        if (turn > 0) {
            if (Math.abs(rates[lead]) < CENTRE * turn) {
                return CriticalPoint.Kind.CENTRE;
            }
            return rates[lead] > 0 ? CriticalPoint.Kind.REPELLING_FOCUS : CriticalPoint.Kind.ATTRACTING_FOCUS;
        }
        if (in && out) {
            return CriticalPoint.Kind.SADDLE;
        }
        return out ? CriticalPoint.Kind.REPELLING_NODE : CriticalPoint.Kind.ATTRACTING_NODE;
    }

    /** The four lines of a saddle. */
    List<Line> lines(Zero saddle, List<Zero> zeros) {
        EigenDecomposition eigen = new EigenDecomposition(new Array2DRowRealMatrix(saddle.gradient()));
        List<Line> lines = new ArrayList<>();
        for (int n = 0; n < 2; n++) {
            boolean outwards = eigen.getRealEigenvalue(n) > 0;
            RealVector way = eigen.getEigenvector(n);
            for (int side = -1; side <= 1; side += 2) {
                lines.add(line(saddle, outwards, side * way.getEntry(0), side * way.getEntry(1), zeros));
            }
        }
        return lines;
    }

    private Line line(Zero saddle, boolean outwards, double wayX, double wayY, List<Zero> zeros) {
        List<double[]> points = new ArrayList<>();
        points.add(new double[] {saddle.x(), saddle.y()});
        double[] found = new double[3];
        if (!finder.find(saddle.x(), saddle.y(), found)) {
            return new Line(outwards, points, false);
        }
        double[] cell = size((int) found[0], (int) found[1]);
        double start = 0.2 / Math.max(Math.abs(wayX) / cell[0], Math.abs(wayY) / cell[1]);
        double[] at = {saddle.x() + start * wayX, saddle.y() + start * wayY};
        double[] slope = new double[2];
        double[] probe = new double[2];
        double sign = outwards ? 1 : -1;
        double[][] k = new double[4][2];
        boolean left = false;
        for (int n = 0; n < MOST_STEPS; n++) {
            points.add(at.clone());
            if (!finder.find(at[0], at[1], found)) {
                return new Line(outwards, points, false);
            }
            cell = size((int) found[0], (int) found[1]);
            if (!rate(at[0], at[1], slope)) {
                return new Line(outwards, points, false);
            }
            double h = STEP / Math.max(Math.abs(slope[0]) / cell[0], Math.abs(slope[1]) / cell[1]);
            if (!(h < Double.POSITIVE_INFINITY)) {
                return new Line(outwards, points, false);
            }
            // The classical Runge–Kutta step.
            boolean inside = true;
            for (int stage = 0; stage < 4 && inside; stage++) {
                double part = stage == 0 ? 0 : stage == 3 ? h : 0.5 * h;
                for (int c = 0; c < 2; c++) {
                    probe[c] = at[c] + (stage == 0 ? 0 : sign * part * k[stage - 1][c]);
                }
                inside = rate(probe[0], probe[1], k[stage]);
            }
            if (!inside) {
                return new Line(outwards, points, false);
            }
            for (int c = 0; c < 2; c++) {
                at[c] += sign * h / 6 * (k[0][c] + 2 * k[1][c] + 2 * k[2][c] + k[3][c]);
            }
            boolean near = false;
            for (Zero zero : zeros) {
                if (zero.kind() == CriticalPoint.Kind.SADDLE) {
                    near |= Math.abs(at[1] - zero.y()) < 0.5 * cell[1]
                            && Math.abs(Math.IEEEremainder(at[0] - zero.x(), period())) < 0.5 * cell[0];
                }
            }
            if (left && near) {
                points.add(at.clone());
                return new Line(outwards, points, true);
            }
            left |= !near;
        }
        return new Line(outwards, points, false);
    }

    /** Period along x; more than the field is long where it has none. */
    private double period() {
        double length = x[(na - 1) * nb] - x[0];
        return length;
    }

    private double[] size(int i, int j) {
        double[] cx = corners(x, i, j);
        double[] cy = corners(y, i, j);
        return new double[] {
            Math.max(Math.abs(cx[1] - cx[0]), Math.abs(cx[2] - cx[0])),
            Math.max(Math.abs(cy[1] - cy[0]), Math.abs(cy[2] - cy[0]))
        };
    }

    private boolean rate(double atX, double atY, double[] rates) {
        double[] found = new double[3];
        if (!finder.find(atX, atY, found)) {
            return false;
        }
        int i = (int) found[0];
        int j = (int) found[1];
        double[][] place = {corners(x, i, j), corners(y, i, j)};
        double[] at = {0.5, 0.5};
        for (int n = 0; n < 4; n++) {
            double[][] map = CellRoots.gradient(place, at);
            double dx = found[2] - CellRoots.value(place[0], at);
            double dy = atY - CellRoots.value(place[1], at);
            double det = map[0][0] * map[1][1] - map[0][1] * map[1][0];
            at[0] += (map[1][1] * dx - map[0][1] * dy) / det;
            at[1] += (map[0][0] * dy - map[1][0] * dx) / det;
        }
        double m = CellRoots.value(corners(mass, i, j), at);
        rates[0] = CellRoots.value(corners(fluxX, i, j), at) / m;
        rates[1] = CellRoots.value(corners(fluxY, i, j), at) / m;
        return true;
    }
}
