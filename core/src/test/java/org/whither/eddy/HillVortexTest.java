package org.whither.eddy;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.trace.Release;

/**
 * M. J. M. Hill's spherical vortex (Phil. Trans. R. Soc. A 185, 1894), a = U = 1, with the potential flow round it, laid into
 * a film: its axis along the radius in mid-film, the distance s from it across the film. Inside u_s = 1.5 s z, u_z = 1.5 (1 −
 * 2s² − z²); outside u_s = 1.5 s z/R⁵, u_z = −(1 − 1/R³) − 1.5 s²/R⁵, led along the faces far from the sphere. Centres at s
 * = ±1/√2, poles at z = ±1, separatrix R = 1. Periods T = 4 K(m)/(3√q₂): 3.123787 for s₁ = 0.5 and 4.945681 for s₁ = 0.1,
 * computed from that formula for the project's check values.
 */
class HillVortexTest {
    private static final double S = 1.6;
    private static final double Z = 2;
    private static final double INNER = 0.05;
    private static final double UNIT = 0.002;
    /** Seconds a unit of the vortex's time. */
    private static final double TIME = 1e-3;

    private static final FilmGrid GRID = KnownMotion.grid(2, 48, INNER, INNER + 2 * Z * UNIT, 8);
    private static final FilmFlow MOTION = motion(-S, S);
    /** The axis on the rotor face. */
    private static final FilmFlow HALF = motion(0, S);

    private static FilmFlow motion(double from, double to) {
        return new KnownMotion(
                GRID,
                50,
                (theta, r, sigma, rates) -> {
                    double[] u = velocity(from + (to - from) * sigma, (r - INNER) / UNIT - Z);
                    rates[0] = 0;
                    rates[1] = u[1] * UNIT / TIME;
                    rates[2] = u[0] / (to - from) / TIME;
                },
                (theta, r, sigma) -> below(from, to, r, sigma));
    }

    private static double[] velocity(double s, double z) {
        double square = s * s + z * z;
        if (square <= 1) {
            return new double[] {1.5 * s * z, 1.5 * (1 - 2 * s * s - z * z)};
        }
        double r3 = Math.pow(square, -1.5);
        double r5 = r3 / square;
        double part = Math.max(0, (Math.abs(s) - 1.2) / (S - 1.2));
        double led = 1 - part * part * (3 - 2 * part);
        return new double[] {1.5 * s * z * r5 * led, -(1 - r3) - 1.5 * s * s * r5};
    }

    private static double below(double from, double to, double r, double sigma) {
        int n = 64;
        double sum = 0;
        for (int i = 0; i < n; i++) {
            sum += velocity(from + (to - from) * sigma * (i + 0.5) / n, (r - INNER) / UNIT - Z)[1];
        }
        return KnownMotion.DENSITY * KnownMotion.THICKNESS * r * UNIT / TIME * sigma * sum / n;
    }

    private static Release at(double s, double z) {
        return new Release(0.1, INNER + (z + Z) * UNIT, 0.5 + s / (2 * S), 0);
    }

    @Test
    void watch_pathsInTheVortex_haveItsPeriods() {
        for (double[] known : new double[][] {{0.5, 3.123787}, {0.1, 4.945681}, {-0.5, 3.123787}}) {
            Turning.Turn turn = Turning.watch(MOTION, 1e-10, at(known[0], 0), 8.4 * known[1] * TIME)
                    .orElseThrow();
            assertEquals(known[1] * TIME, turn.period(), 2e-4 * known[1] * TIME);
            assertEquals(Sense.MERIDIONAL, turn.sense());
            assertEquals(8.4, turn.turns(), 0.4);
        }
    }

    @Test
    void of_halfOfTheVortex_isHeldWithinTheSphere() {
        Eddies eddies = Eddies.of(HALF, new EddySettings(Frame.STATIONARY, 1e-6, 20, 4096, 3, 2), x -> {});
        assertEquals(1, eddies.zones().size());
        Zone zone = eddies.zones().get(0);
        assertEquals(Math.sqrt(0.5), S * zone.centre().sigma(), 0.02);
        assertEquals(INNER + Z * UNIT, zone.centre().radius(), 0.02 * UNIT);
        for (Place point : zone.points()) {
            double away = Math.hypot(S * point.sigma(), (point.radius() - INNER) / UNIT - Z);
            assertTrue(away < 1.005, point.toString());
        }
        // Half a disc of the meridional plane, all round: the film's gas is even.
        double area = Math.PI / 2 * UNIT * KnownMotion.THICKNESS / S;
        double mass = area * KnownMotion.DENSITY * 2 * Math.PI * (INNER + Z * UNIT);
        assertEquals(mass, zone.mass(), 0.06 * mass);
        assertTrue(zone.turnoverTime().orElseThrow() > 2.961922 * TIME);
    }

    @Test
    void find_vortex_hasItsCentresPolesAndSeparatrix() {
        StillPoints found = new StillPoints(MOTION);
        found.find();
        List<CriticalPoint> meridian = found.points().stream()
                .filter(p -> p.flow() == CriticalPoint.Flow.MERIDIAN)
                .toList();
        int centres = 0;
        int saddles = 0;
        for (CriticalPoint point : meridian) {
            double s = S * (2 * point.place().sigma() - 1);
            double z = (point.place().radius() - INNER) / UNIT - Z;
            if (point.kind() == CriticalPoint.Kind.SADDLE) {
                saddles++;
                assertEquals(0, s, 0.02);
                assertEquals(1, Math.abs(z), 0.02);
            } else {
                centres++;
                assertEquals(Math.sqrt(0.5), Math.abs(s), 0.02);
                assertEquals(0, z, 0.02);
            }
        }
        assertEquals(2, centres);
        assertEquals(2, saddles);
        // From each pole two lines go along the sphere to the other, or along the axis through it.
        int alongTheSphere = 0;
        for (Separatrix line : found.separatrices()) {
            Place middle = line.points().get(line.points().size() / 2);
            double away = Math.hypot(S * (2 * middle.sigma() - 1), (middle.radius() - INNER) / UNIT - Z);
            if (line.closes() && Math.abs(middle.sigma() - 0.5) > 0.1) {
                alongTheSphere++;
                assertEquals(1, away, 0.04);
            }
        }
        assertTrue(alongTheSphere >= 2, "lines along the sphere: " + alongTheSphere);
    }
}
