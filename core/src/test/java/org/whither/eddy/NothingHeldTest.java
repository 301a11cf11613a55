package org.whither.eddy;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;
import org.whither.film.ConservingFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.RadialCase;

/** Films in which nothing turns: whatever the number of tracers, nothing may be found. */
class NothingHeldTest {
    private static EddySettings settings(int budget) {
        return new EddySettings(Frame.ROTATING, 1e-6, EddySettings.PATIENCE, budget, 1, 2);
    }

    /**
     * The radial film between turning faces: rotation, shear across the film and through-flow. Gas close to the faces stays
     * longer than any limit (its residence goes as 1/(σ(1 − σ)), Reynolds 1886), but is not held.
     */
    @Test
    void of_radialFilm_findsNothing() {
        FilmGrid grid = RadialCase.grid(6, RadialCase.radii(24, 18, 2e-4), 5, 0.3);
        Eddies eddies = Eddies.of(new ConservingFlow(RadialCase.film(grid, true)), settings(8192), x -> {});
        assertTrue(eddies.zones().isEmpty());
        assertTrue(eddies.small().isEmpty());
        assertEquals(0, eddies.heldMassShare(), 0);
        assertTrue(eddies.creepingMassShare() > 1e-3);
        // All gas goes through, so its residences fill the film (Danckwerts 1953).
        Unflushed unflushed = eddies.heldByResidence();
        assertTrue(unflushed.low() < 0.005 && unflushed.high() > 0, unflushed.toString());
        assertTrue(unflushed.high() - unflushed.low() < 0.1, unflushed.toString());
        assertEquals(0, eddies.reversed().volumeShare(), 0);
        assertEquals(0, eddies.reversed().uphillShare(), 0);
        // With N tracers a share m is missed with probability (1 − m)^N.
        assertEquals(0.05, Math.pow(1 - eddies.smallestSeen(), 2048), 1e-9);
        // Plates: the median residence is 0.758105 of the mean (Danckwerts 1953); the two ends of this film mixed by
        // flow.
        double mean = (RadialCase.INNER_FLOW * RadialCase.INNER_TIME + RadialCase.OUTER_FLOW * RadialCase.OUTER_TIME)
                / (RadialCase.INNER_FLOW + RadialCase.OUTER_FLOW);
        assertEquals(0.758105 * mean, eddies.medianResidence(), 0.1 * mean);
    }

    @Test
    void settings_outOfRange_areRefused() {
        assertThrows(IllegalArgumentException.class, () -> new EddySettings(Frame.ROTATING, 1e-6, 0.5, 4096, 1, 1));
        assertThrows(IllegalArgumentException.class, () -> new EddySettings(Frame.ROTATING, 1e-6, 20, 10, 1, 1));
    }
}
