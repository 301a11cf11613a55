package org.whither.trace;

/** A kept step of a path, on which any point can be asked for. */
public interface PathStep {
    /** Time at its start, since the release (s). */
    double startTime();

    /** Time at its end, since the release (s). */
    double endTime();

    /**
     * A point of the step.
     *
     * @param fraction 0 at its start, 1 at its end
     * @return the point
     */
    PathPoint at(double fraction);
}
