package org.whither.fate;

import org.whither.trace.Direction;
import org.whither.trace.PathEnd;

/**
 * How the map of one border came out: where the gas that crosses it goes, or, followed back, comes from.
 *
 * @param border the border
 * @param direction forward for the gas that enters over it, backward for the gas that leaves
 * @param massFlow mass flow of the whole ring that is mapped (kg/s)
 * @param patches patches it was divided into
 * @param mapTracers tracers followed to divide it
 * @param mixed share of the flow in patches of more than one fate, or of none known
 * @param samples tracers followed from random points of those patches, which tell their fates
 * @param unsettled share of the flow whose fate is left open by the map and its samples: the widest interval
 * @param checks random points followed to check the settled patches; they also give the times and turns
 * @param wrongChecks how many of them found another fate than that of their patch
 * @param missedBound upper bound of the share of the flow in settled patches that has another fate; with the chance of
 *     the 95 % interval
 * @param steps integration steps kept
 * @param reached whether every interval is as narrow as wanted
 */
public record BorderMap(
        PathEnd.Border border,
        Direction direction,
        double massFlow,
        long patches,
        long mapTracers,
        double mixed,
        int samples,
        double unsettled,
        int checks,
        int wrongChecks,
        double missedBound,
        long steps,
        boolean reached) {}
