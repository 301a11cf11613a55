package org.whither.eddy;

import java.util.ArrayList;
import java.util.Arrays;
import java.util.List;
import org.apache.commons.math3.distribution.TDistribution;
import org.apache.commons.math3.stat.StatUtils;
import org.whither.trace.PathEnd;

/**
 * Gas that the through-going gas does not flush, told by its residences alone and so apart from the tracers that are
 * released inside the film: in a steady flow the gas that came in less than T ago weighs Σ (mass flow × mean of min(t, T)),
 * t the residence of what enters (P. V. Danckwerts, Chem. Eng. Sci. 2 (1953) 1–13: internal age distribution); what the film
 * holds beyond came in longer ago, or never.
 *
 * @param share share of the film's gas; may fall below 0 by an error of the sampling
 * @param low lower end of the 95 % interval of the sampling
 * @param high upper end
 * @param olderThan the time T (s)
 */
public record Unflushed(double share, double low, double high, double olderThan) {
    /** Runs of tracers that follow each other in the sequence; what their means differ by tells the sampling error. */
    private static final int RUNS = 16;

    /**
     * From the residences of tracers that enter.
     *
     * @param filmMass gas of the ring (kg)
     * @param massFlow mass flow that enters over each border (kg/s)
     * @param borders over which border each tracer enters; tracers of a border stand together and for equal mass flows
     * @param residence residence of each (s); infinite where it is longer than the limit
     * @param limit time for which tracers were followed (s)
     * @return the share
     */
    static Unflushed of(
            double filmMass, double[] massFlow, List<PathEnd.Border> borders, double[] residence, double limit) {
        double flushed = 0;
        double variance = 0;
        for (PathEnd.Border border : PathEnd.Border.values()) {
            double[] times = times(border, borders, residence, limit);
            double flow = massFlow[border.ordinal()];
            if (times.length == 0) {
                // Too little enters here for a tracer of its own: it may stay for no time or to the limit.
                variance += Math.pow(0.5 * flow * limit, 2);
                continue;
            }
            flushed += flow * StatUtils.mean(times);
            variance += flow * flow * errorOfMean(times);
        }
        double half = new TDistribution(RUNS - 1).inverseCumulativeProbability(0.975) * Math.sqrt(variance) / filmMass;
        double share = 1 - flushed / filmMass;
        return new Unflushed(share, share - half, share + half, limit);
    }

    private static double[] times(
            PathEnd.Border border, List<PathEnd.Border> borders, double[] residence, double limit) {
        List<Double> times = new ArrayList<>();
        for (int n = 0; n < residence.length; n++) {
            if (borders.get(n) == border) {
                times.add(Math.min(residence[n], limit));
            }
        }
        return times.stream().mapToDouble(Double::doubleValue).toArray();
    }

    /** Variance of the mean, by runs where there are enough tracers: each run is stratified, all of them more so. */
    private static double errorOfMean(double[] times) {
        int runs = Math.min(RUNS, times.length);
        if (runs < 2) {
            return times[0] * times[0];
        }
        double[] means = new double[runs];
        for (int n = 0; n < runs; n++) {
            means[n] =
                    StatUtils.mean(Arrays.copyOfRange(times, n * times.length / runs, (n + 1) * times.length / runs));
        }
        return StatUtils.variance(means) / runs;
    }
}
