package org.whither.bench;

import java.util.List;
import org.apache.commons.math3.exception.NumberIsTooSmallException;
import org.apache.commons.math3.ode.FirstOrderDifferentialEquations;
import org.apache.commons.math3.ode.events.EventHandler;
import org.hipparchus.analysis.UnivariateFunction;
import org.hipparchus.analysis.solvers.BracketedUnivariateSolver;
import org.hipparchus.analysis.solvers.BracketingNthOrderBrentSolver;
import org.hipparchus.exception.MathIllegalArgumentException;
import org.hipparchus.ode.ODEState;
import org.hipparchus.ode.ODEStateAndDerivative;
import org.hipparchus.ode.OrdinaryDifferentialEquation;
import org.hipparchus.ode.events.Action;
import org.hipparchus.ode.events.AdaptableInterval;
import org.hipparchus.ode.events.ODEEventDetector;
import org.hipparchus.ode.events.ODEEventHandler;
import org.whither.film.FilmFlow;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;

/**
 * The same tracers by the Dormand–Prince 5(4) integrators of two general-purpose libraries, on the same interpolation, the
 * exits found by their event detectors.
 */
final class LibraryTracing {
    private static final double SHORTEST_STEP = 1e-15;
    private static final double EVENT_TIME = 1e-12;

    private LibraryTracing() {}

    /** Times at which the tracers end, by Apache Commons Math (s); not a number for one that cannot be integrated. */
    static double[] commonsMath(FilmFlow flow, TraceSettings settings, List<Release> releases) {
        return commonsMath(new LocatedFlow(flow), flow, settings, releases);
    }

    static double[] commonsMath(LocatedFlow located, FilmFlow flow, TraceSettings settings, List<Release> releases) {
        double[] scale = LocatedFlow.errorScale(flow.film(), settings.tolerance());
        var equations = new FirstOrderDifferentialEquations() {
            @Override
            public int getDimension() {
                return 3;
            }

            @Override
            public void computeDerivatives(double t, double[] y, double[] dydt) {
                located.rates(y, dydt);
            }
        };
        var exit = new EventHandler() {
            @Override
            public void init(double t0, double[] y0, double t) {}

            @Override
            public double g(double t, double[] y) {
                return located.inside(y[1]);
            }

            @Override
            public Action eventOccurred(double t, double[] y, boolean increasing) {
                return Action.STOP;
            }

            @Override
            public void resetState(double t, double[] y) {}
        };
        var integrator = new org.apache.commons.math3.ode.nonstiff.DormandPrince54Integrator(
                SHORTEST_STEP, settings.timeLimit(), scale, new double[3]);
        integrator.addEventHandler(exit, settings.timeLimit(), EVENT_TIME, 100);
        double[] ends = new double[releases.size()];
        double[] end = new double[3];
        for (int n = 0; n < ends.length; n++) {
            Release release = releases.get(n);
            double[] y = {release.theta(), release.radius(), release.sigma()};
            try {
                ends[n] = integrator.integrate(equations, 0, y, settings.timeLimit(), end);
            } catch (NumberIsTooSmallException e) {
                ends[n] = Double.NaN;
            }
        }
        return ends;
    }

    /** The same by Hipparchus. */
    static double[] hipparchus(FilmFlow flow, TraceSettings settings, List<Release> releases) {
        LocatedFlow located = new LocatedFlow(flow);
        double[] scale = LocatedFlow.errorScale(flow.film(), settings.tolerance());
        var equations = new OrdinaryDifferentialEquation() {
            @Override
            public int getDimension() {
                return 3;
            }

            @Override
            public double[] computeDerivatives(double t, double[] y) {
                double[] dydt = new double[3];
                located.rates(y, dydt);
                return dydt;
            }
        };
        var integrator = new org.hipparchus.ode.nonstiff.DormandPrince54Integrator(
                SHORTEST_STEP, settings.timeLimit(), scale, new double[3]);
        integrator.addEventDetector(new Exit(located, settings.timeLimit()));
        double[] ends = new double[releases.size()];
        for (int n = 0; n < ends.length; n++) {
            Release release = releases.get(n);
            double[] y = {release.theta(), release.radius(), release.sigma()};
            try {
                ends[n] = integrator
                        .integrate(equations, new ODEState(0, y), settings.timeLimit())
                        .getTime();
            } catch (MathIllegalArgumentException e) {
                ends[n] = Double.NaN;
            }
        }
        return ends;
    }

    /** The two diameters. */
    private record Exit(LocatedFlow located, double timeLimit) implements ODEEventDetector {
        @Override
        public AdaptableInterval getMaxCheckInterval() {
            return (state, forward) -> timeLimit;
        }

        @Override
        public int getMaxIterationCount() {
            return 100;
        }

        @Override
        public BracketedUnivariateSolver<UnivariateFunction> getSolver() {
            return new BracketingNthOrderBrentSolver(0, EVENT_TIME, 0, 5);
        }

        @Override
        public ODEEventHandler getHandler() {
            return (state, detector, increasing) -> Action.STOP;
        }

        @Override
        public double g(ODEStateAndDerivative state) {
            return located.inside(state.getPrimaryState()[1]);
        }
    }
}
