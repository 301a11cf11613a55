package org.whither.fate;

import java.util.List;

/**
 * What the gas of a pair of origin and destination meets on its way, and where it leaves; mass-weighted.
 *
 * @param pathLength length of the path in the stationary frame (m)
 * @param lowestPressure lowest absolute pressure met (Pa)
 * @param highestPressure highest absolute pressure met (Pa)
 * @param pressureFrom the lowest pressure any of its tracers met (Pa)
 * @param pressureTo the highest pressure any of its tracers met (Pa)
 * @param exitPhase where round the sector it leaves: shares of {@link #PHASE_BINS} equal parts, counted from the first
 *     grid line at the radius of the exit, in the frame in which the film is steady; they add up to 1
 * @param exitHeight where across the film it leaves: shares of {@link #HEIGHT_BINS} equal parts of the film thickness,
 *     from the rotor face; they add up to 1
 * @param tracers how many tracers of equal mass flow tell it
 */
public record Travel(
        Quantiles pathLength,
        Quantiles lowestPressure,
        Quantiles highestPressure,
        double pressureFrom,
        double pressureTo,
        List<Double> exitPhase,
        List<Double> exitHeight,
        int tracers) {
    /** Parts of the sector in {@link #exitPhase}. */
    public static final int PHASE_BINS = 24;

    /** Parts of the film thickness in {@link #exitHeight}. */
    public static final int HEIGHT_BINS = 10;
}
