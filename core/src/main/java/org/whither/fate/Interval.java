package org.whither.fate;

import org.apache.commons.math3.distribution.TDistribution;
import org.apache.commons.math3.stat.interval.WilsonScoreInterval;

/**
 * A share with its 95 % interval.
 *
 * @param share the share, 0 … 1
 * @param low its lower bound
 * @param high its upper bound
 */
public record Interval(double share, double low, double high) {
    private static final double CONFIDENCE = 0.95;

    /**
     * The interval of a share from independent replicates: Student's t over their shares. It is never narrower than what
     * one replicate can resolve, and where no tracer or every tracer counts it is E. B. Wilson's (J. Am. Stat. Assoc. 22,
     * 1927) for all tracers together.
     *
     * @param hits tracers that count, in each replicate
     * @param size tracers of each replicate
     * @return the interval
     */
    static Interval ofReplicates(int[] hits, int size) {
        int replicates = hits.length;
        double mean = 0;
        int all = 0;
        for (int hit : hits) {
            mean += (double) hit / size / replicates;
            all += hit;
        }
        if (all == 0 || all == size * replicates) {
            var wilson = new WilsonScoreInterval().createInterval(size * replicates, all, CONFIDENCE);
            return new Interval(mean, Math.max(0, wilson.getLowerBound()), Math.min(1, wilson.getUpperBound()));
        }
        double variance = 0;
        for (int hit : hits) {
            double off = (double) hit / size - mean;
            variance += off * off / (replicates - 1);
        }
        double t = new TDistribution(replicates - 1).inverseCumulativeProbability(0.5 + CONFIDENCE / 2);
        double half = Math.max(t * Math.sqrt(variance / replicates), 0.25 / size);
        return new Interval(mean, Math.max(0, mean - half), Math.min(1, mean + half));
    }

    /** Its width. */
    public double width() {
        return high - low;
    }
}
