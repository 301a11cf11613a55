package org.whither.fate;

import org.apache.commons.math3.stat.interval.WilsonScoreInterval;

/**
 * A share with its 95 % interval.
 *
 * @param share the share, 0 … 1
 * @param low its lower bound
 * @param high its upper bound
 */
public record Interval(double share, double low, double high) {
    /**
     * The interval of a share from a map: from its settled part, less what may have been missed there, to its settled
     * part with all that is unsettled, and what may have been missed elsewhere.
     *
     * @param share estimate
     * @param settled settled part of this fate
     * @param unsettled part whose fate is not settled
     * @param missed upper bound of the settled part that has another fate than its patch
     */
    static Interval ofMap(double share, double settled, double unsettled, double missed) {
        double low = Math.max(0, settled - missed);
        double high = Math.min(1, settled + unsettled + missed);
        return new Interval(Math.max(low, Math.min(high, share)), low, high);
    }

    /**
     * The one-sided upper bound of a share from independent trials, after E. B. Wilson, J. Am. Stat. Assoc. 22 (1927)
     * 209–212. Trials of unequal chances, one in each of as many equal parts of an area, only make it safer (W. Hoeffding,
     * Ann. Math. Stat. 27 (1956) 713–721).
     *
     * @param hits trials that count
     * @param trials all trials; none gives 1
     * @param confidence chance that the bound holds
     */
    static double upperBound(int hits, int trials, double confidence) {
        if (trials == 0) {
            return 1;
        }
        double bothSides = 2 * confidence - 1;
        return Math.min(
                1,
                new WilsonScoreInterval()
                        .createInterval(trials, hits, bothSides)
                        .getUpperBound());
    }

    /** The interval, its share and both bounds times a factor, but none above 1. */
    Interval times(double factor) {
        return new Interval(Math.min(1, share * factor), Math.min(1, low * factor), Math.min(1, high * factor));
    }

    /** Its width. */
    public double width() {
        return high - low;
    }
}
