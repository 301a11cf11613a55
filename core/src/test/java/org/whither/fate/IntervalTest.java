package org.whither.fate;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;

class IntervalTest {
    /**
     * E. B. Wilson, J. Am. Stat. Assoc. 22 (1927). R. G. Newcombe, Stat. Med. 17 (1998) 857–872, table I, method 3, has the
     * two-sided 95 % bounds, one-sided 97.5 %: 81/263 … 0.3662, 15/148 … 0.1605, 0/20 … 0.1611, 1/29 … 0.1718.
     */
    @Test
    void upperBound_publishedCases_isWilsons() {
        assertEquals(0.3662, Interval.upperBound(81, 263, 0.975), 5e-5);
        assertEquals(0.1605, Interval.upperBound(15, 148, 0.975), 5e-5);
        assertEquals(0.1611, Interval.upperBound(0, 20, 0.975), 5e-5);
        assertEquals(0.1718, Interval.upperBound(1, 29, 0.975), 5e-5);
        assertEquals(1, Interval.upperBound(0, 0, 0.95), 0);
    }

    /** One random point in each of as many parts of very unequal chances: the bound holds at least as often as it says. */
    @Test
    void upperBound_unequalChances_holds() {
        SplittableRandom random = new SplittableRandom(11);
        int cases = 4000;
        int trials = 400;
        for (double[] chances : new double[][] {{0.01, 1}, {0.05, 0.2}, {0.5, 0.02}}) {
            int held = 0;
            for (int n = 0; n < cases; n++) {
                int hits = 0;
                for (int m = 0; m < trials * chances[1]; m++) {
                    hits += random.nextDouble() < chances[0] ? 1 : 0;
                }
                held += Interval.upperBound(hits, trials, 0.96) >= chances[0] * chances[1] ? 1 : 0;
            }
            // Wilson's bound is close, not exact: four standard deviations and 1 %.
            double least = 0.96 - 4 * Math.sqrt(0.96 * 0.04 / cases) - 0.01;
            assertTrue(held >= least * cases, held + " of " + cases);
        }
    }

    /**
     * R. G. Newcombe, Stat. Med. 17 (1998) 857–872, table I, method 5: 81 of 263, 15 of 148, 0 of 20 and 1 of 29 (from
     * memory, and as beta quantiles).
     */
    @Test
    void exact_publishedCases_isClopperAndPearsons() {
        double[][] cases = {
            {81, 263, 0.2527, 0.3676}, {15, 148, 0.0578, 0.1617}, {0, 20, 0, 0.1684}, {1, 29, 0.0009, 0.1776}
        };
        for (double[] one : cases) {
            Interval interval = Interval.exact((int) one[0], (int) one[1], 0.95);
            assertEquals(one[2], interval.low(), 5e-5);
            assertEquals(one[3], interval.high(), 5e-5);
            Interval other = Interval.exact((int) (one[1] - one[0]), (int) one[1], 0.95);
            assertEquals(1 - one[3], other.low(), 5e-5);
        }
    }

    @Test
    void within_bounds_areCutToShares() {
        assertEquals(new Interval(0.4, 0.39, 0.41), Interval.within(0.4, 0.39, 0.41));
        assertEquals(new Interval(0, 0, 0.01), Interval.within(-0.001, -0.02, 0.01));
        assertEquals(new Interval(1, 0.99, 1), Interval.within(1.2, 0.99, 1.01));
    }
}
