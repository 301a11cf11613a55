package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Random;
import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.ValueSource;

/** The balances themselves. */
class FilmEquationsTest {
    /** Steps, skew, feed and a film so thin that rotation rules: all terms take part. */
    private static FilmProblem grooved(double rate) {
        SheetGrid grid = TestFilms.even(0.050, 0.060, 12, 8, 9, 20);
        FilmProblem film = TestFilms.film(grid, (theta, r) -> 2e-6, rate, TestFilms.ATMOSPHERE, TestFilms.PROCESS);
        for (int i = 0; i < 8; i++) {
            for (int j = 0; j < 9; j++) {
                int n = grid.cell(i, j);
                film.thickness()[n] = i >= 2 && i < 6 && j > 2 && j < 7 ? 6e-6 : 2e-6;
                film.feed()[n] = j == 7 ? new FeedLaw.Porous(1e-12, 1e6) : null;
            }
        }
        return film;
    }

    /** Every derivative against central differences of the balances, at a field with random bumps. */
    @ParameterizedTest
    @ValueSource(doubles = {0, 300, -300, 5000, -5000})
    void jacobian_isTheDerivativeOfTheBalances(double rate) {
        FilmProblem film = grooved(rate);
        FilmEquations equations = new FilmEquations(film);
        SheetGrid grid = film.grid();
        int cells = grid.cells();
        Random random = new Random(20261201);
        double[] s = new double[cells];
        for (int n = 0; n < cells; n++) {
            double r = grid.middleRadius(n % grid.nr());
            double p = 3e5 + 4e5 * (r - 0.050) / 0.010;
            s[n] = p * p * (0.9 + 0.2 * random.nextDouble());
        }
        double[] residual = new double[cells];
        double[] jacobian = new double[cells * FilmEquations.STENCIL];
        equations.evaluate(s, rate, residual, jacobian, null, null);
        assertTrue(Math.abs(rate) < 1000 || equations.upwinded() > 0, "upstream pressure takes part at high speed");
        double scale = TestFilms.largest(jacobian);
        double[] up = new double[cells];
        double[] down = new double[cells];
        double largestDerivative = 0;
        for (int m = 0; m < cells; m++) {
            double step = 1e-5 * s[m];
            double keep = s[m];
            s[m] = keep + step;
            equations.evaluate(s, rate, up, null, null, null);
            s[m] = keep - step;
            equations.evaluate(s, rate, down, null, null, null);
            s[m] = keep;
            for (int n = 0; n < cells; n++) {
                double expected = (up[n] - down[n]) / (2 * step);
                assertEquals(expected, entry(grid, jacobian, n, m), 1e-8 * scale, "cell " + n + " by cell " + m);
                largestDerivative = Math.max(largestDerivative, Math.abs(expected));
            }
        }
        assertEquals(scale, largestDerivative, 1e-6 * scale);
    }

    private static double entry(SheetGrid grid, double[] jacobian, int n, int m) {
        int nx = grid.nx();
        int di = (m / grid.nr() - n / grid.nr() + nx + nx / 2) % nx - nx / 2;
        int dj = m % grid.nr() - n % grid.nr();
        return Math.abs(di) > 1 || Math.abs(dj) > 1 ? 0 : jacobian[n * FilmEquations.STENCIL + 3 * (dj + 1) + di + 1];
    }

    /** What leaves one cell enters the next, whatever the field: all balances add up to the flows over the rims. */
    @Test
    void balances_addUpToTheFlowsOverTheRims() {
        FilmProblem film = grooved(1000);
        FilmEquations equations = new FilmEquations(film);
        int cells = film.grid().cells();
        Random random = new Random(7);
        double[] s = new double[cells];
        for (int n = 0; n < cells; n++) {
            s[n] = 1e11 * (1 + random.nextDouble());
        }
        double[] residual = new double[cells];
        double[] massTheta = new double[9 * 9];
        double[] massRadial = new double[8 * 10];
        equations.evaluate(s, 1000, residual, null, massTheta, massRadial);
        for (int i = 0; i < 8; i++) {
            for (int j = 0; j < 9; j++) {
                int n = film.grid().cell(i, j);
                double out = massTheta[(i + 1) * 9 + j]
                        - massTheta[i * 9 + j]
                        + massRadial[i * 10 + j + 1]
                        - massRadial[i * 10 + j];
                FeedLaw law = film.feed()[n];
                double fed = law == null ? 0 : law.flux(Math.sqrt(s[n])) * film.feedArea()[n];
                assertEquals(residual[n], out - fed, 1e-13 * TestFilms.largest(massTheta));
            }
        }
    }

    /** The elimination order holds every cell once. */
    @ParameterizedTest
    @ValueSource(ints = {1, 2, 7, 8, 33, 100})
    void eliminationOrder_holdsEveryCellOnce(int nr) {
        for (int nx : new int[] {3, 8, 17, 64}) {
            boolean[] seen = new boolean[nx * nr];
            int[] order = EliminationOrder.nestedDissection(nx, nr);
            assertEquals(nx * nr, order.length);
            for (int cell : order) {
                assertTrue(!seen[cell], "cell " + cell + " twice");
                seen[cell] = true;
            }
        }
    }
}
