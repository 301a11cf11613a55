package org.whither.fate;

import org.apache.commons.math3.distribution.BetaDistribution;
import org.apache.commons.math3.stat.interval.WilsonScoreInterval;

/**
 * A share with its 95 % interval.
 *
 * @param share the share, 0 … 1
 * @param low its lower bound
 * @param high its upper bound
 */
public record Interval(double share, double low, double high) {
    /** An interval, cut to 0 … 1, and a share within it. */
    static Interval within(double share, double low, double high) {
        double from = Math.max(0, Math.min(1, low));
        double to = Math.max(from, Math.min(1, high));
        return new Interval(Math.max(from, Math.min(to, share)), from, to);
    }

    /**
     * The two-sided interval of a share from independent trials that holds at least with the given chance, after C. J.
     * Clopper and E. S. Pearson, Biometrika 26 (1934) 404–413; by quantiles of the beta distribution.
     *
     * @param hits trials that count
     * @param trials all trials, at least 1
     * @param confidence chance that the interval holds
     */
    static Interval exact(int hits, int trials, double confidence) {
        double tail = 0.5 * (1 - confidence);
        double low = hits == 0
                ? 0
                : new BetaDistribution(null, hits, trials - hits + 1.0).inverseCumulativeProbability(tail);
        double high = hits == trials
                ? 1
                : new BetaDistribution(null, hits + 1.0, trials - hits).inverseCumulativeProbability(1 - tail);
        return new Interval((double) hits / trials, low, high);
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
