package org.whither.eddy;

import org.whither.film.Frame;

/**
 * How recirculation is looked for.
 *
 * @param frame frame in which tracers are integrated; zones are told in the frame in which the film is steady
 * @param tolerance error of an integration step, as in {@link org.whither.trace.TraceSettings}
 * @param patience gas is held when it stays longer than this many median residences of the through-going gas, both before
 *     and after
 * @param budget most tracers that are released
 * @param seed seed of the releases
 * @param threads how many threads
 */
public record EddySettings(Frame frame, double tolerance, double patience, int budget, long seed, int threads) {
    /** The usual patience. */
    public static final double PATIENCE = 20;

    /** The usual budget. */
    public static final int BUDGET = 40_000;

    /** The least budget that says anything: a zone of 1 % of the gas is then missed once in a hundred times. */
    public static final int LEAST_BUDGET = 512;

    /** Checks patience and budget. */
    public EddySettings {
        if (!(patience >= 1 && patience <= 1e4)) {
            throw new IllegalArgumentException("patience is " + patience + "; expected 1 … 10000 median residences");
        }
        if (budget < LEAST_BUDGET) {
            throw new IllegalArgumentException(
                    "budget is " + budget + " tracers; expected at least " + LEAST_BUDGET + ", or nothing can be said");
        }
        if (threads < 1) {
            throw new IllegalArgumentException(threads + " threads; expected at least 1");
        }
    }
}
