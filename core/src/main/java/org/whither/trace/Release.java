package org.whither.trace;

/**
 * Where a tracer starts, and the gas it stands for.
 *
 * @param theta angle in the frame in which the film is steady, which at time 0 is also the angle in any other frame (rad)
 * @param radius radius (m)
 * @param sigma height above the rotor face as a fraction of the film thickness
 * @param massFlow mass flow that the tracer stands for, of the whole ring (kg/s)
 */
public record Release(double theta, double radius, double sigma, double massFlow) {}
