package org.whither.film;

import java.util.Optional;
import java.util.OptionalDouble;

/**
 * The exact radial isothermal film: constant film thickness h, gas fed at radius 60 mm at 1.0 MPa, to 50 mm (atmosphere)
 * and 68 mm (process). ṁ = π h³ |p₁² − p₂²| / (12 µ R_s T ln(r₂/r₁)), p² linear in ln r: the integral of the Reynolds
 * equation (Reynolds 1886) for a plane gap. The values are the base case of the project's check values, computed from
 * that formula: 5.738833e-5 kg/s to the inner and 4.307618e-5 kg/s to the outer diameter.
 */
public final class RadialCase {
    public static final double H = 4e-6;
    public static final double FEED_RADIUS = 0.060;
    public static final double SUPPLY_PRESSURE = 1.0e6;
    public static final double INNER_FLOW = 5.738833e-5;
    public static final double OUTER_FLOW = 4.307618e-5;
    public static final double INNER_TIME = 1.88363299e-3;
    public static final double OUTER_TIME = 2.86044579e-3;
    public static final double OMEGA = 12000 * Math.PI / 30;
    public static final Conditions CONDITIONS =
            new Conditions(OMEGA, 101325, 0.7e6, OptionalDouble.of(SUPPLY_PRESSURE), 300, "atmosphere", "process");
    /** R_s = 296.8 J/(kg K) as in the base case. */
    public static final Gas NITROGEN = new Gas("nitrogen", Gas.MOLAR_GAS_CONSTANT / 296.8, 1.78e-5, 1);

    private RadialCase() {}

    /** Absolute pressure at a radius (Pa). */
    public static double pressure(double r) {
        double end = r < FEED_RADIUS ? 0.050 : 0.068;
        double endPressure = r < FEED_RADIUS ? 101325 : 0.7e6;
        double part = Math.log(r / FEED_RADIUS) / Math.log(end / FEED_RADIUS);
        return Math.sqrt(SUPPLY_PRESSURE * SUPPLY_PRESSURE
                + part * (endPressure * endPressure - SUPPLY_PRESSURE * SUPPLY_PRESSURE));
    }

    /** dp/dr at a radius (Pa/m). */
    public static double gradient(double r) {
        double end = r < FEED_RADIUS ? 0.050 : 0.068;
        double endPressure = r < FEED_RADIUS ? 101325 : 0.7e6;
        return (endPressure * endPressure - SUPPLY_PRESSURE * SUPPLY_PRESSURE)
                / Math.log(end / FEED_RADIUS)
                / r
                / (2 * pressure(r));
    }

    /** Radii from 50 to 68 mm with a narrow row of width {@code feed} about the feed. */
    public static double[] radii(int inner, int outer, double feed) {
        double[] r = new double[inner + outer + 2];
        for (int j = 0; j <= inner; j++) {
            r[j] = 0.050 + (FEED_RADIUS - feed / 2 - 0.050) * j / inner;
        }
        for (int j = 0; j <= outer; j++) {
            r[inner + 1 + j] = FEED_RADIUS + feed / 2 + (0.068 - FEED_RADIUS - feed / 2) * j / outer;
        }
        return r;
    }

    /** A grid whose lines lean by {@code lean} rad from the inner to the outer diameter. */
    public static FilmGrid grid(int cellsTheta, double[] radii, int sectors, double lean) {
        double[] theta = new double[(cellsTheta + 1) * radii.length];
        for (int i = 0; i <= cellsTheta; i++) {
            for (int j = 0; j < radii.length; j++) {
                theta[i * radii.length + j] = 2 * Math.PI / sectors * i / cellsTheta
                        + lean * (radii[j] - radii[0]) / (radii[radii.length - 1] - radii[0]);
            }
        }
        return new FilmGrid(radii, theta, sectors);
    }

    public static RingFaces flatFaces(FilmGrid grid, Location at) {
        int size = at == Location.NODE ? grid.nodes() : grid.cells();
        double[] stator = new double[size];
        java.util.Arrays.fill(stator, H);
        return new RingFaces(at, new double[size], stator);
    }

    /** The exact mass flows, measured in the rotating frame. */
    public static MassFlows massFlows(FilmGrid grid) {
        double[] theta = new double[grid.ni() * grid.cellsRadial()];
        double[] radial = new double[grid.cellsTheta() * grid.nj()];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            double part = (grid.theta(i + 1, 0) - grid.theta(i, 0)) / (2 * Math.PI);
            for (int j = 0; j < grid.nj(); j++) {
                radial[i * grid.nj() + j] = part * (grid.radius(j) < FEED_RADIUS ? -INNER_FLOW : OUTER_FLOW);
            }
        }
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                // ∫ ρh (u_θ − r θ' u_r) dr, u_θ = −Ω r/2 and ρ h r u_r = flow / 2π, by Simpson's rule
                double r0 = grid.radius(j);
                double r1 = grid.radius(j + 1);
                double middle = 0.5 * (r0 + r1);
                double turning = 0;
                double[] weight = {1.0 / 6, 4.0 / 6, 1.0 / 6};
                double[] at = {r0, middle, r1};
                for (int n = 0; n < 3; n++) {
                    turning +=
                            weight[n] * -0.5 * OMEGA * at[n] * NITROGEN.density(pressure(at[n]), 300) * H * (r1 - r0);
                }
                double below = r0 < FEED_RADIUS ? -INNER_FLOW : OUTER_FLOW;
                double above = r1 < FEED_RADIUS ? -INNER_FLOW : OUTER_FLOW;
                double outward = 0.5 * (below + above) / (2 * Math.PI);
                double lean = grid.lineSlope(Math.min(i, grid.cellsTheta() - 1), j) * (r1 - r0);
                theta[i * grid.cellsRadial() + j] = turning - outward * lean;
            }
        }
        return new MassFlows(theta, radial);
    }

    public static Supply supply(FilmGrid grid) {
        return Supply.ofAnnulus(grid, Face.STATOR, new Supply.Annulus(FEED_RADIUS - 1e-5, FEED_RADIUS + 1e-5), null);
    }

    /** A lubrication film with the exact flows. */
    public static Film film(FilmGrid grid, boolean withFlows) {
        double[] pressure = new double[grid.nodes()];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                pressure[grid.node(i, j)] = pressure(grid.radius(j));
            }
        }
        return film(
                grid,
                flatFaces(grid, Location.NODE),
                new LubricationField(Location.NODE, pressure, withFlows ? massFlows(grid) : null),
                Frame.ROTATING,
                Frame.ROTATING);
    }

    public static Film film(FilmGrid grid, RingFaces faces, FieldData field, Frame velocityFrame, Frame steadyIn) {
        return new Film(
                new Film.Heading("radial case", "exact solution", ""),
                CONDITIONS,
                NITROGEN,
                grid,
                faces,
                velocityFrame,
                steadyIn,
                field,
                Optional.of(supply(grid)));
    }

    /** Levels across the film, close to each other near the faces. */
    static double[] levels(int nk) {
        double[] sigma = new double[nk];
        for (int k = 0; k < nk; k++) {
            sigma[k] = 0.5 * (1 - Math.cos(Math.PI * k / (nk - 1)));
        }
        sigma[nk - 1] = 1;
        return sigma;
    }

    /** The same film as a full field: the thin-film velocities at the nodes, measured in a frame, steady in another. */
    public static Film fullFilm(FilmGrid grid, int nk, Frame velocityFrame, Frame steadyIn) {
        double[] sigma = levels(nk);
        int size = grid.nodes() * nk;
        double[] pressure = new double[size];
        double[] ur = new double[size];
        double[] ut = new double[size];
        double[] uz = new double[size];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                double r = grid.radius(j);
                // Between the two ends of the feed row the radial flow turns from inward to outward.
                double flux = (r < FEED_RADIUS ? -INNER_FLOW : OUTER_FLOW) / (2 * Math.PI * r);
                boolean feedEdge = Math.abs(r - FEED_RADIUS) < 1.01e-4;
                for (int k = 0; k < nk; k++) {
                    int at = grid.node(i, j) * nk + k;
                    double s = sigma[k];
                    pressure[at] = pressure(r);
                    double rho = NITROGEN.density(pressure(r), 300);
                    ur[at] = flux / (rho * H) * 6 * s * (1 - s);
                    ut[at] = -OMEGA * r * s + (velocityFrame == Frame.STATIONARY ? OMEGA * r : 0);
                    double supplied = (INNER_FLOW + OUTER_FLOW) / (2 * Math.PI * FEED_RADIUS * 2e-4);
                    uz[at] = feedEdge ? -supplied / rho * s * s * (3 - 2 * s) : 0;
                }
            }
        }
        return film(
                grid,
                flatFaces(grid, Location.NODE),
                new FullField(sigma, pressure, ur, ut, uz, null, null),
                velocityFrame,
                steadyIn);
    }
}
