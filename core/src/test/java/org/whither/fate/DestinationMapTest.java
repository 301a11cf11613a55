package org.whither.fate;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;

import org.junit.jupiter.api.Test;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.RadialCase;
import org.whither.trace.Direction;
import org.whither.trace.TraceSettings;

class DestinationMapTest {
    private static final FilmGrid GRID = RadialCase.grid(6, RadialCase.radii(20, 16, 2e-4), 6, 0.4);
    private static final FilmFlow FLOW = FilmFlow.of(RadialCase.film(GRID, true));
    private static final TraceSettings HOW = new TraceSettings(Frame.STATIONARY, Direction.BACKWARD, 1e-5, 1);

    @Test
    void radialFilm_sendsItsGasToTheNearerDiameterOfTheFeed() {
        // Without grooves gas runs straight away from the feed at 60 mm, whatever its height.
        for (double sigma : new double[] {0.2, 0.5, 0.9}) {
            DestinationMap map = DestinationMap.of(FLOW, HOW, 5, 37, sigma, 2, x -> {});
            for (int q = 0; q < map.radii(); q++) {
                double r = map.radius(q);
                if (Math.abs(r - RadialCase.FEED_RADIUS) < 2e-4) {
                    continue;
                }
                Destination expected = r < RadialCase.FEED_RADIUS ? Destination.INNER : Destination.OUTER;
                for (int p = 0; p < map.phases(); p++) {
                    assertEquals(expected, map.destination(p, q), "at radius " + r);
                    assertEquals(expected, map.at(map.theta(p, q) + 3 * GRID.pitch(), r));
                }
            }
        }
    }

    @Test
    void points_outOfBounds_areRefused() {
        assertThrows(IllegalArgumentException.class, () -> DestinationMap.of(FLOW, HOW, 0, 4, 0.5, 1, x -> {}));
        assertThrows(IllegalArgumentException.class, () -> DestinationMap.of(FLOW, HOW, 4, 4, 1.0, 1, x -> {}));
    }
}
