package org.whither.fate;

import java.util.Optional;
import java.util.OptionalDouble;
import org.whither.trace.PathEnd;

/**
 * One pair of origin and destination.
 *
 * @param from where the gas comes from; empty for gas whose origin was not reached, followed back in time
 * @param to where it goes
 * @param massFlow mass flow of the whole ring (kg/s)
 * @param share share of the gas of that origin, with its interval
 * @param residenceTime time between entering and leaving (s); none where nothing left
 * @param revolutions turns about the shaft in the stationary frame, positive towards +θ; none where nothing left
 * @param shortestTime the shortest time between entering and leaving that was found (s); none where nothing left
 * @param travel what it meets on its way and where it leaves; none where nothing left
 */
public record SplitRow(
        Optional<PathEnd.Border> from,
        Destination to,
        double massFlow,
        Interval share,
        Optional<Quantiles> residenceTime,
        Optional<Quantiles> revolutions,
        OptionalDouble shortestTime,
        Optional<Travel> travel) {}
