package org.whither.trace;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.math.BigDecimal;
import org.junit.jupiter.api.Test;

/** The pair against its published order conditions and standard problems. */
class DormandPrince54Test {
    /** Hairer, Nørsett and Wanner, Solving Ordinary Differential Equations I, section II.2: the 17 conditions of order 5. */
    @Test
    void coefficients_orderConditions_hold() {
        double[] c = DormandPrince54.C;
        double[][] a = new double[7][7];
        for (int s = 0; s < 7; s++) {
            double sum = 0;
            for (int m = 0; m < s; m++) {
                a[s][m] = DormandPrince54.A[s][m];
                sum += a[s][m];
            }
            assertEquals(c[s], sum, 1e-14, "row sum " + s);
        }
        double[] five = conditions(DormandPrince54.B, c, a);
        for (int n = 0; n < 17; n++) {
            assertEquals(0, five[n], 2e-14, "order 5, condition " + n);
        }
        double[] four = conditions(DormandPrince54.B_EMBEDDED, c, a);
        for (int n = 0; n < 8; n++) {
            assertEquals(0, four[n], 2e-14, "order 4, condition " + n);
        }
        // Σ b̂ c⁴ − 1/5 in rational arithmetic, computed for the project's check values.
        assertEquals(-71.0 / 270000, four[8], 1e-14);
    }

    private static double[] conditions(double[] b, double[] c, double[][] a) {
        double[] ac = times(a, c);
        double[] c2 = product(c, c);
        double[] c3 = product(c2, c);
        double[] ac2 = times(a, c2);
        double[] aac = times(a, ac);
        return new double[] {
            dot(b, new double[] {1, 1, 1, 1, 1, 1, 1}) - 1,
            dot(b, c) - 1.0 / 2,
            dot(b, c2) - 1.0 / 3,
            dot(b, ac) - 1.0 / 6,
            dot(b, c3) - 1.0 / 4,
            dot(b, product(c, ac)) - 1.0 / 8,
            dot(b, ac2) - 1.0 / 12,
            dot(b, aac) - 1.0 / 24,
            dot(b, product(c2, c2)) - 1.0 / 5,
            dot(b, product(c2, ac)) - 1.0 / 10,
            dot(b, product(ac, ac)) - 1.0 / 20,
            dot(b, product(c, ac2)) - 1.0 / 15,
            dot(b, times(a, c3)) - 1.0 / 20,
            dot(b, product(c, aac)) - 1.0 / 30,
            dot(b, times(a, product(c, ac))) - 1.0 / 40,
            dot(b, times(a, ac2)) - 1.0 / 60,
            dot(b, times(a, aac)) - 1.0 / 120,
        };
    }

    private static double[] times(double[][] a, double[] x) {
        double[] y = new double[x.length];
        for (int r = 0; r < x.length; r++) {
            y[r] = dot(a[r], x);
        }
        return y;
    }

    private static double[] product(double[] x, double[] y) {
        double[] z = new double[x.length];
        for (int n = 0; n < x.length; n++) {
            z[n] = x[n] * y[n];
        }
        return z;
    }

    private static double dot(double[] x, double[] y) {
        double sum = 0;
        for (int n = 0; n < x.length; n++) {
            sum += x[n] * y[n];
        }
        return sum;
    }

    /** The Arenstorf orbit, same book, section II.0: period and start given there; closes to 2e-8 at tolerance 1e-10. */
    @Test
    void step_arenstorfOrbit_closes() {
        double mu = 0.012277471;
        RightHandSide moon = (t, y, d) -> {
            double d1 = Math.pow((y[0] + mu) * (y[0] + mu) + y[1] * y[1], 1.5);
            double d2 = Math.pow((y[0] - 1 + mu) * (y[0] - 1 + mu) + y[1] * y[1], 1.5);
            d[0] = y[2];
            d[1] = y[3];
            d[2] = y[0] + 2 * y[3] - (1 - mu) * (y[0] + mu) / d1 - mu * (y[0] - 1 + mu) / d2;
            d[3] = y[1] - 2 * y[2] - (1 - mu) * y[1] / d1 - mu * y[1] / d2;
        };
        double[] start = {0.994, 0, 0, new BigDecimal("-2.00158510637908252240537862224").doubleValue()};
        double[] end = integrate(moon, start, 17.0652165601579625588917206249, 1e-10);
        assertEquals(start[0], end[0], 1e-6);
        assertEquals(start[1], end[1], 1e-6);
    }

    /**
     * T. E. Hull, W. H. Enright, B. M. Fellen and A. E. Sedgwick, SIAM J. Numer. Anal. 9 (1972) 603: problems A4, B1, B5, D5
     * and E2 at t = 20. The values were computed for the project's check values in extended precision.
     */
    @Test
    void step_detestProblems_reachReferenceValues() {
        check((t, y, d) -> d[0] = y[0] / 4 * (1 - y[0] / 20), new double[] {1}, 17.7301664813);
        check(
                (t, y, d) -> {
                    d[0] = 2 * (y[0] - y[0] * y[1]);
                    d[1] = -(y[1] - y[0] * y[1]);
                },
                new double[] {1, 3},
                0.676187600858,
                0.186081609964);
        check(
                (t, y, d) -> {
                    d[0] = y[1] * y[2];
                    d[1] = -y[0] * y[2];
                    d[2] = -0.51 * y[0] * y[1];
                },
                new double[] {0, 1, 1},
                -0.939657079873,
                -0.342117775400,
                0.741412659620);
        double e = 0.9;
        check(
                (t, y, d) -> {
                    double cube = Math.pow(y[0] * y[0] + y[1] * y[1], 1.5);
                    d[0] = y[2];
                    d[1] = y[3];
                    d[2] = -y[0] / cube;
                    d[3] = -y[1] / cube;
                },
                new double[] {1 - e, 0, 0, Math.sqrt((1 + e) / (1 - e))},
                -1.29526625099,
                0.400393896379);
        check(
                (t, y, d) -> {
                    d[0] = y[1];
                    d[1] = (1 - y[0] * y[0]) * y[1] - y[0];
                },
                new double[] {2, 0},
                2.00814976217,
                -0.0425088752732);
    }

    private static void check(RightHandSide f, double[] start, double... expected) {
        double[] end = integrate(f, start, 20, 1e-12);
        for (int n = 0; n < expected.length; n++) {
            assertEquals(expected[n], end[n], 2e-8, "component " + n);
        }
    }

    /** Halving the step divides the error of a step by 2⁶ at its end and by about 2⁵ within it. */
    @Test
    void step_halved_showsOrders() {
        double[] ends = new double[2];
        double[] within = new double[2];
        for (int n = 0; n < 2; n++) {
            double h = 0.1 / (1 << n);
            DormandPrince54 stepper = new DormandPrince54(2);
            RightHandSide swing = (t, y, d) -> {
                d[0] = y[1];
                d[1] = -Math.sin(y[0]) + 0.3 * Math.cos(2 * t);
            };
            double[] y = {1, 0.5};
            stepper.start(swing, 0, y);
            stepper.attempt(swing, h);
            double[] exact = integrate(swing, y, h, 1e-15);
            ends[n] = Math.abs(stepper.endState()[0] - exact[0]);
            double[] at = new double[2];
            stepper.interpolate(0.6, at);
            within[n] = Math.abs(at[0] - integrate(swing, y, 0.6 * h, 1e-15)[0]);
        }
        assertEquals(6, Math.log(ends[0] / ends[1]) / Math.log(2), 0.5);
        assertTrue(Math.log(within[0] / within[1]) / Math.log(2) > 4.5);
    }

    static double[] integrate(RightHandSide f, double[] start, double until, double tolerance) {
        DormandPrince54 stepper = new DormandPrince54(start.length);
        StepControl control = new StepControl();
        double[] y = start.clone();
        double t = 0;
        double h = Math.min(until, 1e-3);
        stepper.start(f, 0, y);
        while (t < until) {
            h = Math.min(h, until - t);
            stepper.attempt(f, h);
            double error = 0;
            for (int n = 0; n < y.length; n++) {
                error = Math.max(
                        error, Math.abs(stepper.error()[n]) / (tolerance * (1 + Math.abs(stepper.endState()[n]))));
            }
            if (error > 1) {
                h *= control.afterRejected(error);
                continue;
            }
            y = stepper.endState().clone();
            stepper.accept();
            t += h;
            h *= control.afterAccepted(error);
        }
        return y;
    }
}
