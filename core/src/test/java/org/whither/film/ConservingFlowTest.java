package org.whither.film;

import static org.junit.jupiter.api.Assertions.assertEquals;
import static org.junit.jupiter.api.Assertions.assertTrue;

import java.util.SplittableRandom;
import org.junit.jupiter.api.Test;

class ConservingFlowTest {
    private static final FilmGrid LEANING = RadialCase.grid(9, RadialCase.radii(40, 32, 2e-4), 6, 0.3);

    /** Formed flows against the exact radial mass flows of the isothermal film (see {@link RadialCase}), within 0.1 %. */
    @Test
    void flowsFormedFromNodalPressure_radialFilm_matchExactMassFlows() {
        for (double lean : new double[] {0, 0.3, -0.3}) {
            FilmGrid grid = RadialCase.grid(9, RadialCase.radii(40, 32, 2e-4), 6, lean);
            ConservingFlow flow = new ConservingFlow(RadialCase.film(grid, false));
            double inner = 0;
            double outer = 0;
            for (int i = 0; i < grid.cellsTheta(); i++) {
                inner -= 6 * flow.radialFlowBelow(i, 0, 1);
                outer += 6 * flow.radialFlowBelow(i, grid.nj() - 1, 1);
            }
            assertTrue(flow.columnFlows().formed());
            assertEquals(RadialCase.INNER_FLOW, inner, 1e-3 * RadialCase.INNER_FLOW);
            assertEquals(RadialCase.OUTER_FLOW, outer, 1e-3 * RadialCase.OUTER_FLOW);
            assertTrue(
                    flow.columnFlows().correction() < 1e-3,
                    "correction " + flow.columnFlows().correction());
        }
    }

    /** The velocities of the thin film (Reynolds 1886), u_θ = −Ω r σ and u_r from the pressure gradient, within 0.2 %. */
    @Test
    void rates_radialFilm_areThinFilmVelocities() {
        SplittableRandom random = new SplittableRandom(1);
        for (boolean given : new boolean[] {true, false}) {
            ConservingFlow flow = new ConservingFlow(RadialCase.film(LEANING, given));
            double[] rates = new double[3];
            for (int n = 0; n < 200; n++) {
                int i = random.nextInt(LEANING.cellsTheta());
                int j = random.nextInt(LEANING.cellsRadial());
                double r = LEANING.radius(j) + random.nextDouble() * (LEANING.radius(j + 1) - LEANING.radius(j));
                // Not in the feed row, where the gas turns, nor where 100 to 190 kPa fall within one row.
                if (Math.abs(r - RadialCase.FEED_RADIUS) < 1e-3 || j == 0) {
                    continue;
                }
                double theta = LEANING.lineTheta(i, j, r)
                        + random.nextDouble() * (LEANING.lineTheta(i + 1, j, r) - LEANING.lineTheta(i, j, r));
                double sigma = random.nextDouble();
                flow.rates(i, j, 0, theta, r, sigma, rates);
                double ur = -RadialCase.H * RadialCase.H / (2 * 1.78e-5) * RadialCase.gradient(r) * sigma * (1 - sigma);
                assertEquals(-RadialCase.OMEGA * sigma, rates[0], 3e-3 * RadialCase.OMEGA, "dθ/dt");
                assertEquals(ur, rates[1], 2e-3 * Math.abs(ur) + 1e-9, "dr/dt at r = " + r);
                assertEquals(0, rates[2], 1e-6 * RadialCase.OMEGA, "dσ/dt");
            }
        }
    }

    /** Against the definition: the divergence of (mass × rates) by central differences is zero inside a cell. */
    @Test
    void rates_anyFlows_areFreeOfDivergence() {
        ConservingFlow flow = new ConservingFlow(wavy(LEANING, false));
        SplittableRandom random = new SplittableRandom(2);
        for (int n = 0; n < 300; n++) {
            int i = random.nextInt(LEANING.cellsTheta());
            int j = random.nextInt(LEANING.cellsRadial());
            double b = 0.1 + 0.8 * random.nextDouble();
            double a = 0.1 + 0.8 * random.nextDouble();
            double sigma = 0.1 + 0.8 * random.nextDouble();
            double r = LEANING.radius(j) + b * (LEANING.radius(j + 1) - LEANING.radius(j));
            double theta =
                    LEANING.lineTheta(i, j, r) + a * (LEANING.lineTheta(i + 1, j, r) - LEANING.lineTheta(i, j, r));
            double dr = 1e-4 * (LEANING.radius(j + 1) - LEANING.radius(j));
            double dt = 1e-4 * (LEANING.theta(i + 1, j) - LEANING.theta(i, j));
            double ds = 1e-4;
            double around =
                    (flux(flow, i, j, theta + dt, r, sigma)[0] - flux(flow, i, j, theta - dt, r, sigma)[0]) / (2 * dt);
            double out =
                    (flux(flow, i, j, theta, r + dr, sigma)[1] - flux(flow, i, j, theta, r - dr, sigma)[1]) / (2 * dr);
            double across =
                    (flux(flow, i, j, theta, r, sigma + ds)[2] - flux(flow, i, j, theta, r, sigma - ds)[2]) / (2 * ds);
            double size = Math.abs(around) + Math.abs(out) + Math.abs(across);
            assertEquals(0, (around + out + across) / size, 1e-5);
        }
    }

    private static double[] flux(ConservingFlow flow, int i, int j, double theta, double r, double sigma) {
        double[] rates = new double[3];
        flow.rates(i, j, 0, theta, r, sigma, rates);
        double mass = flow.density(i, j, 0, theta, r, sigma) * flow.thickness(i, j, theta, r) * r;
        return new double[] {mass * rates[0], mass * rates[1], mass * rates[2]};
    }

    /** The normal rate is the same from both sides of a cell face: what leaves one cell enters the next. */
    @Test
    void massFlux_stepInFilmThickness_isContinuousThroughCellFaces() {
        ConservingFlow flow = new ConservingFlow(stepped());
        FilmGrid grid = flow.film().grid();
        for (double sigma : new double[] {0.1, 0.4, 0.8, 1}) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                for (int i = 1; i < grid.cellsTheta(); i++) {
                    double r = grid.radius(j) + 0.3 * (grid.radius(j + 1) - grid.radius(j));
                    double theta = grid.lineTheta(i, j, r);
                    double[] left = flux(flow, i - 1, j, theta, r, sigma);
                    double[] right = flux(flow, i, j, theta, r, sigma);
                    double slope = grid.lineSlope(i, j);
                    double through = left[0] - slope * left[1];
                    double scale = Math.abs(left[0]) + Math.abs(slope * left[1]);
                    assertEquals(through, right[0] - slope * right[1], 1e-9 * scale);
                }
            }
        }
    }

    @Test
    void faces_areSealedButForTheFeed() {
        ConservingFlow flow = new ConservingFlow(wavy(LEANING, false));
        double[] rates = new double[3];
        for (int j = 0; j < LEANING.cellsRadial(); j++) {
            double r = 0.5 * (LEANING.radius(j) + LEANING.radius(j + 1));
            double theta = 0.5 * (LEANING.lineTheta(2, j, r) + LEANING.lineTheta(3, j, r));
            flow.rates(2, j, 0, theta, r, 0, rates);
            assertEquals(0, rates[2], 0);
            flow.rates(2, j, 0, theta, r, 1, rates);
            double mass = flow.density(2, j, 0, theta, r, 1)
                    * flow.thickness(2, j, theta, r)
                    * r
                    * (LEANING.radius(j + 1) - LEANING.radius(j))
                    * (LEANING.lineTheta(3, j, r) - LEANING.lineTheta(2, j, r));
            assertEquals(-flow.supplyFlow(2, j), rates[2] * mass, 1e-16);
        }
    }

    /** Flows measured by the other observer, or a film that calls the other frame steady, give the same motion. */
    @Test
    void rates_flowsMeasuredInEitherFrame_agree() {
        MassFlows rotating = RadialCase.massFlows(LEANING);
        double[] theta = rotating.thetaValues();
        for (int i = 0; i < LEANING.ni(); i++) {
            for (int j = 0; j < LEANING.cellsRadial(); j++) {
                double r0 = LEANING.radius(j);
                double r1 = LEANING.radius(j + 1);
                double middle = 0.5 * (r0 + r1);
                double integral = (RadialCase.pressure(r0) * r0
                                + 4 * RadialCase.pressure(middle) * middle
                                + RadialCase.pressure(r1) * r1)
                        / 6
                        * (r1 - r0);
                theta[i * LEANING.cellsRadial() + j] +=
                        RadialCase.OMEGA * RadialCase.NITROGEN.density(1, 300) * RadialCase.H * integral;
            }
        }
        double[] pressure = new double[LEANING.nodes()];
        for (int n = 0; n < pressure.length; n++) {
            pressure[n] = RadialCase.pressure(LEANING.radius(n % LEANING.nj()));
        }
        RingFaces faces = RadialCase.flatFaces(LEANING, Location.NODE);
        Film one = RadialCase.film(
                LEANING,
                faces,
                new LubricationField(Location.NODE, pressure, rotating),
                Frame.ROTATING,
                Frame.ROTATING);
        Film other = RadialCase.film(
                LEANING,
                faces,
                new LubricationField(Location.NODE, pressure, new MassFlows(theta, rotating.radialValues())),
                Frame.STATIONARY,
                Frame.STATIONARY);
        double[] a = new double[3];
        double[] b = new double[3];
        ConservingFlow first = new ConservingFlow(one);
        ConservingFlow second = new ConservingFlow(other);
        for (int j = 0; j < LEANING.cellsRadial(); j++) {
            double r = LEANING.radius(j) + 0.4 * (LEANING.radius(j + 1) - LEANING.radius(j));
            double at = LEANING.lineTheta(3, j, r) + 0.01;
            first.rates(3, j, 0, at, r, 0.3, a);
            second.rates(3, j, 0, at, r, 0.3, b);
            assertEquals(a[0] + RadialCase.OMEGA, b[0], 5e-3 * RadialCase.OMEGA);
            assertEquals(a[1], b[1], 1e-9);
            assertEquals(a[2], b[2], 1e-4 * Math.abs(a[2]) + 1e-3);
        }
    }

    /** A film whose pressure and film thickness wave around the ring. */
    static Film wavy(FilmGrid grid, boolean withFlows) {
        double[] pressure = new double[grid.nodes()];
        double[] stator = new double[grid.nodes()];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                double wave = Math.sin(2 * Math.PI * (i % grid.cellsTheta()) / grid.cellsTheta());
                double r = grid.radius(j);
                double hump = Math.sin(Math.PI * (r - 0.050) / 0.018);
                pressure[grid.node(i, j)] = RadialCase.pressure(r) * (1 + 0.05 * wave * hump);
                stator[grid.node(i, j)] = RadialCase.H * (1 + 0.2 * wave + 5 * (r - 0.050));
            }
        }
        return RadialCase.film(
                grid,
                new RingFaces(Location.NODE, new double[grid.nodes()], stator),
                new LubricationField(Location.NODE, pressure, withFlows ? RadialCase.massFlows(grid) : null),
                Frame.ROTATING,
                Frame.ROTATING);
    }

    /** A film with a step in film thickness between cells. */
    static Film stepped() {
        double[] pressure = new double[LEANING.cells()];
        double[] rotor = new double[LEANING.cells()];
        double[] stator = new double[LEANING.cells()];
        for (int i = 0; i < LEANING.cellsTheta(); i++) {
            for (int j = 0; j < LEANING.cellsRadial(); j++) {
                double r = 0.5 * (LEANING.radius(j) + LEANING.radius(j + 1));
                pressure[LEANING.cell(i, j)] = RadialCase.pressure(r);
                rotor[LEANING.cell(i, j)] = i >= 3 && i < 6 && r > 0.056 ? -6e-6 : 0;
                stator[LEANING.cell(i, j)] = RadialCase.H;
            }
        }
        return RadialCase.film(
                LEANING,
                new RingFaces(Location.CELL, rotor, stator),
                new LubricationField(Location.CELL, pressure, null),
                Frame.ROTATING,
                Frame.ROTATING);
    }
}
