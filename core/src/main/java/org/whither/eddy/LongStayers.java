package org.whither.eddy;

import java.util.List;

/**
 * The through-going gas that stays longest, and where it spends its time.
 *
 * @param share which share of the through-going gas it is
 * @param longerThan how long it stays at least (s)
 * @param median its median residence (s)
 * @param fromSupply how much of it came in through the feed
 * @param fromInner how much over the inner diameter
 * @param fromOuter how much over the outer diameter
 * @param phases parts of the sector's phase in the map
 * @param radii parts of the radius in the map
 * @param map share of its time that it spends in each part of the face, phases × radii, row-major; they add up to 1
 * @param across share of its time that it spends in equal parts of the film thickness, from the rotor face
 * @param most the middle of the part of the face, and the height, where it spends most of its time
 * @param tracers how many tracers tell it
 */
public record LongStayers(
        double share,
        double longerThan,
        double median,
        double fromSupply,
        double fromInner,
        double fromOuter,
        int phases,
        int radii,
        List<Double> map,
        List<Double> across,
        Place most,
        int tracers) {
    /** Keeps its own copies. */
    public LongStayers {
        map = List.copyOf(map);
        across = List.copyOf(across);
    }

    /** Share of its time that it spends in a part of the face. */
    public double at(int phase, int radius) {
        return map.get(phase * radii + radius);
    }
}
