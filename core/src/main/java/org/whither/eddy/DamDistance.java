package org.whither.eddy;

/**
 * How far a place is from the edges of the dam, the ring without grooves that holds the highest pressure.
 *
 * @param innerEdge radius of the dam's inner edge (m)
 * @param outerEdge radius of its outer edge (m)
 * @param fromInnerEdge radius of the place less that of the inner edge (m)
 * @param fromOuterEdge radius of the place less that of the outer edge (m)
 */
public record DamDistance(double innerEdge, double outerEdge, double fromInnerEdge, double fromOuterEdge) {}
