package org.whither.film;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertInstanceOf;
import static org.junit.jupiter.api.Assertions.assertThrows;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.Arrays;
import java.util.List;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;
import org.whither.fate.BorderBalance;
import org.whither.fate.Destination;
import org.whither.fate.FilmMass;
import org.whither.fate.ReleasePlan;
import org.whither.fate.Split;
import org.whither.fate.SplitSettings;
import org.whither.trace.Direction;
import org.whither.trace.ParallelTracing;
import org.whither.trace.PathEnd;
import org.whither.trace.Release;
import org.whither.trace.TraceSettings;
import org.whither.trace.Tracer;

/** The conserving flow of full fields. */
class FullFieldFlowTest {
    private static final FilmGrid LEANING = RadialCase.grid(6, RadialCase.radii(60, 48, 2e-4), 12, 0.3);

    /** The exact mass flows of the radial film (see {@link RadialCase}), measured and steady in either frame. */
    @Test
    void borderFlows_radialFilmInAnyFrame_areExact() {
        for (Frame measured : Frame.values()) {
            for (Frame steady : Frame.values()) {
                ConservingFlow flow = new ConservingFlow(RadialCase.fullFilm(LEANING, 9, measured, steady));
                BorderBalance balance = BorderBalance.of(flow);
                assertEquals(RadialCase.INNER_FLOW, balance.innerOut(), 1e-9 * RadialCase.INNER_FLOW);
                assertEquals(RadialCase.OUTER_FLOW, balance.outerOut(), 1e-9 * RadialCase.OUTER_FLOW);
                assertEquals(0.571230, balance.innerOut() / balance.supplyIn(), 1e-6);
                assertEquals(0, balance.closure(), 1e-12);
                assertEquals(0, flow.columnFlows().closure(), 1e-9);
                assertEquals(0, flow.columnFlows().correction(), 1e-9);
                assertEquals("conserving", flow.interpolation());
            }
        }
    }

    /**
     * The exact law of a tracer in the radial film: it keeps its height, and with ζ = 1 − σ its time to the outer diameter
     * is t̄ / (6 ζ (1 − ζ)) and its turns Ω t̄ / (2π 6 (1 − ζ)); 1.9069639e-3 s and 0.1906964 turns at ζ = 0.5, 2.5426185e-3
     * s and 0.3813928 at ζ = 0.75, computed from the formula. Within 0.002 % with 5 levels, where plain nodal
     * interpolation is 16 % off, since the spline across the film is exact for the parabola.
     */
    @Test
    void follow_radialFilmInAnyFrame_obeysExactLaw() {
        double[][] cases = {{0.5, 1.9069639e-3, 0.1906964}, {0.25, 2.5426185e-3, 0.3813928}};
        double from = 0.0605;
        double part = 1 - outerMassWithin(from) / outerMassWithin(0.068);
        for (Frame measured : Frame.values()) {
            for (Frame steady : Frame.values()) {
                FilmFlow flow = new ConservingFlow(RadialCase.fullFilm(LEANING, 5, measured, steady));
                for (double[] known : cases) {
                    PathEnd end = new Tracer(flow, new TraceSettings(Frame.STATIONARY, Direction.FORWARD, 1e-8, 1))
                            .follow(new Release(0.2, from, known[0], 1));
                    assertEquals(
                            PathEnd.Border.OUTER,
                            assertInstanceOf(PathEnd.Left.class, end).border());
                    assertEquals(part * known[1], end.time(), 2e-5 * known[1]);
                    double turns = (end.position().stationaryTheta() - 0.2) / (2 * Math.PI);
                    assertEquals(part * known[2], turns, 2e-5 * known[2]);
                    assertEquals(known[0], end.position().sigma(), 1e-6);
                }
            }
        }
    }

    /** ∫ p r dr from the feed to a radius, to which the gas content is proportional. */
    private static double outerMassWithin(double r) {
        double sum = 0;
        int n = 2000;
        for (int m = 0; m < n; m++) {
            double at = RadialCase.FEED_RADIUS + 1e-12 + (r - RadialCase.FEED_RADIUS) * (m + 0.5) / n;
            sum += RadialCase.pressure(at) * at * (r - RadialCase.FEED_RADIUS) / n;
        }
        return sum;
    }

    /** What a flow that does not conserve mass does to tracers: many end up against a face and stay there. */
    @Test
    void follow_bothWays_losesNoTracer() {
        Film film = RadialCase.fullFilm(LEANING, 17, Frame.STATIONARY, Frame.ROTATING);
        FilmFlow conserving = new ConservingFlow(film);
        FilmFlow nodal = new NodalFlow(film);
        assertEquals(0, stay(conserving, Direction.FORWARD, PathEnd.Border.SUPPLY));
        assertEquals(0, stay(conserving, Direction.BACKWARD, PathEnd.Border.INNER));
        assertEquals(0, stay(conserving, Direction.BACKWARD, PathEnd.Border.OUTER));
        assertTrue(stay(nodal, Direction.BACKWARD, PathEnd.Border.INNER) > 20);
    }

    /** How many of 64 tracers are still inside, or lost, after fifty times the mean residence. */
    private static long stay(FilmFlow flow, Direction direction, PathEnd.Border border) {
        ReleasePlan plan =
                direction == Direction.FORWARD ? ReleasePlan.entering(flow, border) : ReleasePlan.leaving(flow, border);
        double limit = 50 * FilmMass.of(flow) / BorderBalance.of(flow).inflow();
        List<Release> releases = plan.releases(1, 0, 64);
        TraceSettings settings = new TraceSettings(Frame.ROTATING, direction, 1e-6, limit);
        return ParallelTracing.follow(flow, settings, releases, 2, n -> {}).ends().stream()
                .filter(end -> !(end instanceof PathEnd.Left))
                .count();
    }

    /**
     * Hele-Shaw flow (no rotation, even film thickness): p² = A + B ln(r/r_o) + C (r/r_o)ⁿ cos nθ is harmonic, and gas
     * crosses from the outer to the inner diameter. With nC = 2B it enters where 1 + 2 cos nθ > 0, and all that leaves over
     * the inner diameter came in there: a share π / (2π/3 + √3) = 0.821023 of it crosses (integrals of the normal flux;
     * H. S. Hele-Shaw, Nature 58, 1898, for the flow).
     */
    @Test
    void split_heleShawFlow_crossingShareIsExact() {
        double exact = Math.PI / (2 * Math.PI / 3 + Math.sqrt(3));
        ConservingFlow flow = new ConservingFlow(heleShaw(36, 48, 0.3));
        BorderBalance balance = BorderBalance.of(flow);
        assertEquals(0, balance.innerIn(), 0);
        assertEquals(exact, balance.innerOut() / balance.outerIn(), 0.004);
        assertTrue(
                flow.columnFlows().correction() < 2e-3,
                "correction " + flow.columnFlows().correction());
        Split split = Split.of(flow, new SplitSettings(Frame.ROTATING, 1e-6, 0.02, 3, 2, 4096), x -> {});
        double crossing = split.row(PathEnd.Border.OUTER, Destination.INNER)
                .orElseThrow()
                .share()
                .share();
        assertEquals(exact, crossing, 0.01);
        assertEquals(0, split.lostShare() + split.heldShare(), 0);
    }

    private static Film heleShaw(int cellsTheta, int cellsRadial, double lean) {
        int n = 6;
        double[] radii = new double[cellsRadial + 1];
        for (int j = 0; j <= cellsRadial; j++) {
            radii[j] = 0.050 * Math.pow(0.068 / 0.050, (double) j / cellsRadial);
        }
        FilmGrid grid = RadialCase.grid(cellsTheta, radii, n, lean);
        double b = 0.6e12;
        double c = 2 * b / n;
        double[] sigma = RadialCase.levels(7);
        double[] pressure = new double[grid.nodes()];
        double[] ur = new double[grid.nodes() * sigma.length];
        double[] ut = new double[ur.length];
        double drive = RadialCase.H * RadialCase.H / (4 * RadialCase.NITROGEN.viscosity());
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                double r = grid.radius(j);
                double theta = grid.theta(i, j);
                double power = Math.pow(r / 0.068, n);
                int node = grid.node(i, j);
                pressure[node] = Math.sqrt(0.25e12 + b * Math.log(r / 0.068) + c * power * Math.cos(n * theta));
                for (int k = 0; k < sigma.length; k++) {
                    // u = −h²/2µ ∇p σ(1−σ), ∇p = ∇p² / 2p
                    double each = drive / pressure[node] * sigma[k] * (1 - sigma[k]) / r;
                    ur[node * sigma.length + k] = -each * (b + n * c * power * Math.cos(n * theta));
                    ut[node * sigma.length + k] = each * n * c * power * Math.sin(n * theta);
                }
            }
        }
        return new Film(
                new Film.Heading("Hele-Shaw flow", "exact solution", ""),
                new Conditions(0, 0.26e6, 0.5e6, OptionalDouble.empty(), 300, "atmosphere", "process"),
                RadialCase.NITROGEN,
                grid,
                RadialCase.flatFaces(grid, Location.NODE),
                Frame.STATIONARY,
                Frame.ROTATING,
                new FullField(sigma, pressure, ur, ut, new double[ur.length], null, null),
                Optional.empty());
    }

    /** Both kinds of field of one film move alike, and twice as fine a grid brings them four times nearer. */
    @Test
    void rates_wavyFilm_approachThoseOfTheExactFaceFlows() {
        double[] apart = new double[2];
        double[] corrected = new double[2];
        for (int fine = 0; fine < 2; fine++) {
            WavyCase wavy = new WavyCase(12 << fine, 16 << fine, 12 << fine, 1.5);
            ConservingFlow exact = new ConservingFlow(wavy.lubrication());
            ConservingFlow full = new ConservingFlow(wavy.full(9, Frame.STATIONARY));
            FilmGrid grid = wavy.grid();
            double[] a = new double[3];
            double[] b = new double[3];
            double[] sum = new double[3];
            double[] size = new double[3];
            for (int i = 0; i < grid.cellsTheta(); i++) {
                for (int j = 0; j < grid.cellsRadial(); j++) {
                    for (int k = 0; k < full.layers(); k++) {
                        double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
                        double theta = 0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r));
                        double sigma = 0.5 * (full.level(k) + full.level(k + 1));
                        exact.rates(i, j, 0, theta, r, sigma, a);
                        full.rates(i, j, k, theta, r, sigma, b);
                        for (int n = 0; n < 3; n++) {
                            sum[n] += (a[n] - b[n]) * (a[n] - b[n]);
                            size[n] += a[n] * a[n];
                        }
                    }
                }
            }
            for (int n = 0; n < 3; n++) {
                apart[fine] = Math.max(apart[fine], Math.sqrt(sum[n] / size[n]));
            }
            corrected[fine] = full.columnFlows().correction();
            double given = BorderBalance.of(exact).outerIn();
            assertEquals(given, BorderBalance.of(full).outerIn(), 0.09 / (1 << 2 * fine) * given);
        }
        assertTrue(apart[0] < 0.03, "apart " + Arrays.toString(apart));
        assertTrue(apart[1] < 0.3 * apart[0], "apart " + Arrays.toString(apart));
        assertTrue(corrected[0] < 2e-3 && corrected[1] < 0.3 * corrected[0], "correction " + corrected[0]);
    }

    /** A film of a gas that is warmer at the stator, with errors in its velocities: no exact flow at all. */
    private static Film rough(Face fedThrough) {
        Film film = new WavyCase(12, 10, 8, 1.5).full(9, Frame.STATIONARY);
        FilmGrid grid = film.grid();
        FullField smooth = (FullField) film.field();
        SplittableRandom random = new SplittableRandom(5);
        int nk = smooth.nk();
        double[] ur = new double[grid.nodes() * nk];
        double[] ut = new double[ur.length];
        double[] uz = new double[ur.length];
        double[] temperature = new double[ur.length];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                for (int k = 0; k < nk; k++) {
                    int at = grid.node(i, j) * nk + k;
                    int first = grid.node(0, j) * nk + k;
                    boolean seam = i == grid.ni() - 1;
                    ur[at] = seam ? ur[first] : smooth.velocityR(grid.node(i, j), k) * (1 + 0.02 * random.nextDouble());
                    ut[at] = seam
                            ? ut[first]
                            : smooth.velocityTheta(grid.node(i, j), k) * (1 + 0.02 * random.nextDouble());
                    uz[at] = smooth.velocityZ(grid.node(i, j), k);
                    temperature[at] = 300 + 40 * smooth.sigma(k);
                }
            }
        }
        double[] sigma = new double[nk];
        double[] pressure = new double[grid.nodes()];
        for (int k = 0; k < nk; k++) {
            sigma[k] = smooth.sigma(k);
        }
        for (int n = 0; n < pressure.length; n++) {
            pressure[n] = smooth.pressure(n, 0);
        }
        double[] massFlux = null;
        if (fedThrough == Face.ROTOR) {
            massFlux = new double[grid.cells()];
            Arrays.fill(massFlux, 1.3);
        }
        return new Film(
                film.heading(),
                film.conditions(),
                film.gas(),
                grid,
                film.faces(),
                film.velocityFrame(),
                film.steadyIn(),
                new FullField(sigma, pressure, ur, ut, uz, null, temperature),
                Optional.of(Supply.ofAnnulus(grid, fedThrough, new Supply.Annulus(0.05999, 0.06001), massFlux)));
    }

    /** Against the definition: the divergence of (mass × rates) by central differences is zero inside a piece. */
    @Test
    void rates_roughFilm_areFreeOfDivergence() {
        for (Face face : Face.values()) {
            ConservingFlow flow = new ConservingFlow(rough(face));
            FilmGrid grid = flow.film().grid();
            SplittableRandom random = new SplittableRandom(2);
            for (int n = 0; n < 300; n++) {
                int i = random.nextInt(grid.cellsTheta());
                int j = random.nextInt(grid.cellsRadial());
                int k = random.nextInt(flow.layers());
                double b = 0.1 + 0.8 * random.nextDouble();
                double a = 0.1 + 0.8 * random.nextDouble();
                double thick = flow.level(k + 1) - flow.level(k);
                double s = flow.level(k) + (0.1 + 0.8 * random.nextDouble()) * thick;
                double r = grid.radius(j) + b * (grid.radius(j + 1) - grid.radius(j));
                double t = grid.lineTheta(i, j, r) + a * (grid.lineTheta(i + 1, j, r) - grid.lineTheta(i, j, r));
                double dr = 1e-4 * (grid.radius(j + 1) - grid.radius(j));
                double dt = 1e-4 * (grid.theta(i + 1, j) - grid.theta(i, j));
                double ds = 1e-4 * thick;
                double around =
                        (flux(flow, i, j, k, t + dt, r, s)[0] - flux(flow, i, j, k, t - dt, r, s)[0]) / (2 * dt);
                double out = (flux(flow, i, j, k, t, r + dr, s)[1] - flux(flow, i, j, k, t, r - dr, s)[1]) / (2 * dr);
                double across =
                        (flux(flow, i, j, k, t, r, s + ds)[2] - flux(flow, i, j, k, t, r, s - ds)[2]) / (2 * ds);
                double size = Math.abs(around) + Math.abs(out) + Math.abs(across);
                assertEquals(0, (around + out + across) / size, 1e-4);
            }
        }
    }

    private static double[] flux(FilmFlow flow, int i, int j, int k, double theta, double r, double sigma) {
        double[] rates = new double[3];
        flow.rates(i, j, k, theta, r, sigma, rates);
        double mass = flow.density(i, j, k, theta, r, sigma) * flow.thickness(i, j, theta, r) * r;
        return new double[] {mass * rates[0], mass * rates[1], mass * rates[2]};
    }

    /** What leaves one piece enters the next: through the lines, through the rings, between the layers. */
    @Test
    void massFlux_roughFilm_isContinuousBetweenPieces() {
        ConservingFlow flow = new ConservingFlow(rough(Face.STATOR));
        FilmGrid grid = flow.film().grid();
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int k = 0; k < flow.layers(); k++) {
                    double sigma = 0.3 * flow.level(k) + 0.7 * flow.level(k + 1);
                    double r = grid.radius(j) + 0.3 * (grid.radius(j + 1) - grid.radius(j));
                    if (i > 0) {
                        double[] left = flux(flow, i - 1, j, k, grid.lineTheta(i, j, r), r, sigma);
                        double[] right = flux(flow, i, j, k, grid.lineTheta(i, j, r), r, sigma);
                        double slope = grid.lineSlope(i, j);
                        double scale = Math.abs(left[0]) + Math.abs(slope * left[1]);
                        assertEquals(left[0] - slope * left[1], right[0] - slope * right[1], 1e-9 * scale);
                    }
                    double r0 = grid.radius(j);
                    double t0 = 0.6 * grid.theta(i, j) + 0.4 * grid.theta(i + 1, j);
                    double here = flux(flow, i, j, k, t0, r0, sigma)[1];
                    if (j > 0) {
                        assertEquals(flux(flow, i, j - 1, k, t0, r0, sigma)[1], here, 1e-9 * Math.abs(here));
                    }
                    double t = 0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r));
                    if (k > 0) {
                        double level = flow.level(k);
                        double[] above = flux(flow, i, j, k, t, r, level);
                        double[] below = flux(flow, i, j, k - 1, t, r, level);
                        for (int n = 0; n < 3; n++) {
                            assertEquals(below[n], above[n], 1e-9 * Math.abs(below[n]) + 1e-15);
                        }
                    }
                }
            }
        }
    }

    @Test
    void faces_areSealedButForTheFeed() {
        for (Face face : Face.values()) {
            ConservingFlow flow = new ConservingFlow(rough(face));
            FilmGrid grid = flow.film().grid();
            double fed = 0;
            for (int i = 0; i < grid.cellsTheta(); i++) {
                for (int j = 0; j < grid.cellsRadial(); j++) {
                    double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
                    double left = grid.lineTheta(i, j, r);
                    double width = grid.lineTheta(i + 1, j, r) - left;
                    double area = width * (grid.radius(j + 1) - grid.radius(j));
                    double atRotor = area * flux(flow, i, j, 0, left + 0.5 * width, r, 0)[2];
                    double atStator = area * flux(flow, i, j, flow.layers() - 1, left + 0.5 * width, r, 1)[2];
                    double supply = flow.supplyFlow(i, j);
                    fed += supply;
                    double rounding = 1e-13 * RadialCase.OUTER_FLOW;
                    assertEquals(face == Face.ROTOR ? supply : 0, atRotor, rounding);
                    assertEquals(face == Face.STATOR ? -supply : 0, atStator, rounding);
                    if (face == Face.ROTOR && flow.film().feeds(grid.cell(i, j))) {
                        assertEquals(1.3 * grid.cellArea(i, j), supply, 1e-12 * supply, "the supply that is given");
                    }
                }
            }
            assertTrue(fed > 0);
            assertTrue(flow.columnFlows().correction() > 1e-4, "the errors are seen");
            assertEquals(0, BorderBalance.of(flow).closure(), 1e-9);
        }
    }

    /** A feed whose velocities are 4 % short: the film says what enters, and the closure says how far they are off. */
    @Test
    void supply_velocitiesShort_followsWhatLeaves() {
        Film film = RadialCase.fullFilm(LEANING, 9, Frame.ROTATING, Frame.ROTATING);
        FullField field = (FullField) film.field();
        int nk = field.nk();
        double[] sigma = RadialCase.levels(nk);
        double[][] all = new double[4][LEANING.nodes() * nk];
        for (int n = 0; n < LEANING.nodes() * nk; n++) {
            all[0][n] = field.pressure(n / nk, n % nk);
            all[1][n] = field.velocityR(n / nk, n % nk);
            all[2][n] = field.velocityTheta(n / nk, n % nk);
            all[3][n] = 0.96 * field.velocityZ(n / nk, n % nk);
        }
        FullField lessFed = new FullField(sigma, all[0], all[1], all[2], all[3], null, null);
        ConservingFlow flow =
                new ConservingFlow(RadialCase.film(LEANING, film.faces(), lessFed, Frame.ROTATING, Frame.ROTATING));
        BorderBalance balance = BorderBalance.of(flow);
        assertEquals(-1 / 0.96 + 1, flow.columnFlows().closure(), 1e-6);
        assertEquals(RadialCase.INNER_FLOW + RadialCase.OUTER_FLOW, balance.supplyIn(), 1e-12);
        assertEquals(RadialCase.INNER_FLOW, balance.innerOut(), 1e-6 * RadialCase.INNER_FLOW);
    }

    /** Three levels are enough for the parabola of the thin film, F (3σ² − 2σ³) below a height (Reynolds 1886). */
    @Test
    void radialFlowBelow_parabola_isExactOnFewLevels() {
        for (int nk : new int[] {3, 4, 5, 12}) {
            FilmFlow flow = new ConservingFlow(RadialCase.fullFilm(LEANING, nk, Frame.ROTATING, Frame.ROTATING));
            double column = RadialCase.OUTER_FLOW / LEANING.sectors() / LEANING.cellsTheta();
            int outer = LEANING.nj() - 1;
            for (int n = 0; n <= 20; n++) {
                double s = n / 20.0;
                assertEquals(column * s * s * (3 - 2 * s), flow.radialFlowBelow(2, outer, s), 1e-12 * column);
            }
            assertEquals(1, flow.profilePart(flow.profileParts()), 0);
        }
    }

    /** The mirrored seal moves as the mirror shows it. */
    @Test
    void rates_mirroredSeal_areMirrored() {
        Film film = new WavyCase(12, 10, 8, 1.5).full(9, Frame.STATIONARY);
        FilmFlow flow = new ConservingFlow(film);
        FilmFlow mirrored = new ConservingFlow(WavyCase.mirrored(film));
        FilmGrid grid = film.grid();
        SplittableRandom random = new SplittableRandom(8);
        double[] a = new double[3];
        double[] b = new double[3];
        for (int n = 0; n < 300; n++) {
            int i = random.nextInt(grid.cellsTheta());
            int j = random.nextInt(grid.cellsRadial());
            int k = random.nextInt(flow.layers());
            double r = grid.radius(j) + random.nextDouble() * (grid.radius(j + 1) - grid.radius(j));
            double theta = grid.lineTheta(i, j, r)
                    + random.nextDouble() * (grid.lineTheta(i + 1, j, r) - grid.lineTheta(i, j, r));
            double sigma = flow.level(k) + random.nextDouble() * (flow.level(k + 1) - flow.level(k));
            flow.rates(i, j, k, theta, r, sigma, a);
            mirrored.rates(grid.cellsTheta() - 1 - i, j, k, -theta, r, sigma, b);
            assertEquals(a[0], -b[0], 1e-9 * RadialCase.OMEGA);
            assertEquals(a[1], b[1], 1e-9);
            assertEquals(a[2], b[2], 1e-9 * RadialCase.OMEGA);
        }
    }

    @Test
    void constructor_facesAtCells_isRefused() {
        Film film = RadialCase.fullFilm(LEANING, 5, Frame.ROTATING, Frame.ROTATING);
        Film other = RadialCase.film(
                LEANING, RadialCase.flatFaces(LEANING, Location.CELL), film.field(), Frame.ROTATING, Frame.ROTATING);
        assertThrows(IllegalArgumentException.class, () -> new ConservingFlow(other));
    }
}
