package org.whither.eddy;

import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;

/**
 * A zone of held gas. There are {@link #count} like it in the ring; all else is of one.
 *
 * @param centre where its gas turns round; else its middle of mass
 * @param theta from where to where round the ring; may pass the sector's border (rad)
 * @param radius from which radius to which (m)
 * @param sigma from which part of the film thickness to which
 * @param volume its volume (m³)
 * @param mass mass of its gas (kg)
 * @param massLow lower end of the 95 % interval of the mass (kg)
 * @param massHigh upper end (kg)
 * @param massShare share of all the gas of the film that such zones hold together
 * @param count how many such zones lie in the ring
 * @param sense which way it turns
 * @param turnoverTime time of one turn, the median of its tracers (s); empty where none was seen to turn
 * @param meanPressure mass-weighted mean absolute pressure (Pa)
 * @param dam where it lies beside the dam; empty where the face has none
 * @param exchange what gas goes in and out
 * @param points places of held gas in it, enough to draw it
 * @param settled whether its mass is known to 5 %
 * @param tracers how many tracers found it
 */
public record Zone(
        Place centre,
        Range theta,
        Range radius,
        Range sigma,
        double volume,
        double mass,
        double massLow,
        double massHigh,
        double massShare,
        int count,
        Sense sense,
        OptionalDouble turnoverTime,
        double meanPressure,
        Optional<DamDistance> dam,
        Exchange exchange,
        List<Place> points,
        boolean settled,
        int tracers) {
    /** Keeps its own copy of the points. */
    public Zone {
        points = List.copyOf(points);
    }
}
