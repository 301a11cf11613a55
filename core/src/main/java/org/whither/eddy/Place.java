package org.whither.eddy;

/**
 * A place in the film, in the frame in which it is steady.
 *
 * @param theta angle; within the sector where it is not that of a zone that crosses the sector's border (rad)
 * @param radius radius (m)
 * @param sigma height above the rotor face as a fraction of the film thickness
 */
public record Place(double theta, double radius, double sigma) {}
