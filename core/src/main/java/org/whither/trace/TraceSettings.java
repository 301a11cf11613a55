package org.whither.trace;

import org.whither.film.Frame;

/**
 * How tracers are followed.
 *
 * @param frame frame of integration
 * @param direction with or against time
 * @param tolerance error of a step, relative to the film thickness across the film and to the film's radial extent along
 *     it
 * @param timeLimit time after which a tracer counts as still inside (s)
 * @param turnLimit angle in the stationary frame, either way from the release, at which a tracer is stopped and counts as
 *     still inside; infinite for none (rad)
 */
public record TraceSettings(Frame frame, Direction direction, double tolerance, double timeLimit, double turnLimit) {
    /** Checks the tolerance and the limits. */
    public TraceSettings {
        if (!(tolerance >= 1e-12 && tolerance <= 1e-2)) {
            throw new IllegalArgumentException("tolerance " + tolerance + "; expected 1e-12 … 1e-2");
        }
        if (!(timeLimit > 0)) {
            throw new IllegalArgumentException("time limit " + timeLimit + " s; expected more than 0");
        }
        if (!(turnLimit > 0)) {
            throw new IllegalArgumentException("turn limit " + turnLimit + " rad; expected more than 0");
        }
    }

    /** Settings without a limit of turns. */
    public TraceSettings(Frame frame, Direction direction, double tolerance, double timeLimit) {
        this(frame, direction, tolerance, timeLimit, Double.POSITIVE_INFINITY);
    }
}
