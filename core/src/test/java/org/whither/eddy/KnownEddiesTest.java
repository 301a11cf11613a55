package org.whither.eddy;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.List;
import org.junit.jupiter.api.Test;
import org.whither.film.ConservingFlow;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.FullField;
import org.whither.trace.Release;

/**
 * Films with an eddy whose centre, separatrix, mass and period are known in closed form.
 *
 * <p>The meridional one has the stream function ψ = F (3σ² − 2σ³) + A B(x) σ² (1 − σ)², B = 16 x² (1 − x)², x the part of
 * the radial extent, A = 12 F. Then ∂ψ/∂σ = 2σ(1 − σ)(3F + A B (1 − 2σ)): the centre is at x = 1/2, σ = (1 + 3F/A)/2 =
 * 0.625. The value at the stator, ψ = F, is also that of the curve A B σ² = F (1 + 2σ), which bounds the eddy; and the
 * small turns about the centre go at √(ψ_xx ψ_σσ) over the mass a unit of x and σ.
 */
class KnownEddiesTest {
    private static final double INNER = 0.050;
    private static final double OUTER = 0.058;
    private static final double EXTENT = OUTER - INNER;
    private static final int SECTORS = 10;
    private static final double F = 1e-5;
    private static final double A = 12 * F;
    private static final double SWIRL = 30;

    private static double bump(double x) {
        return 16 * x * x * (1 - x) * (1 - x);
    }

    private static double psi(double r, double s) {
        return F * s * s * (3 - 2 * s) + A * bump((r - INNER) / EXTENT) * s * s * (1 - s) * (1 - s);
    }

    /** A unit of angle, radius and height: ρ h r. */
    private static double mass(double r) {
        return KnownMotion.DENSITY * KnownMotion.THICKNESS * r;
    }

    private static void rates(double theta, double r, double s, double[] rates) {
        double x = (r - INNER) / EXTENT;
        rates[0] = SWIRL * s;
        rates[1] = 2 * s * (1 - s) * (3 * F + A * bump(x) * (1 - 2 * s)) / mass(r);
        rates[2] = -A * 32 * x * (1 - x) * (1 - 2 * x) / EXTENT * s * s * (1 - s) * (1 - s) / mass(r);
    }

    private static final FilmGrid GRID = KnownMotion.grid(3, 40, INNER, OUTER, SECTORS);
    private static final FilmFlow MOTION =
            new KnownMotion(GRID, 100, KnownEddiesTest::rates, (theta, r, s) -> psi(r, s));

    /** Height of the separatrix; 1 where there is no eddy. */
    private static double separatrix(double x) {
        double a = A / F * bump(x);
        return a <= 3 ? 1 : (1 + Math.sqrt(1 + a)) / a;
    }

    private static double heldMass() {
        double sum = 0;
        int n = 20_000;
        for (int i = 0; i < n; i++) {
            double x = (i + 0.5) / n;
            sum += (1 - separatrix(x)) * mass(INNER + x * EXTENT) / n;
        }
        return 2 * Math.PI * EXTENT * sum;
    }

    private static double filmMass() {
        return Math.PI * (OUTER * OUTER - INNER * INNER) * KnownMotion.DENSITY * KnownMotion.THICKNESS;
    }

    private static double centreTurns() {
        double s = 0.625;
        double across = 2 * s * (1 - s) * 2 * A;
        double along = 16 * A * s * s * (1 - s) * (1 - s);
        return Math.sqrt(across * along) / (mass(INNER + 0.5 * EXTENT) * EXTENT);
    }

    private static EddySettings settings(int budget) {
        return new EddySettings(Frame.STATIONARY, 1e-6, 20, budget, 5, 2);
    }

    @Test
    void of_meridionalEddy_findsCentreSeparatrixMassAndPeriod() {
        Eddies eddies = Eddies.of(MOTION, settings(6144), x -> {});
        assertEquals(1, eddies.zones().size());
        Zone zone = eddies.zones().get(0);
        assertTrue(zone.settled() && eddies.settled());
        assertEquals(1, zone.count());
        assertEquals(Sense.MERIDIONAL, zone.sense());
        assertEquals(INNER + 0.5 * EXTENT, zone.centre().radius(), 0.005 * EXTENT);
        assertEquals(0.625, zone.centre().sigma(), 0.005);
        assertEquals(heldMass(), zone.mass(), 0.05 * heldMass());
        assertEquals(heldMass(), zone.mass(), 1.5 * (zone.massHigh() - zone.mass()));
        assertEquals(heldMass() / filmMass(), eddies.heldMassShare(), 0.05 * heldMass() / filmMass());
        assertEquals(zone.mass() / KnownMotion.DENSITY, zone.volume(), 1e-9 * zone.volume());
        assertEquals(KnownMotion.PRESSURE, zone.meanPressure(), 1);
        // The separatrix reaches down to (1 + √13)/12 and from where B = 1/4, x(1 − x) = 1/8, on.
        assertEquals((1 + Math.sqrt(13)) / 12, zone.sigma().low(), 0.04);
        double end = 0.5 * (1 - Math.sqrt(0.5));
        // It ends there in cusps, too thin for a tracer to be met in their tips.
        assertEquals(INNER + end * EXTENT, zone.radius().low(), 0.06 * EXTENT);
        assertEquals(OUTER - end * EXTENT, zone.radius().high(), 0.06 * EXTENT);
        for (Place at : zone.points()) {
            assertTrue(at.sigma() > separatrix((at.radius() - INNER) / EXTENT) - 1e-3, at.toString());
        }
        assertEquals(0, zone.exchange().renewed(), 0);
        assertTrue(zone.turnoverTime().orElseThrow() > 2 * Math.PI / centreTurns());
        // Gas runs back above the height at which the rate changes sign; here seen column by column.
        assertTrue(eddies.reversed().volumeShare() > 0.1);

        List<CriticalPoint> still = eddies.points().stream()
                .filter(p -> p.flow() == CriticalPoint.Flow.MERIDIAN)
                .toList();
        assertEquals(1, still.size());
        assertEquals(CriticalPoint.Kind.CENTRE, still.get(0).kind());
        assertEquals(INNER + 0.5 * EXTENT, still.get(0).place().radius(), 0.005 * EXTENT);
        assertEquals(0.625, still.get(0).place().sigma(), 0.01);
        assertEquals(centreTurns(), Math.abs(still.get(0).turns().get(0)), 0.03 * centreTurns());
    }

    @Test
    void watch_closeToTheCentre_hasTheSmallTurns() {
        Turning.Turn turn = Turning.watch(
                        MOTION,
                        1e-9,
                        new Release(0.1, INNER + 0.502 * EXTENT, 0.627, 0),
                        12 * 2 * Math.PI / centreTurns())
                .orElseThrow();
        assertEquals(2 * Math.PI / centreTurns(), turn.period(), 1e-3 * turn.period());
        assertEquals(Sense.MERIDIONAL, turn.sense());
    }

    private static FilmFlow full(double stretch) {
        int nk = 21;
        double[] sigma = new double[nk];
        int size = GRID.nodes() * nk;
        double[] pressure = new double[size];
        double[] ur = new double[size];
        double[] ut = new double[size];
        double[] uz = new double[size];
        double[] rates = new double[3];
        for (int k = 0; k < nk; k++) {
            sigma[k] = (double) k / (nk - 1);
        }
        for (int i = 0; i < GRID.ni(); i++) {
            for (int j = 0; j < GRID.nj(); j++) {
                for (int k = 0; k < nk; k++) {
                    int at = GRID.node(i, j) * nk + k;
                    rates(0, GRID.radius(j), sigma[k], rates);
                    pressure[at] = KnownMotion.PRESSURE;
                    ut[at] = rates[0] * GRID.radius(j);
                    ur[at] = rates[1];
                    uz[at] = rates[2] * KnownMotion.THICKNESS * stretch;
                }
            }
        }
        return new ConservingFlow(KnownMotion.film(
                GRID, KnownMotion.THICKNESS * stretch, 100, new FullField(sigma, pressure, ur, ut, uz, null, null)));
    }

    /** Drawn 1000 times as thick, with its velocities across the film: all that is told is the same but the masses. */
    @Test
    void of_stretchedFilm_isTheSame() {
        Eddies thin = Eddies.of(full(1), settings(2048), x -> {});
        Eddies thick = Eddies.of(full(1000), settings(2048), x -> {});
        assertEquals(1, thin.zones().size());
        assertEquals(1, thick.zones().size());
        Zone one = thin.zones().get(0);
        Zone other = thick.zones().get(0);
        assertEquals(heldMass() / filmMass(), one.massShare(), 0.1 * one.massShare());
        assertEquals(0.625, one.centre().sigma(), 0.01);
        assertEquals(one.massShare(), other.massShare(), 0.01 * one.massShare());
        assertEquals(1000 * one.volume(), other.volume(), 0.01 * other.volume());
        assertEquals(one.centre().radius(), other.centre().radius(), 1e-3 * EXTENT);
        assertEquals(one.centre().sigma(), other.centre().sigma(), 1e-3);
        assertEquals(
                one.turnoverTime().orElseThrow(),
                other.turnoverTime().orElseThrow(),
                0.05 * one.turnoverTime().orElseThrow());
        assertEquals(thin.medianResidence(), thick.medianResidence(), 1e-3 * thin.medianResidence());
        assertEquals(thin.reversed().volumeShare(), thick.reversed().volumeShare(), 1e-9);
    }

    /**
     * A vortex in the plane of the face, once a sector, at every height: Φ = −U θ + C sin²(πp) sin²(πx), r ṙ = ∂Φ/∂θ, r θ̇ =
     * −∂Φ/∂r, by the profile 6σ(1 − σ). Its centre is the maximum of Φ, where the flow of the columns stands still.
     */
    @Test
    void of_vortexInEachSector_isCountedAndTurnsTheRightWay() {
        double pitch = 2 * Math.PI / SECTORS;
        for (int way = -1; way <= 1; way += 2) {
            double u = 0.05;
            double c = way * 0.03;
            FilmGrid grid = KnownMotion.grid(24, 30, INNER, OUTER, SECTORS);
            FilmFlow motion = new KnownMotion(
                    grid,
                    100,
                    (theta, r, s, rates) -> {
                        double p = theta / pitch;
                        double x = (r - INNER) / EXTENT;
                        double profile = 6 * s * (1 - s) / r;
                        double wave = Math.pow(Math.sin(Math.PI * p), 2);
                        double hill = Math.pow(Math.sin(Math.PI * x), 2);
                        rates[0] = -profile * c * wave * Math.PI / EXTENT * Math.sin(2 * Math.PI * x);
                        rates[1] = profile * (-u + c * hill * Math.PI / pitch * Math.sin(2 * Math.PI * p));
                        rates[2] = 0;
                    },
                    (theta, r, s) -> -u * s * s * (3 - 2 * s) * KnownMotion.DENSITY * KnownMotion.THICKNESS);
            Eddies eddies = Eddies.of(motion, settings(2048), x -> {});
            assertEquals(1, eddies.zones().size());
            Zone zone = eddies.zones().get(0);
            assertEquals(SECTORS, zone.count());
            // The vorticity is −∇²Φ, so gas turns towards +θ round a maximum, c > 0.
            assertEquals(way > 0 ? Sense.WITH_ROTATION : Sense.AGAINST_ROTATION, zone.sense());
            CriticalPoint centre = eddies.points().stream()
                    .filter(p -> p.flow() == CriticalPoint.Flow.COLUMNS && p.kind() == CriticalPoint.Kind.CENTRE)
                    .findFirst()
                    .orElseThrow();
            // sin(2πp) = u pitch / (c π) at x = 1/2, on the side of the maximum (c > 0) or minimum.
            double turn = Math.asin(u * pitch / (c * Math.PI)) / (2 * Math.PI);
            double p = 0.5 - turn;
            assertEquals(p * pitch, centre.place().theta(), 0.01 * pitch);
            assertEquals(INNER + 0.5 * EXTENT, centre.place().radius(), 0.01 * EXTENT);
            assertEquals(centre.place().radius(), zone.centre().radius(), 0.02 * EXTENT);
            assertEquals(p * pitch, zone.centre().theta(), 0.02 * pitch);
            int index = eddies.points().stream()
                    .filter(q -> q.flow() == CriticalPoint.Flow.COLUMNS)
                    .mapToInt(q -> q.kind().index())
                    .sum();
            assertEquals(0, index);
        }
    }
}
