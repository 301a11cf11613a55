package org.whither.eddy;

/**
 * Held gas that is too little to be told as a zone: fewer tracers met it than make out a shape.
 *
 * @param place where
 * @param tracers how many tracers met it
 * @param mass about how much gas it is, of one sector (kg)
 */
public record SmallCluster(Place place, int tracers, double mass) {}
