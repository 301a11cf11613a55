package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;
import org.junit.jupiter.params.ParameterizedTest;
import org.junit.jupiter.params.provider.CsvSource;

/**
 * Many narrow spiral grooves without net flow. Source: E. A. Muijderman, Spiral Groove Bearings, 1966: the pressure rises
 * across endless grooves by dp/dy = (6 µ U/h₂²) g₁, with g₁ = γ H² cot α (1 − H)(1 − H³)/[(1 + γ H³)(γ + H³) +
 * H³ cot² α (1 + γ)²], H = h₂/h₁ the film over the land by the film over the groove, γ the width of land by groove, α the
 * angle between groove and circumference.
 */
class EndlessGroovesTest {
    private static final double LAND = 4e-6;
    private static final double RATE = 1000;
    private static final double FROM = 0.050;
    private static final double TO = 0.060;
    /** So far above the pressure the grooves build that the gas hardly changes its density (Pa). */
    private static final double LEVEL = 1e8;

    private static double muijderman(double alpha, double h, double gamma) {
        double h3 = h * h * h;
        double cot = 1 / Math.tan(alpha);
        return gamma
                * h
                * h
                * cot
                * (1 - h)
                * (1 - h3)
                / ((1 + gamma * h3) * (gamma + h3) + h3 * cot * cot * (1 + gamma) * (1 + gamma));
    }

    /** The formula's greatest value and one more, computed outside the project. */
    @Test
    void formula_givesTheKnownValues() {
        assertEquals(0.0713851, muijderman(Math.toRadians(15), 0.4, 1), 5e-8);
        assertEquals(0.0911763, muijderman(Math.toRadians(15.678), 0.27373, 1), 5e-8);
    }

    /**
     * g₁ of a ring full of grooves from FROM to TO: with U = Ω r the endless formula integrates to
     * Δp = 3 µ Ω g₁ (r₂² − r₁²)/h₂². The outer pressure is set so that no gas passes.
     */
    private static double grooved(int grooves, double angle, double h, double gamma, int perPitch) {
        int nr = (int) Math.ceil(Math.log(TO / FROM) / (2 * Math.PI / grooves / perPitch * Math.tan(angle)));
        SheetGrid even = TestFilms.even(FROM, TO, grooves, perPitch, nr, Math.toDegrees(angle));
        double estimate =
                3 * TestFilms.VISCOSITY * RATE * muijderman(angle, h, gamma) * (TO * TO - FROM * FROM) / (LAND * LAND);
        // the flow is all but linear in the pressure set: secants
        double[] outer = {LEVEL - estimate, LEVEL};
        double[] flow = {flowAt(even, h, gamma, outer[0]), flowAt(even, h, gamma, outer[1])};
        double free = Math.abs(flow[1]);
        for (int n = 0; n < 5 && Math.abs(flow[1]) > 1e-7 * free; n++) {
            double next = outer[1] - flow[1] * (outer[1] - outer[0]) / (flow[1] - flow[0]);
            outer = new double[] {outer[1], next};
            flow = new double[] {flow[1], flowAt(even, h, gamma, next)};
        }
        assertTrue(Math.abs(flow[1]) <= 1e-7 * free, "net flow left");
        return (LEVEL - outer[1]) * LAND * LAND / (3 * TestFilms.VISCOSITY * RATE * (TO * TO - FROM * FROM));
    }

    private static double flowAt(SheetGrid even, double h, double gamma, double outer) {
        FilmProblem film = TestFilms.film(even, (theta, r) -> LAND, RATE, LEVEL, outer);
        double pitch = 2 * Math.PI / even.sectors();
        for (int i = 0; i < even.nx(); i++) {
            boolean groove = 0.5 * (even.xi(i) + even.xi(i + 1)) < pitch / (1 + gamma);
            for (int j = 0; j < even.nr(); j++) {
                film.thickness()[even.cell(i, j)] = groove ? LAND / h : LAND;
            }
        }
        return TestFilms.ringFlow(film, TestFilms.solve(film), 0);
    }

    /**
     * The ends of the grooves cost pressure over about one groove's width, so the gap to the endless formula falls as one
     * over the number of grooves. Taking that part away (Richardson) leaves what falls faster. Measured: the gaps halve
     * within half a percent, and the limits differ from the formula by 5 to 10 parts in a million; the tolerances leave room
     * for five times as much.
     */
    @ParameterizedTest
    @CsvSource({"15, 0.4, 1", "20, 0.5, 2", "15.678, 0.27373, 1"})
    void pressureRise_approachesMuijdermanWithMoreGrooves(double degrees, double h, double gamma) {
        double angle = Math.toRadians(degrees);
        double exact = muijderman(angle, h, gamma);
        int perPitch = 12;
        double[] gap = new double[4];
        double[] g = new double[4];
        for (int n = 0; n < 4; n++) {
            int grooves = 24 << n;
            g[n] = grooved(grooves, angle, h, gamma, perPitch);
            gap[n] = 1 - g[n] / exact;
        }
        double limit = 2 * g[3] - g[2];
        for (int n = 0; n < 3; n++) {
            assertEquals(2, gap[n] / gap[n + 1], 0.02, "gap to the endless formula halves with twice the grooves");
        }
        assertEquals(1, limit / exact, 5e-5, "against " + exact);
    }
}
