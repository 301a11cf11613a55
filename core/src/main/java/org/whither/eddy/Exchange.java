package org.whither.eddy;

/**
 * Where the gas of a zone came from, followed back for a time.
 *
 * @param time how far back it was followed (s)
 * @param fromSupply share of the zone's gas that came in through the feed within that time
 * @param fromInner share that came in over the inner diameter
 * @param fromOuter share that came in over the outer diameter
 * @param flow mass flow that goes through one zone so: the mass that came in, over the time (kg/s)
 * @param tracers how many tracers tell it
 */
public record Exchange(double time, double fromSupply, double fromInner, double fromOuter, double flow, int tracers) {
    /** Share of the zone's gas that came in from outside within the time. */
    public double renewed() {
        return fromSupply + fromInner + fromOuter;
    }
}
