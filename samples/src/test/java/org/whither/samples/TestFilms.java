package org.whither.samples;

import java.util.Arrays;
import java.util.function.DoubleBinaryOperator;

/** Films of simple shape, for the tests. */
final class TestFilms {
    static final double VISCOSITY = 1.78e-5;
    static final double GAS_CONSTANT = 296.8;
    static final double TEMPERATURE = 300;
    static final double PROCESS = 0.7e6;
    static final double ATMOSPHERE = 101325;

    private TestFilms() {}

    /** Even spacing in θ and ln r; lines that run at a given angle from the circumference, 90° for radial ones. */
    static SheetGrid even(double from, double to, int sectors, int nx, int nr, double lineAngle) {
        double[] xi = new double[nx + 1];
        for (int i = 0; i <= nx; i++) {
            xi[i] = 2 * Math.PI / sectors * i / nx;
        }
        double[] radius = new double[nr + 1];
        double[] offset = new double[nr + 1];
        for (int j = 0; j <= nr; j++) {
            radius[j] = from * Math.pow(to / from, (double) j / nr);
            offset[j] = Math.log(radius[j] / from) / Math.tan(Math.toRadians(lineAngle));
        }
        radius[nr] = to;
        return new SheetGrid(xi, radius, offset, sectors);
    }

    /** A film without feed, its thickness by θ and r of the cell's centre. */
    static FilmProblem film(
            SheetGrid grid, DoubleBinaryOperator thickness, double rotationRate, double inner, double outer) {
        double[] h = new double[grid.cells()];
        for (int i = 0; i < grid.nx(); i++) {
            for (int j = 0; j < grid.nr(); j++) {
                h[grid.cell(i, j)] = thickness.applyAsDouble(grid.middleTheta(i, j), grid.middleRadius(j));
            }
        }
        return new FilmProblem(
                grid,
                h,
                new FeedLaw[grid.cells()],
                FilmProblem.cellAreas(grid),
                VISCOSITY,
                GAS_CONSTANT,
                TEMPERATURE,
                rotationRate,
                inner,
                outer);
    }

    static FilmSolver.Solution solve(FilmProblem problem) {
        return new FilmSolver(problem).solve(share -> {});
    }

    /** Mass flow of the whole ring outwards through ring j of nodes (kg/s). */
    static double ringFlow(FilmProblem problem, FilmSolver.Solution solution, int j) {
        SheetGrid grid = problem.grid();
        double sum = 0;
        for (int i = 0; i < grid.nx(); i++) {
            sum += solution.massRadial()[i * (grid.nr() + 1) + j];
        }
        return sum * grid.sectors();
    }

    static double largest(double[] v) {
        return Arrays.stream(v).map(Math::abs).max().orElse(0);
    }
}
