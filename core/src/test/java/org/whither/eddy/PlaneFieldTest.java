package org.whither.eddy;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.Comparator;
import java.util.List;
import java.util.Optional;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.FullField;
import org.whither.film.NodalFlow;
import org.whither.trace.Release;

/** Zeros of plane flows: corner eddies, the driven cavity, and the count of Poincaré and Hopf. */
class PlaneFieldTest {
    private static final PlaneField.Finder NOWHERE = (x, y, found) -> false;

    /**
     * Poincaré–Hopf on the annulus: where the flow leaves over both edges, nodes, foci and centres less saddles give 0. Waves
     * of random strength make many.
     */
    @Test
    void zeros_onAnnulus_countToZero() {
        int na = 161;
        int nb = 61;
        for (int seed = 1; seed <= 5; seed++) {
            SplittableRandom random = new SplittableRandom(seed);
            double[][] strength = new double[4][12];
            for (double[] row : strength) {
                for (int n = 0; n < row.length; n++) {
                    row[n] = random.nextDouble(-1, 1);
                }
            }
            double[] x = new double[na * nb];
            double[] y = new double[na * nb];
            double[] u = new double[na * nb];
            double[] v = new double[na * nb];
            double[] mass = new double[na * nb];
            Arrays.fill(mass, 1);
            for (int i = 0; i < na; i++) {
                for (int j = 0; j < nb; j++) {
                    int at = i * nb + j;
                    x[at] = 2 * Math.PI * (i % (na - 1)) / (na - 1);
                    double p = x[at];
                    x[at] = i == na - 1 ? 2 * Math.PI : p;
                    y[at] = (double) j / (nb - 1);
                    v[at] = 2 * y[at] - 1;
                    for (int n = 0; n < 12; n++) {
                        int around = n % 4 + 1;
                        int up = n / 4 + 1;
                        double wave = Math.sin(around * p) * strength[0][n] + Math.cos(around * p) * strength[1][n];
                        double other = Math.sin(around * p) * strength[2][n] + Math.cos(around * p) * strength[3][n];
                        v[at] += 2 * wave * Math.sin(Math.PI * up * y[at]);
                        u[at] += 2 * other * Math.cos(Math.PI * up * y[at]);
                    }
                }
            }
            List<PlaneField.Zero> zeros = new PlaneField(na, nb, x, y, u, v, mass, NOWHERE).zeros();
            assertTrue(zeros.size() >= 6, "seed " + seed + ": " + zeros.size());
            assertEquals(0, zeros.stream().mapToInt(zero -> zero.kind().index()).sum(), "seed " + seed);
        }
    }

    /** M. S. Chong, A. E. Perry and B. J. Cantwell, Phys. Fluids A 2 (1990): kinds by the eigenvalues. */
    @Test
    void kind_followsTheEigenvalues() {
        assertEquals(CriticalPoint.Kind.SADDLE, PlaneField.kind(new double[] {-1, 2}, new double[2]));
        assertEquals(CriticalPoint.Kind.REPELLING_NODE, PlaneField.kind(new double[] {1, 2}, new double[2]));
        assertEquals(CriticalPoint.Kind.ATTRACTING_NODE, PlaneField.kind(new double[] {-1, -2}, new double[2]));
        assertEquals(CriticalPoint.Kind.CENTRE, PlaneField.kind(new double[] {0, 0}, new double[] {-3, 3}));
        assertEquals(CriticalPoint.Kind.ATTRACTING_FOCUS, PlaneField.kind(new double[] {-1, -1}, new double[] {3, -3}));
        assertEquals(
                CriticalPoint.Kind.REPELLING_FOCUS, PlaneField.kind(new double[] {-2, 1, 1}, new double[] {0, 3, -3}));
    }

    /**
     * H. K. Moffatt, J. Fluid Mech. 18 (1964) 1: between walls at 90° the slow flow near the corner is ψ = Re r^λ f(φ), λ =
     * 3.73959 + 1.11902 i, f = cos λφ cos (λ − 2)α − cos (λ − 2)φ cos λα, α = 45°: eddies each 16.567 times as large as the
     * next (λ computed from his equation for the project's check values).
     */
    @Test
    void zeros_inACorner_areMoffattsEddies() {
        int na = 600;
        int nb = 41;
        double[] x = new double[na * nb];
        double[] y = new double[na * nb];
        double[] u = new double[na * nb];
        double[] v = new double[na * nb];
        double[] mass = new double[na * nb];
        Arrays.fill(mass, 1);
        double alpha = Math.PI / 4;
        for (int i = 0; i < na; i++) {
            double r = Math.exp(-Math.log(900) * (1 - i / (na - 1.0)));
            for (int j = 0; j < nb; j++) {
                double phi = 0.9 * alpha * (2.0 * j / (nb - 1) - 1);
                int at = i * nb + j;
                x[at] = r * Math.cos(phi);
                y[at] = r * Math.sin(phi);
                // u = ∂ψ/∂y, v = −∂ψ/∂x, by differences.
                double d = 1e-5 * r;
                u[at] = (corner(x[at], y[at] + d, alpha) - corner(x[at], y[at] - d, alpha)) / (2 * d);
                v[at] = -(corner(x[at] + d, y[at], alpha) - corner(x[at] - d, y[at], alpha)) / (2 * d);
            }
        }
        List<PlaneField.Zero> zeros = new PlaneField(na, nb, x, y, u, v, mass, NOWHERE)
                .zeros().stream()
                        .filter(zero -> zero.kind() == CriticalPoint.Kind.CENTRE)
                        .sorted(Comparator.comparingDouble(PlaneField.Zero::x))
                        .toList();
        assertTrue(zeros.size() >= 2, zeros.toString());
        for (int n = 1; n < zeros.size(); n++) {
            assertEquals(16.567, zeros.get(n).x() / zeros.get(n - 1).x(), 0.05);
            assertEquals(0, zeros.get(n).y() / zeros.get(n).x(), 1e-3);
        }
    }

    private static double corner(double x, double y, double alpha) {
        var lambda = new org.apache.commons.math3.complex.Complex(3.73959, 1.11902);
        double phi = Math.atan2(y, x);
        var f = lambda.multiply(phi)
                .cos()
                .multiply(lambda.subtract(2).multiply(alpha).cos())
                .subtract(lambda.subtract(2)
                        .multiply(phi)
                        .cos()
                        .multiply(lambda.multiply(alpha).cos()));
        return lambda.multiply(Math.log(Math.hypot(x, y))).exp().multiply(f).getReal();
    }

    /**
     * U. Ghia, K. N. Ghia and C. T. Shin, J. Comput. Phys. 48 (1982) 387: the cavity driven by its lid at Re 100 turns round
     * (0.6172, 0.7344), and in its lower right corner round (0.9453, 0.0625) (this one quoted from memory); both are nodes of
     * their grid of 1/128. Solved here by stream function and vorticity, laid into a film as a full field, and traced.
     */
    @Test
    void cavity_turnsWhereGhiaFoundIt() {
        int n = 64;
        double[][] psi = cavity(n, 100);
        FilmFlow flow = new NodalFlow(KnownMotion.film(cavityGrid(n), 1, 0, cavityField(psi, n)));
        double low = 1000;

        List<PlaneField.Zero> zeros = new StillPoints(flow).meridian().zeros();
        assertNear(zeros, low + 0.6172, 0.7344, 1 / 128.0);
        assertNear(zeros, low + 0.9453, 0.0625, 1.5 / 128);

        Release start = new Release(1e-5, low + 0.55, 0.7, 0);
        for (int again = 0; again < 3; again++) {
            Optional<Turning.Turn> turn = Turning.watch(flow, 1e-8, start, 60);
            Place middle = turn.orElseThrow().middle();
            assertEquals(Sense.MERIDIONAL, turn.get().sense());
            start = new Release(1e-5, middle.radius(), middle.sigma(), 0);
        }
        assertEquals(0.6172, start.radius() - low, 1 / 128.0);
        assertEquals(0.7344, start.sigma(), 1 / 128.0);
    }

    private static void assertNear(List<PlaneField.Zero> zeros, double x, double y, double within) {
        assertTrue(
                zeros.stream()
                        .anyMatch(zero -> zero.kind() != CriticalPoint.Kind.SADDLE
                                && Math.abs(zero.x() - x) <= within
                                && Math.abs(zero.y() - y) <= within),
                zeros.toString());
    }

    /** A narrow sector of a ring so large that it is straight. */
    private static FilmGrid cavityGrid(int n) {
        return KnownMotion.grid(1, n, 1000, 1001, 100_000);
    }

    private static FullField cavityField(double[][] psi, int n) {
        double[] sigma = new double[n + 1];
        int size = 2 * (n + 1) * (n + 1);
        double[] pressure = new double[size];
        double[] ur = new double[size];
        double[] uz = new double[size];
        for (int k = 0; k <= n; k++) {
            sigma[k] = (double) k / n;
        }
        for (int at = 0; at < size; at++) {
            int k = at % (n + 1);
            int j = at / (n + 1) % (n + 1);
            pressure[at] = KnownMotion.PRESSURE;
            boolean wall = j == 0 || j == n || k == 0 || k == n;
            ur[at] = k == n ? 1 : wall ? 0 : 0.5 * n * (psi[j][k + 1] - psi[j][k - 1]);
            uz[at] = wall ? 0 : -0.5 * n * (psi[j + 1][k] - psi[j - 1][k]);
        }
        return new FullField(sigma, pressure, ur, new double[size], uz, null, null);
    }

    /** Stream function of the cavity at the nodes, x by y, the lid at y = 1 moving with speed 1 (A. Thom's wall vorticity). */
    private static double[][] cavity(int n, double reynolds) {
        double[][] psi = new double[n + 1][n + 1];
        double[][] vorticity = new double[n + 1][n + 1];
        double h = 1.0 / n;
        for (int round = 0; round < 6000; round++) {
            double change = 0;
            for (int sweep = 0; sweep < 2; sweep++) {
                for (int i = 1; i < n; i++) {
                    for (int j = 1; j < n; j++) {
                        double next = 0.25
                                * (psi[i + 1][j]
                                        + psi[i - 1][j]
                                        + psi[i][j + 1]
                                        + psi[i][j - 1]
                                        + h * h * vorticity[i][j]);
                        psi[i][j] += 1.7 * (next - psi[i][j]);
                    }
                }
            }
            for (int i = 0; i <= n; i++) {
                vorticity[i][0] = wall(vorticity[i][0], -2 * psi[i][1] / (h * h));
                vorticity[i][n] = wall(vorticity[i][n], -2 * (psi[i][n - 1] + h) / (h * h));
                vorticity[0][i] = wall(vorticity[0][i], -2 * psi[1][i] / (h * h));
                vorticity[n][i] = wall(vorticity[n][i], -2 * psi[n - 1][i] / (h * h));
            }
            for (int i = 1; i < n; i++) {
                for (int j = 1; j < n; j++) {
                    double u = 0.5 * (psi[i][j + 1] - psi[i][j - 1]);
                    double v = -0.5 * (psi[i + 1][j] - psi[i - 1][j]);
                    double next = 0.25
                            * (vorticity[i + 1][j]
                                    + vorticity[i - 1][j]
                                    + vorticity[i][j + 1]
                                    + vorticity[i][j - 1]
                                    - 0.5
                                            * reynolds
                                            * (u * (vorticity[i + 1][j] - vorticity[i - 1][j])
                                                    + v * (vorticity[i][j + 1] - vorticity[i][j - 1])));
                    change = Math.max(change, Math.abs(next - vorticity[i][j]));
                    vorticity[i][j] += 0.7 * (next - vorticity[i][j]);
                }
            }
            if (change < 1e-6) {
                return psi;
            }
        }
        throw new IllegalStateException("the cavity did not converge");
    }

    private static double wall(double before, double now) {
        return before + 0.3 * (now - before);
    }
}
