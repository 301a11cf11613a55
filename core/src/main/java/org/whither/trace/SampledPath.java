package org.whither.trace;

import java.util.Arrays;
import java.util.Optional;

/**
 * A path as a row of points in order of time, wherever the release lies among them.
 *
 * <p>For each point {@value #COLUMNS} numbers: time since the release, negative before it (s); θ in the frame of
 * integration, unwrapped (rad); radius (m); height along the shaft (m); height above the rotor face as a fraction of the
 * film thickness; speed in the frame of integration (m/s); absolute pressure (Pa).
 */
public final class SampledPath {
    /** Numbers a point. */
    public static final int COLUMNS = 7;

    private final Release release;
    private final double[] values;
    private final PathEnd before;
    private final PathEnd after;

    SampledPath(Release release, double[] values, PathEnd before, PathEnd after) {
        this.release = release;
        this.values = values;
        this.before = before;
        this.after = after;
    }

    /** Where it was released. */
    public Release release() {
        return release;
    }

    /** Number of points; none only where the path failed at its release. */
    public int size() {
        return values.length / COLUMNS;
    }

    /** A number of a point; the columns as above. */
    public double value(int point, int column) {
        return values[point * COLUMNS + column];
    }

    /** Where the gas came from, if it was followed back. */
    public Optional<PathEnd> before() {
        return Optional.ofNullable(before);
    }

    /** Where the gas goes, if it was followed there. */
    public Optional<PathEnd> after() {
        return Optional.ofNullable(after);
    }

    /** How long the path lasts, both ways together (s). */
    public double duration() {
        return (before == null ? 0 : before.time()) + (after == null ? 0 : after.time());
    }

    /** Turns round the shaft in the stationary frame, positive towards +θ with time, both ways together. */
    public double revolutions() {
        double from = before == null ? release.theta() : before.position().stationaryTheta();
        double to = after == null ? release.theta() : after.position().stationaryTheta();
        return (to - from) / (2 * Math.PI);
    }

    @Override
    public String toString() {
        return size() + " points, " + before + " … " + after + " "
                + Arrays.toString(Arrays.copyOf(values, Math.min(values.length, COLUMNS)));
    }
}
