package org.whither.eddy;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import org.junit.jupiter.api.Test;
import org.whither.film.ConservingFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.RadialCase;
import org.whither.trace.Direction;
import org.whither.trace.TraceSettings;

/**
 * The age of the gas of the exact radial film (Reynolds 1886): between two radii it grows by the gas between them over the
 * mass flow, over 6σ(1 − σ).
 */
class AgeMapTest {
    private static final FilmGrid GRID = RadialCase.grid(6, RadialCase.radii(40, 30, 2e-4), 5, 0.3);
    private static final ConservingFlow FLOW = new ConservingFlow(RadialCase.film(GRID, true));

    private static AgeMap map(double limit) {
        return AgeMap.of(
                FLOW, new TraceSettings(Frame.STATIONARY, Direction.FORWARD, 1e-7, limit), 3, 36, 5, 2, x -> {});
    }

    /** Mean time from one radius to another: film mass between over mass flow, by Simpson's rule (s). */
    private static double time(double from, double to, double massFlow) {
        int n = 2000;
        double sum = 0;
        for (int i = 0; i <= n; i++) {
            double r = from + (to - from) * i / n;
            double weight = i == 0 || i == n ? 1 : i % 2 == 1 ? 4 : 2;
            sum += weight * RadialCase.NITROGEN.density(RadialCase.pressure(r), 300) * RadialCase.H * 2 * Math.PI * r;
        }
        return Math.abs(sum * (to - from) / n / 3 / massFlow);
    }

    @Test
    void of_radialFilm_growsAsTheGasBetween() {
        AgeMap map = map(1);
        assertEquals(0.3, map.sigma(1), 1e-15);
        for (int p = 0; p < 3; p++) {
            for (int s = 0; s < 5; s++) {
                double slow = 6 * map.sigma(s) * (1 - map.sigma(s));
                // Inwards of the feed, then outwards.
                double inner = time(map.radius(15), map.radius(2), RadialCase.INNER_FLOW) / slow;
                assertEquals(inner, map.age(p, 2, s) - map.age(p, 15, s), 2e-3 * inner);
                double outer = time(map.radius(23), map.radius(33), RadialCase.OUTER_FLOW) / slow;
                assertEquals(outer, map.age(p, 33, s) - map.age(p, 23, s), 2e-3 * outer);
            }
        }
    }

    @Test
    void column_quantiles_followTheProfile() {
        AgeMap map = map(1);
        // Of five equal parts the middle one is youngest, then come two pairs.
        assertEquals(map.age(1, 4, 2), map.column(1, 4, 0.05), 1e-12);
        assertEquals(map.age(1, 4, 1), map.column(1, 4, 0.5), 0.05 * map.age(1, 4, 1));
        assertTrue(map.column(1, 4, 0.9) > map.column(1, 4, 0.5));
        assertEquals(map.column(1, 4, 0.5), map.at(map.theta(1, 4), map.radius(4), -1), 1e-9);
        assertEquals(map.age(1, 4, 3), map.at(map.theta(1, 4) + 7 * GRID.pitch(), map.radius(4), 3), 1e-12);
        double between = map.at(map.theta(1, 4), 0.5 * (map.radius(4) + map.radius(5)), 2);
        assertEquals(0.5 * (map.age(1, 4, 2) + map.age(1, 5, 2)), between, 1e-12);
    }

    @Test
    void of_oldGas_isToldAsOlderThanTheLimit() {
        double limit = time(RadialCase.FEED_RADIUS, 0.0525, RadialCase.INNER_FLOW) / 1.5;
        AgeMap map = map(limit);
        assertEquals(limit, map.limit(), 0);
        assertEquals(Double.POSITIVE_INFINITY, map.age(0, 0, 2), 0);
        assertTrue(map.age(0, 8, 2) < limit);
        assertEquals(Double.POSITIVE_INFINITY, map.column(0, 0, 0.5), 0);
        assertTrue(map.film(0.3) < limit);
    }

    @Test
    void of_noPoints_isRefused() {
        TraceSettings how = new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-6, 1);
        assertThrows(IllegalArgumentException.class, () -> AgeMap.of(FLOW, how, 0, 3, 3, 1, x -> {}));
    }
}
