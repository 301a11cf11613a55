package org.whither.film;

import java.util.function.BiConsumer;
import org.apache.commons.math3.linear.ArrayRealVector;
import org.apache.commons.math3.linear.ConjugateGradient;
import org.apache.commons.math3.linear.RealLinearOperator;
import org.apache.commons.math3.linear.RealVector;

/**
 * Mass flows of the film columns through the faces of the cells, seen from the frame in which the film is steady, in
 * balance: what leaves a cell through its four faces is what its feed brings in. They are the solver's own where it gave
 * them, and else formed from the film pressure, or from the velocities at the nodes; what is then left of divergence is
 * removed by the smallest change of the flows, a projection on the graph of the cells: the least sum of squares, each
 * change taken as a share of the mean flow in its direction, since the flow that the rotor drags round is often a hundred
 * times the leakage and so are its errors.
 *
 * <p>What enters through the feed is what the file says. Where it says nothing, a lubrication field lets in what the
 * columns of the feed need; for a full field the velocities at the face tell where it enters, scaled so that in all as
 * much enters as leaves over the two diameters, and they are corrected with the rest.
 */
public final class ColumnFlows {
    /** A residual below this share of the mean flow through a face is rounding, not divergence. */
    private static final double ROUNDING = 1e-10;

    /** Where the nodes of the feed say less than this share of what leaves, or that much more, they say nothing. */
    private static final double LEAST_SCALE = 0.5;

    /** Least size of the flows of a direction, as a share of the other's, with which its changes are weighed. */
    private static final double LEAST_SIZE = 1e-3;

    /** A weight to the outside so large that the unknowns of a row vanish beside their neighbours'. */
    private static final double SHUT = 1e20;

    private final FilmGrid grid;
    private final double[] theta;
    private final double[] radial;
    private final double[] supply;
    private final boolean formed;
    private double closure;
    private double correction;
    private double largestCorrection;

    private ColumnFlows(FilmGrid grid, double[] theta, double[] radial, double[] supply, boolean formed) {
        this.grid = grid;
        this.theta = theta;
        this.radial = radial;
        this.supply = supply;
        this.formed = formed;
    }

    /** Flow through the constant-i face of row j, towards +θ (kg/s). */
    double theta(int i, int j) {
        return theta[i * (grid.nj() - 1) + j];
    }

    /** Flow through the constant-j face of column i, outwards (kg/s). */
    double radial(int i, int j) {
        return radial[i * grid.nj() + j];
    }

    /** Supply gas that enters through cell (i, j) (kg/s). */
    double supply(int i, int j) {
        return supply[grid.cell(i, j)];
    }

    /** Whether the flows were formed from film pressure or nodal velocities, since the solver gave none. */
    public boolean formed() {
        return formed;
    }

    /**
     * How far the field closed before the correction, column by column: (all inflow − all outflow) / all inflow over the
     * feed and the two diameters. 0 where nothing enters.
     */
    public double closure() {
        return closure;
    }

    /** Size of the correction that removed the remaining divergence: Σ|change| / Σ|flow| over all cell faces. */
    public double correction() {
        return correction;
    }

    /** The largest share of the flow through one cell that the correction changed. */
    public double largestCorrection() {
        return largestCorrection;
    }

    /**
     * The column flows of a lubrication field.
     *
     * @param film a film whose field is a {@link LubricationField}
     * @param columns its pressure and film thickness
     * @return balanced flows
     */
    static ColumnFlows of(Film film, Columns columns) {
        FilmGrid grid = film.grid();
        LubricationField field = (LubricationField) film.field();
        double[] theta;
        double[] radial;
        boolean formed = field.massFlows().isEmpty();
        if (formed) {
            theta = new double[grid.ni() * grid.cellsRadial()];
            radial = new double[grid.cellsTheta() * grid.nj()];
            form(film, columns, theta, radial);
        } else {
            theta = field.massFlows().get().thetaValues();
            radial = field.massFlows().get().radialValues();
            double observer =
                    film.velocityFrame().angularSpeed(film.conditions().rotationRate());
            turn(grid, columns, theta, observer - film.steadyFrameSpeed());
        }
        ColumnFlows flows = new ColumnFlows(grid, theta, radial, new double[grid.cells()], formed);
        flows.balance(film, null);
        return flows;
    }

    /**
     * The column flows of a full field.
     *
     * @param film the film
     * @param theta flows through the constant-i faces, ni × (nj − 1), row-major (kg/s); kept and changed
     * @param radial flows through the constant-j faces, (ni − 1) × nj, row-major (kg/s); kept and changed
     * @param supply what enters through each cell of the feed by the velocities there (kg/s); kept and changed
     * @return balanced flows
     */
    static ColumnFlows of(Film film, double[] theta, double[] radial, double[] supply) {
        ColumnFlows flows = new ColumnFlows(film.grid(), theta, radial, supply, true);
        flows.balance(film, supply);
        return flows;
    }

    /** Adds to the flows what an observer sees who turns slower by {@code by} (rad/s). */
    private static void turn(FilmGrid grid, Columns columns, double[] theta, double by) {
        if (by == 0) {
            return;
        }
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                theta[i * grid.cellsRadial() + j] += by * columns.rotationMoment(i, j);
            }
        }
    }

    /**
     * Forms the flows from the film pressure: on each face the half-cell pressure flows of both sides and their rotation
     * parts, with a common pressure on the face, so that a step in film thickness is passed without loss (the
     * one-dimensional elimination of the face pressure); the derivative along the face from the nodal pressures.
     */
    private static void form(Film film, Columns columns, double[] theta, double[] radial) {
        FilmGrid grid = film.grid();
        double rotor = film.conditions().rotationRate() - film.steadyFrameSpeed();
        double stator = -film.steadyFrameSpeed();
        double mean = 0.5 * (rotor + stator);
        int nci = grid.cellsTheta();
        int ncj = grid.cellsRadial();
        for (int i = 0; i <= nci; i++) {
            int left = Math.floorMod(i - 1, nci);
            int right = i % nci;
            for (int j = 0; j < ncj; j++) {
                double dr = grid.radius(j + 1) - grid.radius(j);
                double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
                double slope = grid.lineSlope(i % nci, j);
                double along = (columns.nodeSquare(right, j + 1) - columns.nodeSquare(right, j)) / dr;
                double halfLeft = 0.5 * columns.width(left, j);
                double halfRight = 0.5 * columns.width(right, j);
                // Flow through the face a unit of radius: −c (∂p/∂θ (1 + (r θ')²)/r − r θ' ∂p/∂r along the line), c =
                // ρh³/12µ.
                double factor = (1 + r * r * slope * slope) / r;
                double cLeft = columns.conductance(left, j);
                double cRight = columns.conductance(right, j);
                double kLeft = cLeft * factor / halfLeft;
                double kRight = cRight * factor / halfRight;
                double skew = r * slope * along;
                double vLeft = columns.rho(left, j) * columns.h(left, j) * mean * r + cLeft * skew;
                double vRight = columns.rho(right, j) * columns.h(right, j) * mean * r + cRight * skew;
                double sLeft = columns.cellSquare(left, j);
                double sRight = columns.cellSquare(right, j);
                double flux = kLeft * kRight / (kLeft + kRight) * (sLeft - sRight)
                        + (vLeft * kRight + vRight * kLeft) / (kLeft + kRight);
                theta[i * ncj + j] = flux * dr;
            }
        }
        for (int i = 0; i < nci; i++) {
            for (int j = 0; j <= ncj; j++) {
                double r = grid.radius(j);
                double width = grid.theta(i + 1, j) - grid.theta(i, j);
                double along = r * (columns.nodeSquare((i + 1) % nci, j) - columns.nodeSquare(i, j)) / width;
                // In ln r, in which a plain film is linear; ∂s/∂r at constant θ is that along the line less θ' ∂s/∂θ.
                double flux;
                int row = oneSided(film, i, j);
                if (row >= 0) {
                    double middle = 0.5 * Math.log(grid.radius(row + 1) / grid.radius(row));
                    double border = 0.5 * (columns.nodeSquare(i, j) + columns.nodeSquare(i + 1, j));
                    double drop = (row == j ? 1 : -1) * (border - columns.cellSquare(i, row));
                    flux = columns.conductance(i, row) * (drop / middle + columns.slope(i, row) * along);
                } else {
                    double cBelow = columns.conductance(i, j - 1);
                    double cAbove = columns.conductance(i, j);
                    double kBelow = cBelow / (0.5 * Math.log(r / grid.radius(j - 1)));
                    double kAbove = cAbove / (0.5 * Math.log(grid.radius(j + 1) / r));
                    double vBelow = cBelow * columns.slope(i, j - 1) * along;
                    double vAbove = cAbove * columns.slope(i, j) * along;
                    double drop = columns.cellSquare(i, j - 1) - columns.cellSquare(i, j);
                    flux = kBelow * kAbove / (kBelow + kAbove) * drop
                            + (vBelow * kAbove + vAbove * kBelow) / (kBelow + kAbove);
                }
                radial[i * (ncj + 1) + j] = flux * width;
            }
        }
    }

    /**
     * The row from which alone the flow through a constant-j face is formed, or −1 for both: the row inside at the two
     * diameters, and the row beside the feed where the pressure of the face itself is known, since it has a kink there.
     */
    private static int oneSided(Film film, int i, int j) {
        FilmGrid grid = film.grid();
        if (j == 0 || j == grid.cellsRadial()) {
            return Math.min(j, grid.cellsRadial() - 1);
        }
        if (((LubricationField) film.field()).pressureAt() == Location.NODE) {
            boolean below = film.feeds(grid.cell(i, j - 1));
            boolean above = film.feeds(grid.cell(i, j));
            if (below != above) {
                return below ? j : j - 1;
            }
        }
        return -1;
    }

    private double divergence(int i, int j) {
        return theta(i + 1, j) - theta(i, j) + radial(i, j + 1) - radial(i, j);
    }

    /** Balances the flows; {@code fed} is what enters the feed by the field itself, or null where it does not say. */
    private void balance(Film film, double[] fed) {
        boolean given = film.supply().isPresent() && film.supply().get().hasMassFlux();
        double[] entering = new double[grid.cells()];
        double enteringFeed = 0;
        double inflow = 0;
        double leaving = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                int cell = grid.cell(i, j);
                if (film.feeds(cell)) {
                    double flux = given ? film.supply().get().massFlux(cell) * grid.cellArea(i, j) : 0;
                    entering[cell] = given ? flux : fed != null ? fed[cell] : divergence(i, j);
                }
                enteringFeed += entering[cell];
                inflow += Math.max(0, entering[cell]);
            }
            leaving += radial(i, grid.cellsRadial()) - radial(i, 0);
            inflow += Math.max(0, radial(i, 0)) + Math.max(0, -radial(i, grid.cellsRadial()));
        }
        closure = inflow > 0 ? (enteringFeed - leaving) / inflow : 0;
        double scale = leaving / enteringFeed;
        boolean linked = !given && fed != null && scale > LEAST_SCALE && scale < 1 / LEAST_SCALE;
        boolean[] free = new boolean[grid.cells()];
        double[] residual = new double[grid.cells()];
        double worst = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                int cell = grid.cell(i, j);
                free[cell] = film.feeds(cell) && !given && !linked;
                supply[cell] = linked ? scale * entering[cell] : entering[cell];
                residual[cell] = free[cell] ? 0 : supply[cell] - divergence(i, j);
                worst = Math.max(worst, Math.abs(residual[cell]));
            }
        }
        if (worst > ROUNDING * 0.5 * (meanSize(theta) + meanSize(radial))) {
            remove(residual, free, linked);
        }
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                int cell = grid.cell(i, j);
                if (film.feeds(cell)) {
                    supply[cell] = divergence(i, j);
                }
            }
        }
    }

    private static double meanSize(double[] flows) {
        double sum = 0;
        for (double flow : flows) {
            sum += Math.abs(flow);
        }
        return sum / flows.length;
    }

    /** Removes the residual by the weighted least change of the flows: δ(A→B) = w (λ_A − λ_B), with L λ = residual. */
    private void remove(double[] residual, boolean[] free, boolean linked) {
        int nci = grid.cellsTheta();
        int ncj = grid.cellsRadial();
        double sizeTheta = meanSize(theta);
        double sizeRadial = meanSize(radial);
        double most = Math.max(sizeTheta, sizeRadial);
        double alongTheta = weight(sizeTheta / most);
        double alongRadial = weight(sizeRadial / most);
        double throughFeed = 0;
        if (linked) {
            int cells = 0;
            for (double flow : supply) {
                throughFeed += Math.abs(flow);
                cells += flow != 0 ? 1 : 0;
            }
            throughFeed = weight(throughFeed / cells / most);
        }
        double[] outside = new double[residual.length];
        for (int cell = 0; cell < outside.length; cell++) {
            outside[cell] = supply[cell] != 0 ? throughFeed : 0;
        }
        double[] lambda = solve(residual, free, alongTheta, alongRadial, outside);
        double changed = 0;
        double total = 0;
        double[] cellChange = new double[residual.length];
        double[] cellFlow = new double[residual.length];
        for (int i = 0; i <= nci; i++) {
            int left = Math.floorMod(i - 1, nci);
            int right = i % nci;
            for (int j = 0; j < ncj; j++) {
                double change = alongTheta * (lambda[left * ncj + j] - lambda[right * ncj + j]);
                theta[i * ncj + j] += change;
                double flow = Math.abs(theta[i * ncj + j]);
                note(cellChange, cellFlow, i > 0 ? left * ncj + j : -1, change, flow);
                note(cellChange, cellFlow, i < nci ? right * ncj + j : -1, change, flow);
                changed += i < nci ? Math.abs(change) : 0;
                total += i < nci ? flow : 0;
            }
        }
        for (int i = 0; i < nci; i++) {
            for (int j = 0; j <= ncj; j++) {
                double below = j > 0 ? lambda[i * ncj + j - 1] : 0;
                double above = j < ncj ? lambda[i * ncj + j] : 0;
                double change = alongRadial * (below - above);
                radial[i * (ncj + 1) + j] += change;
                double flow = Math.abs(radial[i * (ncj + 1) + j]);
                note(cellChange, cellFlow, j > 0 ? i * ncj + j - 1 : -1, change, flow);
                note(cellChange, cellFlow, j < ncj ? i * ncj + j : -1, change, flow);
                changed += Math.abs(change);
                total += flow;
            }
        }
        correction = total > 0 ? changed / total : 0;
        for (int cell = 0; cell < residual.length; cell++) {
            if (cellFlow[cell] > 0) {
                largestCorrection = Math.max(largestCorrection, cellChange[cell] / cellFlow[cell]);
            }
        }
    }

    private static double weight(double size) {
        double within = Math.max(size, LEAST_SIZE);
        return within * within;
    }

    /** Solves L λ = residual, L the weighted Laplacian of the cells; λ is 0 in a free cell and outside the film. */
    private double[] solve(double[] residual, boolean[] free, double alongTheta, double alongRadial, double[] outside) {
        int nci = grid.cellsTheta();
        int ncj = grid.cellsRadial();
        RealLinearOperator laplacian = operator(residual.length, (lambda, y) -> {
            for (int i = 0; i < nci; i++) {
                int left = Math.floorMod(i - 1, nci) * ncj;
                int right = (i + 1) % nci * ncj;
                for (int j = 0; j < ncj; j++) {
                    int cell = i * ncj + j;
                    if (free[cell]) {
                        y[cell] = lambda[cell];
                        continue;
                    }
                    double around = at(lambda, free, left + j) + at(lambda, free, right + j);
                    double out = j > 0 ? at(lambda, free, cell - 1) : 0;
                    out += j < ncj - 1 ? at(lambda, free, cell + 1) : 0;
                    y[cell] = (2 * (alongTheta + alongRadial) + outside[cell]) * lambda[cell]
                            - alongTheta * around
                            - alongRadial * out;
                }
            }
        });
        RealLinearOperator preconditioner =
                operator(residual.length, fastSolve(free, alongTheta, alongRadial, outside));
        ConjugateGradient solver = new ConjugateGradient(100_000, 1e-12, false);
        return solver.solve(laplacian, preconditioner, new ArrayRealVector(residual, false))
                .toArray();
    }

    /**
     * Nearly the inverse of the Laplacian, and exactly where feed rows are fed all round: it takes the means of the rows,
     * and a row that is free all round for one outside the film.
     */
    private BiConsumer<double[], double[]> fastSolve(
            boolean[] free, double alongTheta, double alongRadial, double[] outside) {
        int nci = grid.cellsTheta();
        int ncj = grid.cellsRadial();
        double[] ofRow = new double[ncj];
        for (int j = 0; j < ncj; j++) {
            int freeCells = 0;
            for (int i = 0; i < nci; i++) {
                ofRow[j] += outside[i * ncj + j] / nci;
                freeCells += free[i * ncj + j] ? 1 : 0;
            }
            if (freeCells == nci) {
                ofRow[j] = SHUT * (alongTheta + alongRadial);
            }
        }
        RingSolver solver = new RingSolver(nci, ncj, alongTheta, alongRadial, ofRow);
        return (residual, y) -> {
            solver.solve(residual, y);
            for (int cell = 0; cell < y.length; cell++) {
                y[cell] = free[cell] ? residual[cell] : y[cell];
            }
        };
    }

    private static RealLinearOperator operator(int size, BiConsumer<double[], double[]> into) {
        return new RealLinearOperator() {
            @Override
            public int getRowDimension() {
                return size;
            }

            @Override
            public int getColumnDimension() {
                return size;
            }

            @Override
            public RealVector operate(RealVector x) {
                double[] y = new double[size];
                into.accept(((ArrayRealVector) x).getDataRef(), y);
                return new ArrayRealVector(y, false);
            }
        };
    }

    private static double at(double[] lambda, boolean[] free, int cell) {
        return free[cell] ? 0 : lambda[cell];
    }

    private static void note(double[] cellChange, double[] cellFlow, int cell, double change, double flow) {
        if (cell >= 0) {
            cellChange[cell] += Math.abs(change);
            cellFlow[cell] += flow;
        }
    }
}
