package org.whither.trace;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Optional;
import java.util.OptionalDouble;
import org.apache.commons.math3.linear.EigenDecomposition;
import org.apache.commons.math3.linear.MatrixUtils;
import org.hipparchus.ode.ODEState;
import org.hipparchus.ode.OrdinaryDifferentialEquation;
import org.junit.jupiter.api.Test;
import org.whither.film.Conditions;
import org.whither.film.ConservingFlow;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.Gas;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.RadialCase;
import org.whither.film.RingFaces;

/** The stepper and the tracer in flows whose paths are known, and against independent integrators. */
class KnownFlowsTest {
    /** Rotation ω with a radial rate −a: a logarithmic spiral, r = r₀ e^(−aθ/ω) (elementary); a = 0.1: 0.533488 after a turn. */
    @Test
    void step_rotationPlusSink_isLogarithmicSpiral() {
        RightHandSide spiral = (t, y, d) -> {
            d[0] = -0.1 * y[0] - y[1];
            d[1] = y[0] - 0.1 * y[1];
        };
        double[] end = DormandPrince54Test.integrate(spiral, new double[] {1, 0}, 2 * Math.PI, 1e-12);
        assertEquals(0.533488, end[0], 5e-7);
        assertEquals(0, end[1], 1e-9);
    }

    /** Solid rotation and a line sink Q (elementary): r² = r₀² − Q t/π. */
    @Test
    void step_rotationPlusLineSink_losesItsAreaEvenly() {
        double q = 0.3;
        RightHandSide sink = (t, y, d) -> {
            double square = y[0] * y[0] + y[1] * y[1];
            d[0] = -y[1] - q / (2 * Math.PI) * y[0] / square;
            d[1] = y[0] - q / (2 * Math.PI) * y[1] / square;
        };
        double[] end = DormandPrince54Test.integrate(sink, new double[] {1, 0}, 5, 1e-12);
        assertEquals(1 - q * 5 / Math.PI, end[0] * end[0] + end[1] * end[1], 1e-10);
        assertEquals(Math.atan2(Math.sin(5), Math.cos(5)), Math.atan2(end[1], end[0]), 1e-10);
    }

    /**
     * M. J. M. Hill's spherical vortex (Phil. Trans. R. Soc. A 185, 1894), a = U = 1: u_s = 1.5 s z, u_z = 1.5 (1 − 2s² − z²);
     * periods of closed paths T = 4 K(m) / (3 √q₂), q₁ = s₁², q₂ = 1 − q₁, m = (q₂ − q₁)/q₂: 3.123787 for s₁ = 0.5 and
     * 4.945681 for s₁ = 0.1, computed from that formula for the project's check values.
     */
    @Test
    void step_hillsVortex_hasItsPeriods() {
        RightHandSide hill = (t, y, d) -> {
            d[0] = 1.5 * y[0] * y[1];
            d[1] = 1.5 * (1 - 2 * y[0] * y[0] - y[1] * y[1]);
        };
        for (double[] known : new double[][] {{0.5, 3.123787}, {0.1, 4.945681}}) {
            double[] end = DormandPrince54Test.integrate(hill, new double[] {known[0], 0}, known[1], 1e-12);
            assertEquals(known[0], end[0], 3e-6);
            assertEquals(0, end[1], 3e-6);
        }
    }

    /**
     * The ABC flow, A = B = C = 1 (T. Dombre et al., J. Fluid Mech. 167, 1986): a tracer stays at the stagnation point (3π/4,
     * 3π/4, 3π/4), whose velocity gradient has eigenvalues ±(√2, −√2/2, −√2/2).
     */
    @Test
    void step_abcFlow_staysAtItsStagnationPoint() {
        RightHandSide abc = (t, y, d) -> {
            d[0] = Math.sin(y[2]) + Math.cos(y[1]);
            d[1] = Math.sin(y[0]) + Math.cos(y[2]);
            d[2] = Math.sin(y[1]) + Math.cos(y[0]);
        };
        double[] point = {0.75 * Math.PI, 0.75 * Math.PI, 0.75 * Math.PI};
        double[] end = DormandPrince54Test.integrate(abc, point, 5, 1e-12);
        assertEquals(point[0], end[0], 1e-11);
        double[][] gradient = new double[3][3];
        double[] up = new double[3];
        double[] down = new double[3];
        for (int c = 0; c < 3; c++) {
            double[] y = point.clone();
            y[c] += 1e-5;
            abc.evaluate(0, y, up);
            y[c] -= 2e-5;
            abc.evaluate(0, y, down);
            for (int row = 0; row < 3; row++) {
                gradient[row][c] = (up[row] - down[row]) / 2e-5;
            }
        }
        double[] real = new EigenDecomposition(MatrixUtils.createRealMatrix(gradient)).getRealEigenvalues();
        java.util.Arrays.sort(real);
        boolean oneRises = real[1] < 0;
        assertEquals(oneRises ? Math.sqrt(2) : Math.sqrt(0.5), real[2], 1e-4);
        assertEquals(oneRises ? -Math.sqrt(0.5) : Math.sqrt(0.5), real[1], 1e-4);
        assertEquals(oneRises ? -Math.sqrt(0.5) : -Math.sqrt(2), real[0], 1e-4);
    }

    /**
     * D. W. Pollock, Ground Water 26(6), 1988, 743: in a unit cell with v_x from 1 to 2 and v_y from 1 to 0, a particle that
     * enters at (0, 0.25) leaves at (1, 0.625) after ln 2. Here as one cell of a thin ring that stands still; the film's
     * profile makes the time at mid height ln 2 · m / (6 σ (1 − σ)), m the mass of the cell.
     */
    @Test
    void follow_cellWithLinearFaceFlows_isPollocksPath() {
        double r = 1;
        double dr = 1e-7;
        double[] radii = {r, r + dr};
        double[] theta = {0, 0, Math.PI, Math.PI, 2 * Math.PI, 2 * Math.PI};
        FilmGrid grid = new FilmGrid(radii, theta, 1);
        double flow = 1e-3;
        MassFlows flows = new MassFlows(new double[] {flow, 2 * flow, flow}, new double[] {flow, 0, 0, flow});
        double[] stator = {1e-6, 1e-6};
        Gas gas = new Gas("air", 0.0289647, 1.8e-5, 1);
        Film film = new Film(
                new Film.Heading("one cell", "", ""),
                new Conditions(0, 1e5, 1e5, OptionalDouble.empty(), 300, "atmosphere", "process"),
                gas,
                grid,
                new RingFaces(Location.CELL, new double[2], stator),
                Frame.ROTATING,
                Frame.ROTATING,
                new LubricationField(Location.CELL, new double[] {1e5, 1e5}, flows),
                Optional.empty());
        FilmFlow motion = new ConservingFlow(film);
        double sigma = 0.3;
        double[] entered = new double[2];
        double[] left = new double[3];
        new Tracer(motion, new TraceSettings(Frame.STATIONARY, Direction.FORWARD, 1e-10, 1e6))
                .follow(new Release(0, r + 0.25 * dr, sigma, 1), step -> {
                    PathPoint end = step.at(1);
                    if (left[0] == 0 && Math.abs(end.theta() - Math.PI) < 1e-9) {
                        left[0] = end.time();
                        left[1] = (end.radius() - r) / dr;
                        left[2] = end.sigma();
                    }
                    entered[0]++;
                });
        double mass = gas.density(1e5, 300) * 1e-6 * grid.cellArea(0, 0);
        assertTrue(entered[0] > 0);
        assertEquals(0.625, left[1], 1e-7);
        assertEquals(Math.log(2) * mass / flow / (6 * sigma * (1 - sigma)), left[0], 1e-6 * left[0]);
        assertEquals(sigma, left[2], 1e-9);
    }

    /** The tracer against Commons Math's and Hipparchus's order-8 integrators, on the same film and interpolation. */
    @Test
    void follow_film_agreesWithIndependentIntegrators() {
        FilmGrid grid = RadialCase.grid(8, RadialCase.radii(60, 48, 2e-4), 6, 0.4);
        FilmFlow flow = new ConservingFlow(RadialCase.film(grid, true));
        double until = 1.0e-3;
        Release release = new Release(0.3, 0.0612, 0.35, 1);
        PathEnd end =
                new Tracer(flow, new TraceSettings(Frame.STATIONARY, Direction.FORWARD, 1e-10, until)).follow(release);
        assertInstanceOf(PathEnd.StillInside.class, end);
        double[] start = {0.3, 0.0612, 0.35};

        double[] commons = new double[3];
        new org.apache.commons.math3.ode.nonstiff.DormandPrince853Integrator(1e-12, 1e-5, 1e-10, 1e-10)
                .integrate(
                        new org.apache.commons.math3.ode.FirstOrderDifferentialEquations() {
                            @Override
                            public int getDimension() {
                                return 3;
                            }

                            @Override
                            public void computeDerivatives(double t, double[] y, double[] d) {
                                stationary(flow, t, y, d);
                            }
                        },
                        0,
                        start,
                        until,
                        commons);

        double[] hipparchus = new org.hipparchus.ode.nonstiff.DormandPrince853Integrator(1e-12, 1e-5, 1e-10, 1e-10)
                .integrate(
                        new OrdinaryDifferentialEquation() {
                            @Override
                            public int getDimension() {
                                return 3;
                            }

                            @Override
                            public double[] computeDerivatives(double t, double[] y) {
                                double[] d = new double[3];
                                stationary(flow, t, y, d);
                                return d;
                            }
                        },
                        new ODEState(0, start),
                        until)
                .getPrimaryState();

        for (double[] other : new double[][] {commons, hipparchus}) {
            assertEquals(other[0], end.position().theta(), 1e-6);
            assertEquals(other[1], end.position().radius(), 1e-8);
            assertEquals(other[2], end.position().sigma(), 1e-6);
        }
    }

    /** Rates in the stationary frame of a film that is steady in the rotating one, the cell looked up at every call. */
    private static void stationary(FilmFlow flow, double t, double[] y, double[] d) {
        FilmGrid grid = flow.film().grid();
        double omega = RadialCase.OMEGA;
        int j = grid.row(y[1]);
        double theta = y[0] - omega * t;
        theta -= grid.intoSector(theta, j, y[1]) * grid.pitch();
        flow.rates(grid.column(theta, j, y[1]), j, 0, theta, y[1], y[2], d);
        d[0] += omega;
    }
}
