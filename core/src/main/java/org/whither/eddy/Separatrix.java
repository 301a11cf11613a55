package org.whither.eddy;

import java.util.List;

/**
 * A line that parts paths of different fate: it runs into a saddle or out of it.
 *
 * @param saddle the saddle
 * @param outwards whether it runs out of the saddle with time
 * @param points its points from the saddle on
 * @param closes whether it comes back to a saddle, so that it bounds gas that turns
 */
public record Separatrix(CriticalPoint saddle, boolean outwards, List<Place> points, boolean closes) {
    /** Keeps its own copy of the points. */
    public Separatrix {
        points = List.copyOf(points);
    }
}
