package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/** Films with an exact solution. */
class ExactFilmTest {
    private static final double SUPPLY = 1.0e6;
    private static final double FILM = 4e-6;
    private static final double RATE = 2 * Math.PI * 200;

    /**
     * Radial isothermal flow of an ideal gas between parallel faces, m = π h³ (p₁² − p₂²)/(12 µ Rₛ T ln(r₂/r₁)): Reynolds
     * 1886, in any text on gas films. s = p² is linear in ln r, which the method must meet to rounding on every grid; the
     * figures were computed from the formula in double precision outside the project.
     */
    @ParameterizedTest
    @CsvSource({"90, 0", "90, 1256.6370614359173", "15, 1256.6370614359173", "-20, 1256.6370614359173", "15, -400"})
    void radialFlow_meetsTheFormulaOnEveryGrid(double lineAngle, double rate) {
        FilmProblem inner = TestFilms.film(
                TestFilms.even(0.050, 0.060, 12, 12, 17, lineAngle),
                (theta, r) -> FILM,
                rate,
                TestFilms.ATMOSPHERE,
                SUPPLY);
        FilmProblem outer = TestFilms.film(
                TestFilms.even(0.060, 0.068, 12, 12, 14, lineAngle),
                (theta, r) -> FILM,
                rate,
                SUPPLY,
                TestFilms.PROCESS);
        FilmSolver.Solution in = TestFilms.solve(inner);
        FilmSolver.Solution out = TestFilms.solve(outer);
        double toInner = -TestFilms.ringFlow(inner, in, 0);
        double toOuter = TestFilms.ringFlow(outer, out, 14);
        assertEquals(5.738833e-5, toInner, 5e-12, "to the inner diameter, kg/s");
        assertEquals(4.307618e-5, toOuter, 5e-12, "to the outer diameter, kg/s");
        assertEquals(0.571230, toInner / (toInner + toOuter), 5e-7, "share to the inner diameter");
        // s in the cell centres is exact, and so is what lies between them on the line in ln r
        SheetGrid grid = inner.grid();
        int j = 0;
        while (grid.middleRadius(j + 1) < 0.055) {
            j++;
        }
        double b = Math.log(0.055 / grid.middleRadius(j)) / Math.log(grid.middleRadius(j + 1) / grid.middleRadius(j));
        for (int i = 0; i < grid.nx(); i++) {
            double s = (1 - b) * in.s()[grid.cell(i, j)] + b * in.s()[grid.cell(i, j + 1)];
            assertEquals(726401, Math.sqrt(s), 0.5, "pressure at 55 mm, Pa");
        }
        double k = FILM * FILM * FILM / (24 * TestFilms.VISCOSITY * TestFilms.GAS_CONSTANT * TestFilms.TEMPERATURE);
        double formula =
                2 * Math.PI * k * (SUPPLY * SUPPLY - TestFilms.ATMOSPHERE * TestFilms.ATMOSPHERE) / Math.log(1.2);
        assertEquals(1, toInner / formula, 1e-11, "against the formula itself");
    }

    /** Rotation drags p h Ω r/(2 Rₛ T) through every upright face: over a row, −p h Ω (r₁² − r₀²)/(4 Rₛ T). */
    @Test
    void rotationFlow_isThatOfTheTurningFrame() {
        FilmProblem film = TestFilms.film(
                TestFilms.even(0.050, 0.060, 12, 8, 10, 90),
                (theta, r) -> FILM,
                RATE,
                TestFilms.PROCESS,
                TestFilms.PROCESS);
        FilmSolver.Solution solved = TestFilms.solve(film);
        for (int j = 0; j < 10; j++) {
            double r0 = film.grid().radius(j);
            double r1 = film.grid().radius(j + 1);
            double expected = -TestFilms.PROCESS
                    / (TestFilms.GAS_CONSTANT * TestFilms.TEMPERATURE)
                    * FILM
                    * RATE
                    * (r1 * r1 - r0 * r0)
                    / 4;
            for (int i = 0; i <= 8; i++) {
                assertEquals(expected, solved.massTheta()[i * 10 + j], 1e-12 * Math.abs(expected));
            }
        }
    }

    /**
     * Figures of a plain film as a whole: power π µ Ω² (r₂⁴ − r₁⁴)/(2 h) = 167.02 W and the mean free path at the inner
     * edge from formulas computed outside the project, opening force against a fine sum over the exact pressure.
     */
    @Test
    void plainFilm_hasTheKnownPowerAndForce() {
        FilmProblem film = TestFilms.film(
                TestFilms.even(0.050, 0.068, 12, 8, 160, 30),
                (theta, r) -> FILM,
                RATE,
                TestFilms.ATMOSPHERE,
                TestFilms.PROCESS);
        SolverFacts facts = FactFinder.facts(film, TestFilms.solve(film));
        assertEquals(167.02, facts.filmPower(), 0.02, "power, W; second order in the cells' height");
        double low = TestFilms.ATMOSPHERE * TestFilms.ATMOSPHERE;
        double high = TestFilms.PROCESS * TestFilms.PROCESS;
        double force = 0;
        int n = 100_000;
        for (int m = 0; m < n; m++) {
            double r = 0.050 + 0.018 * (m + 0.5) / n;
            double p = Math.sqrt(low + (high - low) * Math.log(r / 0.050) / Math.log(0.068 / 0.050));
            force += 2 * Math.PI * r * p * 0.018 / n;
        }
        assertEquals(1, facts.openingForce() / force, 1e-4, "opening force");
        assertEquals(facts.innerOut(), facts.outerIn(), 1e-10 * facts.innerOut());
        assertEquals(0.7e6, facts.peakPressure(), 0.01e6);
        assertEquals(TestFilms.PROCESS / (296.8 * 300) * RATE * 16e-12 / 1.78e-5, facts.reducedReynolds(), 2e-4);
        assertEquals(0.0164, facts.knudsen(), 1e-4, "0.022 at 3 µm and the same pressure");
    }
}
