package org.whither.fate;

import org.whither.film.Frame;

/**
 * How a split is found.
 *
 * @param frame frame of integration
 * @param tolerance as in {@link org.whither.trace.TraceSettings}
 * @param width wanted width of the interval of every share
 * @param seed seed of the random shifts
 * @param threads number of threads
 * @param mostTracers tracers an origin may use to reach the width; also bounds the steps, see {@link #mostSteps}
 */
public record SplitSettings(Frame frame, double tolerance, double width, long seed, int threads, int mostTracers) {
    /** Tracers an origin may use where nothing else is said. */
    public static final int MOST_TRACERS = 1 << 17;

    private static final long STEPS_OF_A_TRACER = 450;

    /** Checks the ranges. */
    public SplitSettings {
        if (!(width > 0 && width <= 1)) {
            throw new IllegalArgumentException("width " + width + "; expected more than 0 and at most 1");
        }
        if (threads < 1 || threads > 1024) {
            throw new IllegalArgumentException("threads " + threads + "; expected 1 … 1024");
        }
    }

    /**
     * Integration steps an origin may use: what so many tracers usually take. Where much gas is held, its tracers take a
     * hundred times as many, until the time limit.
     */
    public long mostSteps() {
        return STEPS_OF_A_TRACER * mostTracers;
    }
}
