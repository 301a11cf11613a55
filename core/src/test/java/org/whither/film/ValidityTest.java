package org.whither.film;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;

class ValidityTest {
    private static final FilmGrid GRID = RadialCase.grid(6, RadialCase.radii(40, 32, 2e-4), 12, 0.2);

    /**
     * Against hand values of the base case: ρ|Ω|h²/µ at 1 MPa is 11.231 · 1256.637 · 1.6e-11 / 1.78e-5 = 0.01269; the mean
     * free path µ/p √(π R T / 2) at 101325 Pa is 6.570e-8 m (textbooks give 6.6e-8 m for nitrogen at 300 K, from memory),
     * over 4 µm 0.01642; the mean speed at the inner edge is ṁ/(2π r ρ h) = 40.1 m/s, 1.5 times that over √(RT) = 298.4 m/s.
     */
    @Test
    void validity_baseCase_hasHandValues() {
        Validity validity = Validity.of(FilmFlow.of(RadialCase.film(GRID, true)));
        assertEquals(0.01269, validity.reducedReynolds(), 1e-4);
        assertEquals(0.01642, validity.knudsen(), 5e-5);
        assertEquals(1.5 * 40.13 / 298.4, validity.exitMach(), 2e-3);
        assertEquals(0, validity.slope(), 0);
        assertEquals(1, validity.warnings().size());
        assertTrue(validity.warnings().get(0).contains("slip"));
    }

    @Test
    void validity_samePointsOnFineGrid_doNotDependOnTheGrid() {
        FilmGrid fine = RadialCase.grid(6, RadialCase.radii(160, 128, 2e-4), 12, 0.2);
        Validity coarse = Validity.of(FilmFlow.of(RadialCase.film(GRID, true)));
        Validity finer = Validity.of(FilmFlow.of(RadialCase.film(fine, true)));
        assertEquals(coarse.knudsen(), finer.knudsen(), 1e-9);
        assertEquals(coarse.exitMach(), finer.exitMach(), 1e-3);
    }
}
