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

    /**
     * Copies the step, so that points of it can be found after the call in which it was handed over; see
     * {@link PointFinder}.
     *
     * @param into {@link PointFinder#STEP} numbers; overwritten
     * @param at where in {@code into} they start
     */
    void copy(double[] into, int at);
}
