package org.whither.trace;

/**
 * The control of the step of {@link StepControl}, for every lane of a batch. Most steps end at the border of a piece, where
 * their error is far below what is tolerated and only says that the next may be longer; so powers of the error are taken
 * to one per cent, from the exponent and a parabola through the rest, in a tenth of the time.
 */
final class QuickControl {
    private static final double LOG_SAFETY = Math.log(0.9) / Math.log(2);
    private static final double PROPORTIONAL = 0.04;
    private static final double INTEGRAL = 0.2 - 0.75 * PROPORTIONAL;
    private static final double SMALLEST = 0.2;
    private static final double LARGEST = 10;
    private static final double LEAST_ERROR = 1e-10;
    /** An error so small that the next step may be as much longer as any, whatever the last was. */
    private static final double TINY = 1e-8;

    private static final double LEAST_LAST = 1e-4;
    private static final double LOG_LEAST_LAST = log2(LEAST_LAST);

    private final double[] logLast;
    private final boolean[] rejected;

    QuickControl(int lanes) {
        logLast = new double[lanes];
        rejected = new boolean[lanes];
    }

    void begin(int lane) {
        logLast[lane] = LOG_LEAST_LAST;
        rejected[lane] = false;
    }

    void move(int from, int to) {
        logLast[to] = logLast[from];
        rejected[to] = rejected[from];
    }

    /** Factor on the step after one of error at most 1. */
    double afterAccepted(int lane, double error) {
        if (error <= TINY && !rejected[lane]) {
            logLast[lane] = LOG_LEAST_LAST;
            return LARGEST;
        }
        double log = log2(error > LEAST_ERROR ? error : LEAST_ERROR);
        double factor = exp2(LOG_SAFETY - INTEGRAL * log + PROPORTIONAL * logLast[lane]);
        double most = rejected[lane] ? 1 : LARGEST;
        logLast[lane] = log > LOG_LEAST_LAST ? log : LOG_LEAST_LAST;
        rejected[lane] = false;
        return factor > most ? most : factor < SMALLEST ? SMALLEST : factor;
    }

    /** Factor on the step after one of error above 1; not a number counts as far too large. */
    double afterRejected(int lane, double error) {
        rejected[lane] = true;
        if (!(error < 1e20)) {
            return SMALLEST;
        }
        return Math.max(SMALLEST, exp2(LOG_SAFETY - INTEGRAL * log2(error)));
    }

    /** Within 0.01, for positive normal numbers. */
    static double log2(double x) {
        long bits = Double.doubleToRawLongBits(x);
        double part = Double.longBitsToDouble((bits & 0xFFFFFFFFFFFFFL) | 0x3FF0000000000000L) - 1;
        return (double) ((bits >>> 52) - 1023) + part * (1.3465 - 0.3465 * part);
    }

    /** Within 0.3 %, for −1000 … 1000. */
    static double exp2(double x) {
        double whole = Math.floor(x);
        double part = x - whole;
        double scale = Double.longBitsToDouble(((long) whole + 1023) << 52);
        return scale * (1 + part * (0.6565 + 0.3435 * part));
    }
}
