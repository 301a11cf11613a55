package org.whither.trace;

/** The right-hand side of an ordinary differential equation dy/dt = f(t, y). */
@FunctionalInterface
public interface RightHandSide {
    /**
     * Evaluates it.
     *
     * @param t time (s)
     * @param y state, length n; not modified
     * @param dydt rate of the state, length n; overwritten
     */
    void evaluate(double t, double[] y, double[] dydt);
}
