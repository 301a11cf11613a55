package org.whither.film;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Optional;
import java.util.OptionalDouble;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.whither.fate.BorderBalance;
import org.whither.fate.Destination;
import org.whither.fate.Split;
import org.whither.fate.SplitSettings;
import org.whither.trace.Direction;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;

/** Plain nodal interpolation of lubrication films against exact ones and against the conserving flow. */
class NodalThinFilmTest {
    private static final double MU = RadialCase.NITROGEN.viscosity();
    private static final int LOBES = 6;

    /** p² of a pressure flow in a plane gap: Laplace's equation in the plane, with a lobed solution r^n cos nθ. */
    private static double square(double theta, double r) {
        return 1e12 - 2.5e12 * Math.log(r / 0.050) + 0.1e12 * Math.pow(r / 0.068, LOBES) * Math.cos(LOBES * theta);
    }

    private static Film lobed(int cellsTheta, int cellsRadial) {
        double[] radii = new double[cellsRadial + 1];
        for (int j = 0; j < radii.length; j++) {
            radii[j] = 0.050 + 0.018 * j / cellsRadial;
        }
        FilmGrid grid = RadialCase.grid(cellsTheta, radii, LOBES, 0.3);
        double[] pressure = new double[grid.nodes()];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                pressure[grid.node(i, j)] = Math.sqrt(square(grid.theta(i, j), grid.radius(j)));
            }
        }
        return new Film(
                new Film.Heading("lobed", "exact solution", ""),
                new Conditions(0, 1e6, 4e5, OptionalDouble.empty(), 300, "atmosphere", "process"),
                RadialCase.NITROGEN,
                grid,
                RadialCase.flatFaces(grid, Location.NODE),
                Frame.STATIONARY,
                Frame.STATIONARY,
                new LubricationField(Location.NODE, pressure, null),
                Optional.empty());
    }

    /** Largest errors of the two velocities at random points, as shares of the mean radial velocity there. */
    private static double error(FilmFlow flow) {
        FilmGrid grid = flow.film().grid();
        SplittableRandom random = new SplittableRandom(3);
        double[] rates = new double[3];
        double worst = 0;
        for (int n = 0; n < 2000; n++) {
            double r = 0.050 + 0.018 * random.nextDouble();
            int j = grid.row(r);
            double theta = grid.lineTheta(0, j, r) + grid.pitch() * random.nextDouble();
            int i = grid.column(theta, j, r);
            double sigma = 0.1 + 0.8 * random.nextDouble();
            flow.rates(i, j, 0, theta, r, sigma, rates);
            double wave = 0.1e12 * LOBES * Math.pow(r / 0.068, LOBES);
            double p = Math.sqrt(square(theta, r));
            double factor = -RadialCase.H * RadialCase.H / (2 * MU) * sigma * (1 - sigma) / (2 * p * r);
            double out = factor * (-2.5e12 + wave * Math.cos(LOBES * theta));
            double round = factor * -wave * Math.sin(LOBES * theta);
            double size = Math.abs(factor) * 2.5e12;
            worst = Math.max(worst, Math.max(Math.abs(rates[1] - out), Math.abs(rates[0] * r - round)) / size);
            assertEquals(0, rates[2], 1e-9 * size / RadialCase.H, "nothing is dragged along");
        }
        return worst;
    }

    /** Second order: half the cells, four times the error. 1.4e-3 on 32 × 16 cells. */
    @Test
    void rates_lobedPressureFlow_nearExactOfSecondOrder() {
        double coarse = error(new NodalThinFilm(lobed(16, 8)));
        double fine = error(new NodalThinFilm(lobed(32, 16)));
        double finest = error(new NodalThinFilm(lobed(64, 32)));
        assertTrue(fine < 5e-3 && coarse / fine > 3 && fine / finest > 3, coarse + " " + fine + " " + finest);
    }

    /** The law of the radial film, t = t̄ / (6ζ(1 − ζ)), from the edge of the feed row on; within what the rows allow. */
    @Test
    void follow_radialFilm_nearExactLaw() {
        FilmGrid grid = RadialCase.grid(6, RadialCase.radii(60, 48, 2e-4), 12, 0.3);
        FilmFlow nodal = new NodalThinFilm(RadialCase.film(grid, false));
        FilmFlow conserving = new ConservingFlow(RadialCase.film(grid, true));
        TraceSettings how = new TraceSettings(Frame.ROTATING, Direction.FORWARD, 1e-8, 1);
        for (double sigma : new double[] {0.1, 0.3, 0.5, 0.8}) {
            Release at = new Release(0.4, RadialCase.FEED_RADIUS + 1.0001e-4, sigma, 0);
            PathEnd end = new Tracer(nodal, how).follow(at);
            PathEnd other = new Tracer(conserving, how).follow(at);
            assertEquals(other.time(), end.time(), 1e-3 * other.time());
            assertEquals(other.position().stationaryTheta(), end.position().stationaryTheta(), 2e-3);
            assertEquals(sigma, end.position().sigma(), 1e-6);
        }
    }

    /** Flows and shares of the radial film, both ways of giving it: 0.571230 to the inner diameter. */
    @Test
    void split_radialFilm_nearExactShares() {
        FilmGrid grid = RadialCase.grid(6, RadialCase.radii(60, 48, 2e-4), 12, 0.3);
        for (boolean given : new boolean[] {true, false}) {
            FilmFlow flow = new NodalThinFilm(RadialCase.film(grid, given));
            BorderBalance balance = BorderBalance.of(flow);
            assertEquals(RadialCase.INNER_FLOW, balance.innerOut(), 1e-5 * RadialCase.INNER_FLOW);
            assertEquals(RadialCase.OUTER_FLOW, balance.outerOut(), 1e-5 * RadialCase.OUTER_FLOW);
            assertEquals(0, balance.closure(), 1e-4);
        }
        FilmFlow flow = new NodalThinFilm(RadialCase.film(grid, true));
        assertEquals("nodal", flow.interpolation());
        Split split = Split.of(flow, new SplitSettings(Frame.ROTATING, 1e-6, 0.02, 7, 2, 4000), x -> {});
        assertEquals(
                0.571230,
                split.row(PathEnd.Border.SUPPLY, Destination.INNER)
                        .orElseThrow()
                        .share()
                        .share(),
                0.02);
    }

    /** Where the film thickness waves under a turning face, the third rate is that of the conserving flow. */
    @Test
    void rates_wavyFilm_nearConservingFlow() {
        double coarse = apart(12, 20);
        double fine = apart(24, 40);
        assertTrue(fine < 0.1 && coarse / fine > 1.7, coarse + " " + fine);
    }

    /** Root mean square of the difference of dσ/dt between the two, over that of the conserving flow. */
    private static double apart(int cellsTheta, int rows) {
        Film film = new WavyCase(cellsTheta, rows, rows, 0).lubrication();
        LubricationField field = (LubricationField) film.field();
        double[] pressure = new double[field.size()];
        for (int n = 0; n < pressure.length; n++) {
            pressure[n] = field.pressure(n);
        }
        Film plain = RadialCase.film(
                film.grid(),
                film.faces(),
                new LubricationField(Location.NODE, pressure, null),
                Frame.ROTATING,
                Frame.ROTATING);
        FilmFlow nodal = new NodalThinFilm(plain);
        FilmFlow conserving = new ConservingFlow(plain);
        FilmGrid grid = film.grid();
        SplittableRandom random = new SplittableRandom(4);
        double[] one = new double[3];
        double[] other = new double[3];
        double difference = 0;
        double size = 0;
        for (int n = 0; n < 4000; n++) {
            double r = 0.050 + 0.018 * random.nextDouble();
            int j = grid.row(r);
            if (film.feeds(grid.cell(0, j))) {
                continue;
            }
            double theta = grid.lineTheta(0, j, r) + grid.pitch() * random.nextDouble();
            int i = grid.column(theta, j, r);
            double sigma = random.nextDouble();
            nodal.rates(i, j, 0, theta, r, sigma, one);
            conserving.rates(i, j, 0, theta, r, sigma, other);
            difference += (one[2] - other[2]) * (one[2] - other[2]);
            size += other[2] * other[2];
        }
        return Math.sqrt(difference / size);
    }

    @Test
    void constructor_fullField_isRefused() {
        FilmGrid grid = RadialCase.grid(3, RadialCase.radii(6, 5, 2e-4), 12, 0.3);
        Film full = RadialCase.fullFilm(grid, 5, Frame.STATIONARY, Frame.ROTATING);
        assertThrows(IllegalArgumentException.class, () -> new NodalThinFilm(full));
    }
}
