package org.whither.trace;

/**
 * One point of a recorded path.
 *
 * @param time time since the release (s)
 * @param theta angle in the frame of integration, unwrapped (rad)
 * @param steadyTheta angle in the frame in which the film is steady, unwrapped: where to look it up in the film (rad)
 * @param radius radius (m)
 * @param z height along the shaft (m)
 * @param sigma height above the rotor face as a fraction of the film thickness
 * @param speed speed in the frame of integration (m/s)
 * @param pressure absolute pressure (Pa)
 */
public record PathPoint(
        double time,
        double theta,
        double steadyTheta,
        double radius,
        double z,
        double sigma,
        double speed,
        double pressure) {}
