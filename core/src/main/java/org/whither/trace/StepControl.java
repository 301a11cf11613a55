package org.whither.trace;

/**
 * The length of the next step from the error of the last: the proportional–integral control of K. Gustafsson, ACM Trans.
 * Math. Softw. 17 (1991) 533–554, in the form of Hairer and Wanner, Solving Ordinary Differential Equations II, section
 * IV.2. An error of 1 is just tolerated. One instance belongs to one path.
 */
final class StepControl {
    private static final double SAFETY = 0.9;
    private static final double PROPORTIONAL = 0.04;
    private static final double INTEGRAL = 0.2 - 0.75 * PROPORTIONAL;
    private static final double SMALLEST = 0.2;
    private static final double LARGEST = 10;

    private double lastError = 1e-4;
    private boolean rejected;

    /** Factor on the step after one of error at most 1. */
    double afterAccepted(double error) {
        double factor = SAFETY * Math.pow(Math.max(error, 1e-10), -INTEGRAL) * Math.pow(lastError, PROPORTIONAL);
        double most = rejected ? 1 : LARGEST;
        lastError = Math.max(error, 1e-4);
        rejected = false;
        return Math.min(most, Math.max(SMALLEST, factor));
    }

    /** Factor on the step after one of error above 1; not a number counts as far too large. */
    double afterRejected(double error) {
        rejected = true;
        if (!(error < 1e20)) {
            return SMALLEST;
        }
        return Math.max(SMALLEST, SAFETY * Math.pow(error, -INTEGRAL));
    }
}
