package org.whither.trace;

import java.util.List;

/**
 * A recorded path.
 *
 * @param release where it started
 * @param points its points in order of time, the first at the release
 * @param end how it ended
 */
public record Path(Release release, List<PathPoint> points, PathEnd end) {
    /** Keeps its own copy of the points. */
    public Path {
        points = List.copyOf(points);
    }
}
