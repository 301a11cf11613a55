package org.whither.fate;

import org.apache.commons.math3.stat.descriptive.rank.Percentile;

/**
 * Mass-weighted quantiles and mean of a quantity over tracers that stand for equal mass flows.
 *
 * @param p10 what 10 % of the gas stays below
 * @param p50 median
 * @param p90 what 90 % of the gas stays below
 * @param mean mean
 */
public record Quantiles(double p10, double p50, double p90, double mean) {
    /**
     * The quantiles of values of equal weight.
     *
     * @param values at least one; not modified
     * @return their quantiles, linear between order statistics (Hyndman and Fan 1996, type 7)
     */
    static Quantiles of(double[] values) {
        Percentile percentile = new Percentile().withEstimationType(Percentile.EstimationType.R_7);
        percentile.setData(values);
        double sum = 0;
        for (double value : values) {
            sum += value;
        }
        return new Quantiles(
                percentile.evaluate(10), percentile.evaluate(50), percentile.evaluate(90), sum / values.length);
    }
}
