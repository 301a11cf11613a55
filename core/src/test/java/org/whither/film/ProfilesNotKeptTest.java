package org.whither.film;

import static org.junit.jupiter.api.Assertions.assertArrayEquals;
import static org.junit.jupiter.api.Assertions.assertEquals;

import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;

/** A field too large for its profiles to be kept moves exactly as one whose profiles are. */
class ProfilesNotKeptTest {
    @Test
    void rates_profilesFormedAnew_areTheSameToTheLastBit() {
        Film film = new WavyCase(12, 10, 8, 1.5).full(9, Frame.STATIONARY);
        ConservingFlow kept = new ConservingFlow(film, Long.MAX_VALUE);
        ConservingFlow anew = new ConservingFlow(film, 0);
        FilmGrid grid = film.grid();
        SplittableRandom random = new SplittableRandom(5);
        double[] a = new double[3];
        double[] b = new double[3];
        for (int n = 0; n < 3000; n++) {
            int i = random.nextInt(grid.cellsTheta());
            int j = random.nextInt(grid.cellsRadial());
            int k = random.nextInt(kept.layers());
            double r = grid.radius(j) + random.nextDouble() * (grid.radius(j + 1) - grid.radius(j));
            double theta = grid.lineTheta(i, j, r)
                    + random.nextDouble() * (grid.lineTheta(i + 1, j, r) - grid.lineTheta(i, j, r));
            double sigma = kept.level(k) + random.nextDouble() * (kept.level(k + 1) - kept.level(k));
            kept.rates(i, j, k, theta, r, sigma, a);
            anew.rates(i, j, k, theta, r, sigma, b);
            assertArrayEquals(a, b);
            assertEquals(kept.radialFlowBelow(i, j, sigma), anew.radialFlowBelow(i, j, sigma));
        }
        double[] load = new double[PackedFlow.NUMBERS * PackedFlow.LANES];
        double[] again = new double[PackedFlow.NUMBERS * PackedFlow.LANES];
        for (int n = 0; n < 300; n++) {
            int i = random.nextInt(grid.cellsTheta());
            int j = random.nextInt(grid.cellsRadial());
            int k = random.nextInt(kept.layers());
            kept.packed().orElseThrow().load(i, j, k, load, 0);
            anew.packed().orElseThrow().load(i, j, k, again, 0);
            assertArrayEquals(load, again);
        }
    }
}
