package org.whither.fate;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;

class IntervalTest {
    /** E. B. Wilson, J. Am. Stat. Assoc. 22 (1927); values 0/20 and 0/4096 as R. G. Newcombe, Stat. Med. 17 (1998), has it. */
    @Test
    void interval_noHits_isWilsons() {
        assertEquals(0.1611, Interval.ofReplicates(new int[4], 5).high(), 5e-5);
        assertEquals(0.000937, Interval.ofReplicates(new int[16], 256).high(), 5e-7);
        assertEquals(0, Interval.ofReplicates(new int[16], 256).low(), 0);
        int[] all = {5, 5, 5, 5};
        assertEquals(1 - 0.1611, Interval.ofReplicates(all, 5).low(), 5e-5);
    }

    /** Student's t, 95 %, 4 replicates: 3.182446 (any table of the t distribution). */
    @Test
    void interval_replicates_isStudents() {
        Interval interval = Interval.ofReplicates(new int[] {40, 44, 36, 40}, 100);
        double deviation = Math.sqrt((0.04 * 0.04 + 0.04 * 0.04) / 3);
        assertEquals(0.40, interval.share(), 1e-15);
        assertEquals(2 * 3.182446 * deviation / 2, interval.width(), 1e-6);
    }

    /** An interval of 95 % holds the true share in about 95 of 100 cases (binomial: 2000 cases, 4 standard deviations). */
    @Test
    void interval_randomReplicates_coversTheShare() {
        SplittableRandom random = new SplittableRandom(11);
        int covered = 0;
        int cases = 2000;
        for (int n = 0; n < cases; n++) {
            int[] hits = new int[16];
            for (int m = 0; m < 16; m++) {
                for (int k = 0; k < 64; k++) {
                    hits[m] += random.nextDouble() < 0.3 ? 1 : 0;
                }
            }
            Interval interval = Interval.ofReplicates(hits, 64);
            covered += interval.low() <= 0.3 && 0.3 <= interval.high() ? 1 : 0;
        }
        double sd = Math.sqrt(0.95 * 0.05 / cases);
        assertTrue(Math.abs((double) covered / cases - 0.95) < 4 * sd, covered + " of " + cases);
    }
}
