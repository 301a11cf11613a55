package org.whither.render;

/**
 * The two times of an animation: that of the gas and that of the watcher. The gas stands still at first, so that one can
 * look about, then moves evenly, so many times slower than it does in the machine, and stands still at the end.
 */
final class Clock {
    /** Shares of the playing time before the gas moves and after it has stopped. */
    private static final double LEAD = 0.06;

    private static final double TAIL = 0.14;

    private static final double[] ROUND = {1, 1.2, 1.5, 2, 2.5, 3, 4, 5, 6, 8, 10};

    /** How many times slower than the gas. */
    final double slower;

    final int frames;
    final double rate;
    /** Playing time before the gas moves (s). */
    private final double lead;
    /** Time of the gas at which the animation stops it (s). */
    final double end;

    /**
     * The times of an animation.
     *
     * @param settings length, rate and slow-down
     * @param duration how long the gas is to be followed (s)
     */
    Clock(MotionSettings settings, double duration) {
        double seconds;
        if (settings.slower().isPresent()) {
            slower = settings.slower().getAsDouble();
            seconds = settings.seconds().orElse(Math.max(0.5, duration * slower / (1 - LEAD - TAIL)));
        } else {
            seconds = settings.seconds().orElse(MotionSettings.USUAL_SECONDS);
            slower = round((1 - LEAD - TAIL) * seconds / duration);
        }
        rate = settings.rate();
        double count = Math.rint(seconds * rate);
        if (!(count >= 1)) {
            throw new IllegalArgumentException("an animation of " + Ticks.plain(seconds) + " s at " + Ticks.plain(rate)
                    + " frames a second has no frame; expected at least one");
        }
        if (count > MotionSettings.MOST_FRAMES) {
            throw new IllegalArgumentException("an animation of " + Ticks.number(count, 0) + " frames ("
                    + Ticks.number(seconds, 1) + " s); expected at most " + MotionSettings.MOST_FRAMES
                    + "; make it shorter, or slow the gas down less");
        }
        frames = (int) count;
        lead = LEAD * seconds;
        end = Math.min(duration, Math.max(0, seconds - lead) / slower);
    }

    /** The next round number below. */
    private static double round(double value) {
        double power = Math.pow(10, Math.floor(Math.log10(value)));
        double best = power;
        for (double factor : ROUND) {
            if (factor * power <= value * (1 + 1e-9)) {
                best = factor * power;
            }
        }
        return best;
    }

    /** Time of the gas at a playing time, not stopped at either end (s). */
    double gas(double playing) {
        return (playing - lead) / slower;
    }

    /** Time of the gas in a frame (s). */
    double time(int frame) {
        return Math.max(0, Math.min(end, gas(frame / rate)));
    }

    /** How much slower, in words. */
    String words() {
        if (slower == 1) {
            return "at the speed of the gas";
        }
        if (slower < 1) {
            return Ticks.plain(significant(1 / slower)) + " times faster than the gas";
        }
        return Ticks.plain(significant(slower)) + " times slower than the gas: one second shows "
                + Gap.time(significant(1 / slower));
    }

    private static double significant(double value) {
        double power = Math.pow(10, Math.floor(Math.log10(value)) - 2);
        return Math.rint(value / power) * power;
    }
}
