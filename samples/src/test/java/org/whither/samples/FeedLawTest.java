package org.whither.samples;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.Test;

class FeedLawTest {
    private static final FeedLaw.Orifice ORIFICE = new FeedLaw.Orifice(1e6, 300, 287, 1.4, 1e-3);
    private static final FeedLaw.Porous POROUS = new FeedLaw.Porous(1e-12, 1e6);

    /**
     * Air chokes at p/p₀ = 0.5283, and then passes ṁ √(Rₛ T₀)/(p₀ A) = √γ (2/(γ + 1))^((γ + 1)/(2(γ − 1))) = 0.6847. Source:
     * isentropic tables for γ = 1.4, as in NACA Report 1135, 1953.
     */
    @Test
    void orifice_chokesAsInTheTables() {
        assertEquals(0.5283, ORIFICE.criticalRatio(), 5e-5);
        double choked = ORIFICE.flux(0.5282e6);
        assertEquals(0.6847, choked * Math.sqrt(287 * 300) / (1e6 * 1e-3), 5e-5);
        assertEquals(choked, ORIFICE.flux(1e5), 1e-9 * choked, "no more flow below the critical ratio");
        assertEquals(choked, ORIFICE.flux(0.52828e6), 1e-7 * choked, "continuous there");
        assertTrue(ORIFICE.flux(0.6e6) < 0.995 * choked, "less flow above it");
        assertEquals(0, ORIFICE.slope(0.4e6));
    }

    /** Far from choking the law becomes Bernoulli's, q = A √(2 ρ Δp), here within Δp/p. */
    @Test
    void orifice_nearEqualPressuresIsIncompressible() {
        double drop = 4e3;
        double density = 1e6 / (287 * 300);
        assertEquals(1, ORIFICE.flux(1e6 - drop) / (1e-3 * Math.sqrt(2 * density * drop)), 4e-3);
    }

    @Test
    void orifice_letsGasBackTheSameWay() {
        FeedLaw.Orifice turned = new FeedLaw.Orifice(1.7e6, 300, 287, 1.4, 1e-3);
        for (double p : new double[] {1.0001e6, 1.01e6, 1.7e6, 4e6}) {
            FeedLaw.Orifice other = new FeedLaw.Orifice(p, 300, 287, 1.4, 1e-3);
            assertEquals(-other.flux(1e6), ORIFICE.flux(p), 1e-15);
        }
        assertEquals(0, turned.flux(1.7e6));
    }

    /** q = K (pₛ² − p²), and nothing at equal pressures. */
    @Test
    void porous_isLinearInTheSquares() {
        assertEquals(1e-12 * (1e12 - 0.49e12), POROUS.flux(0.7e6), 1e-15);
        assertEquals(-1e-12 * 0.44e12, POROUS.flux(1.2e6), 1e-15);
        assertEquals(0, POROUS.flux(1e6));
    }

    /** Slopes against central differences on both sides of every change of branch. */
    @Test
    void slopes_areTheDerivatives() {
        for (FeedLaw law : List.of(ORIFICE, POROUS, new FeedLaw.Given(0.1))) {
            for (double p : new double[] {
                0.2e6, 0.52e6, 0.54e6, 0.8e6, 0.9985e6, 0.9995e6, 1.0003e6, 1.0015e6, 1.3e6, 1.8e6, 2.5e6
            }) {
                double step = 1;
                double expected = (law.flux(p + step) - law.flux(p - step)) / (2 * step);
                assertEquals(expected, law.slope(p), 1e-5 * Math.abs(expected) + 1e-16, law + " at " + p);
            }
        }
    }

    /** Flow falls as the film pressure rises, through all branches. */
    @Test
    void orifice_neverRisesWithFilmPressure() {
        double last = Double.POSITIVE_INFINITY;
        for (int n = 1; n < 30000; n++) {
            double flux = ORIFICE.flux(n * 100.0);
            assertTrue(flux <= last, "at " + n * 100.0 + " Pa");
            last = flux;
        }
    }
}
