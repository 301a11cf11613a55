package org.whither.io.paths;

import java.util.Locale;
import org.whither.trace.PathEnd;

/** How a path ended, as written in results. The order is that of the numbers in {@code paths.h5}. */
public enum Fate {
    /** Left over the inner diameter, or came in there. */
    INNER,
    /** Left over the outer diameter, or came in there. */
    OUTER,
    /** Left, or came in, through the feed. */
    SUPPLY,
    /** Did not leave in the longest time that a tracer is followed. */
    HELD,
    /** Was still inside after the wanted time or number of revolutions. */
    STOPPED,
    /** Could not be integrated any further. */
    LOST;

    /**
     * The fate of an end.
     *
     * @param end the end
     * @param wantedTime time after which paths were to be stopped; infinite where there is none (s)
     * @param longestTime longest time that a tracer is followed (s)
     */
    static Fate of(PathEnd end, double wantedTime, double longestTime) {
        if (end instanceof PathEnd.Left left) {
            return switch (left.border()) {
                case INNER -> INNER;
                case OUTER -> OUTER;
                case SUPPLY -> SUPPLY;
            };
        }
        if (end instanceof PathEnd.Failed) {
            return LOST;
        }
        boolean outOfTime = end.time() >= longestTime * (1 - 1e-9);
        return outOfTime && !(wantedTime <= longestTime) ? HELD : STOPPED;
    }

    /** The word for it in results. */
    public String word() {
        return name().toLowerCase(Locale.ROOT);
    }
}
