package org.whither.samples;

import java.util.function.DoubleConsumer;

/**
 * Solves the mass balances of a gas film by Newton's method with a sparse direct solver, a backtracking line search and
 * continuation in speed.
 */
final class FilmSolver {
    /** Largest imbalance of a cell that is called solved, as a share of the gas that passes through the film. */
    static final double CLOSED = 1e-10;

    private static final int MOST_ITERATIONS = 40;
    private static final double SHORTEST_STEP = 1e-4;
    private static final double SMALLEST_SPEED_STEP = 1.0 / 128;

    /** A solved film; arrays as in {@link FilmEquations#evaluate}, which nobody may change. */
    record Solution(
            double[] s,
            double[] massTheta,
            double[] massRadial,
            int iterations,
            int speedSteps,
            double residual,
            int upwindedHalfFaces) {}

    private final FilmProblem problem;
    private final FilmEquations equations;
    private final BalanceMatrix matrix;
    private final int cells;
    private DoubleConsumer progress = share -> {};
    private int iterations;
    private double imbalance;

    FilmSolver(FilmProblem problem) {
        this(
                problem,
                EliminationOrder.nestedDissection(
                        problem.grid().nx(), problem.grid().nr()));
    }

    FilmSolver(FilmProblem problem, int[] order) {
        this.problem = problem;
        this.equations = new FilmEquations(problem);
        this.matrix = new BalanceMatrix(problem.grid().nx(), problem.grid().nr(), order);
        this.cells = problem.grid().cells();
    }

    /**
     * Solves the film.
     *
     * @param progress told the share done, 0 … 1
     * @return the solved film
     * @throws IllegalStateException where no balanced field was found
     */
    Solution solve(DoubleConsumer progress) {
        double omega = problem.rotationRate();
        this.progress = progress;
        progress.accept(0);
        double[] s = atRestGuess();
        int speedSteps = 0;
        if (newton(s, omega)) {
            speedSteps = omega == 0 ? 0 : 1;
        } else {
            s = atRestGuess();
            speedSteps = raiseSpeed(s, omega);
        }
        for (int n = 0; n < cells; n++) {
            if (!(s[n] > equations.smallest())) {
                throw new IllegalStateException("the film solver found a pressure near or below vacuum in cell "
                        + n / problem.grid().nr() + ", " + n % problem.grid().nr()
                        + "; such a film has no solution of this kind: use a finer grid or a lower speed");
            }
        }
        int nx = problem.grid().nx();
        int nr = problem.grid().nr();
        double[] massTheta = new double[(nx + 1) * nr];
        double[] massRadial = new double[nx * (nr + 1)];
        double[] residual = new double[cells];
        equations.evaluate(s, omega, residual, null, massTheta, massRadial);
        progress.accept(1);
        return new Solution(s, massTheta, massRadial, iterations, speedSteps, imbalance, equations.upwinded());
    }

    /**
     * Continuation: from standstill to full speed in steps that adapt.
     *
     * @param s the guess, then the solution (Pa²)
     * @param omega full speed (rad/s)
     * @return steps taken
     */
    private int raiseSpeed(double[] s, double omega) {
        if (omega == 0 || !newton(s, 0)) {
            throw notConverged(0, "at standstill");
        }
        double reached = 0;
        double step = 0.5;
        int steps = 0;
        while (reached < 1) {
            double next = Math.min(1, reached + step);
            double[] trial = s.clone();
            if (newton(trial, next * omega)) {
                System.arraycopy(trial, 0, s, 0, cells);
                reached = next;
                steps++;
                step *= 2;
            } else {
                step /= 2;
                if (step < SMALLEST_SPEED_STEP) {
                    throw notConverged(next * omega, "between " + reached * omega + " and " + next * omega + " rad/s");
                }
            }
        }
        return steps;
    }

    private IllegalStateException notConverged(double omega, String where) {
        return new IllegalStateException("the film solver did not converge " + where + ": after " + iterations
                + " iterations the worst cell is out of balance by " + imbalance
                + " of the gas that passes (expected below " + CLOSED + ") at " + omega
                + " rad/s; use a finer grid or a lower speed");
    }

    /** s of the plain film between the two diameters. */
    private double[] atRestGuess() {
        SheetGrid grid = problem.grid();
        double inner = problem.pressureInner() * problem.pressureInner();
        double outer = problem.pressureOuter() * problem.pressureOuter();
        double span = Math.log(grid.radius(grid.nr()) / grid.radius(0));
        double[] s = new double[cells];
        for (int i = 0; i < grid.nx(); i++) {
            for (int j = 0; j < grid.nr(); j++) {
                double y = Math.log(grid.middleRadius(j) / grid.radius(0)) / span;
                s[grid.cell(i, j)] = inner + y * (outer - inner);
            }
        }
        return s;
    }

    /**
     * Newton's method at one speed, until rounding stops it.
     *
     * @param s the guess, then the solution (Pa²)
     * @param omega rotation rate (rad/s)
     * @return whether the balances close
     */
    private boolean newton(double[] s, double omega) {
        int nx = problem.grid().nx();
        int nr = problem.grid().nr();
        double[] residual = new double[cells];
        double[] trialResidual = new double[cells];
        double[] jacobian = new double[cells * FilmEquations.STENCIL];
        double[] massTheta = new double[(nx + 1) * nr];
        double[] massRadial = new double[nx * (nr + 1)];
        double[] change = new double[cells];
        double[] trial = new double[cells];
        equations.evaluate(s, omega, residual, jacobian, massTheta, massRadial);
        double norm = norm(residual);
        imbalance = largest(residual) / passing(s, massRadial, jacobian);
        for (int iteration = 0; iteration < MOST_ITERATIONS; iteration++) {
            iterations++;
            // seven or so iterations are usual
            progress.accept(iterations / (iterations + 2.0));
            double scale = 1 / meanDiagonal(jacobian);
            if (!matrix.solve(jacobian, scale, residual, change)) {
                return false;
            }
            double length = 1;
            double trialNorm;
            while (true) {
                for (int n = 0; n < cells; n++) {
                    // a cell keeps at least a tenth of its s, so that no step leads below vacuum
                    trial[n] = Math.max(s[n] - length * change[n], 0.1 * s[n]);
                }
                equations.evaluate(trial, omega, trialResidual, null, null, null);
                trialNorm = norm(trialResidual);
                if (trialNorm < (1 - 1e-4 * length) * norm || length < SHORTEST_STEP) {
                    break;
                }
                length /= 2;
            }
            if (!(trialNorm < norm)) {
                // no descent left: solved as far as rounding allows, or stuck
                return imbalance <= CLOSED;
            }
            boolean done = imbalance <= CLOSED && trialNorm > 0.1 * norm;
            System.arraycopy(trial, 0, s, 0, cells);
            norm = trialNorm;
            equations.evaluate(s, omega, residual, jacobian, massTheta, massRadial);
            imbalance = largest(residual) / passing(s, massRadial, jacobian);
            if (done || imbalance == 0) {
                return true;
            }
        }
        return imbalance <= CLOSED;
    }

    /** Gas that passes through the sector's film: half of all that crosses the diameters and the feed (kg/s). */
    private double passing(double[] s, double[] massRadial, double[] jacobian) {
        SheetGrid grid = problem.grid();
        double sum = 0;
        for (int i = 0; i < grid.nx(); i++) {
            sum += Math.abs(massRadial[i * (grid.nr() + 1)]) + Math.abs(massRadial[i * (grid.nr() + 1) + grid.nr()]);
        }
        FeedLaw[] laws = problem.feed();
        for (int n = 0; n < cells; n++) {
            if (laws[n] != null) {
                sum += Math.abs(laws[n].flux(equations.pressure(s[n])) * problem.feedArea()[n]);
            }
        }
        // a film through which nothing passes is measured by its rounding
        double p = Math.max(problem.pressureInner(), problem.pressureOuter());
        return Math.max(0.5 * sum, 1e-4 * meanDiagonal(jacobian) * p * p);
    }

    private static double norm(double[] v) {
        double sum = 0;
        for (double value : v) {
            sum += value * value;
        }
        return Math.sqrt(sum);
    }

    private static double largest(double[] v) {
        double most = 0;
        for (double value : v) {
            most = Math.max(most, Math.abs(value));
        }
        return most;
    }

    private static double meanDiagonal(double[] jacobian) {
        double sum = 0;
        int count = jacobian.length / FilmEquations.STENCIL;
        for (int n = 0; n < count; n++) {
            sum += Math.abs(jacobian[n * FilmEquations.STENCIL + 4]);
        }
        return sum / count;
    }
}
