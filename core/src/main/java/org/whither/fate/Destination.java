package org.whither.fate;

import org.whither.trace.PathEnd;

/** Where gas goes, or, followed back, where it came from. */
public enum Destination {
    /** The inner diameter. */
    INNER,
    /** The outer diameter. */
    OUTER,
    /** Back into the feed; followed back in time: from the supply. */
    SUPPLY,
    /** Still inside at the time limit. */
    HELD,
    /** Not known: its tracer could not be integrated. */
    LOST;

    /**
     * The destination of a tracer.
     *
     * @param end how its path ended
     * @return its destination
     */
    public static Destination of(PathEnd end) {
        if (end instanceof PathEnd.Left left) {
            return switch (left.border()) {
                case INNER -> INNER;
                case OUTER -> OUTER;
                case SUPPLY -> SUPPLY;
            };
        }
        return end instanceof PathEnd.StillInside ? HELD : LOST;
    }
}
