package org.whither.trace;

/** How one path ended: exactly one for each tracer. Times count from the release and are never negative. */
public sealed interface PathEnd {
    /** Time since the release (s). */
    double time();

    /** Where it ended. */
    Position position();

    /**
     * A place in the film.
     *
     * @param theta angle in the frame of integration, unwrapped (rad)
     * @param stationaryTheta angle in the stationary frame, unwrapped; at time 0 equal to the release's angle (rad)
     * @param radius radius (m)
     * @param sigma height above the rotor face as a fraction of the film thickness
     */
    record Position(double theta, double stationaryTheta, double radius, double sigma) {}

    /** Through which part of its border a tracer leaves the film. */
    enum Border {
        /** The inner diameter. */
        INNER,
        /** The outer diameter. */
        OUTER,
        /** The feed. */
        SUPPLY
    }

    /** It left the film. */
    record Left(Border border, double time, Position position) implements PathEnd {}

    /** It was still inside when its time was up. */
    record StillInside(double time, Position position) implements PathEnd {}

    /** It could not be integrated any further. */
    record Failed(double time, Position position, String reason) implements PathEnd {}
}
