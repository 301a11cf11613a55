package org.whither.film;

import java.util.Optional;

/**
 * An invented film with known column flows, which both kinds of field can hold: its pressure and its film thickness wave
 * around the ring, and its column flows are a source in the feed row plus the curl of a stream function, strong enough
 * to draw in gas at the outer diameter. Across the film it is a thin film (Reynolds 1886): the drag of the stator, seen
 * from the rotor, and a parabola. The figures have no source outside; what is checked is that the full field, which
 * knows only velocities at the nodes, moves like the lubrication film, which knows the exact flows of the faces.
 */
public final class WavyCase {
    static final int SECTORS = 6;
    private final FilmGrid grid;
    private final double stream;

    /** On a grid of a sixth of the ring; {@code stream} is the amplitude of the stream function over the outer flow. */
    public WavyCase(int cellsTheta, int inner, int outer, double stream) {
        grid = RadialCase.grid(cellsTheta, RadialCase.radii(inner, outer, 2e-4), SECTORS, 0.3);
        this.stream = stream * RadialCase.OUTER_FLOW / (2 * Math.PI);
    }

    public FilmGrid grid() {
        return grid;
    }

    private static double pressureAt(double theta, double r) {
        return RadialCase.pressure(r) * (1 + 0.05 * Math.sin(SECTORS * theta) * hump(r));
    }

    private static double hump(double r) {
        return Math.sin(Math.PI * (r - 0.050) / 0.018);
    }

    private static double thicknessAt(double theta, double r) {
        return RadialCase.H * (1 + 0.2 * Math.cos(SECTORS * theta) + 5 * (r - 0.050));
    }

    private static double columnAt(double theta, double r) {
        return RadialCase.NITROGEN.density(pressureAt(theta, r), 300) * thicknessAt(theta, r);
    }

    private double streamAt(double theta, double r) {
        double x = (r - 0.050) / 0.018;
        return stream / SECTORS * x * x * Math.sin(SECTORS * theta);
    }

    private double streamTheta(double theta, double r) {
        double x = (r - 0.050) / 0.018;
        return stream * x * x * Math.cos(SECTORS * theta);
    }

    private double streamRadial(double theta, double r) {
        double x = (r - 0.050) / 0.018;
        return stream / SECTORS * 2 * x / 0.018 * Math.sin(SECTORS * theta);
    }

    private static double source(double r) {
        return (r < RadialCase.FEED_RADIUS ? -RadialCase.INNER_FLOW : RadialCase.OUTER_FLOW) / (2 * Math.PI);
    }

    /** Column flow that turns round with the rotor, the same at every angle, a unit of radius. */
    private static double turning(double r) {
        return -0.5 * RadialCase.OMEGA * r * RadialCase.NITROGEN.density(RadialCase.pressure(r), 300) * RadialCase.H;
    }

    private RingFaces faces() {
        double[] rotor = new double[grid.nodes()];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                rotor[grid.node(i, j)] = -thicknessAt(grid.theta(i, j), grid.radius(j));
            }
        }
        return new RingFaces(Location.NODE, rotor, new double[grid.nodes()]);
    }

    public Film lubrication() {
        double[] pressure = new double[grid.nodes()];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                pressure[grid.node(i, j)] = pressureAt(grid.theta(i, j), grid.radius(j));
            }
        }
        double[] theta = new double[grid.ni() * grid.cellsRadial()];
        double[] radial = new double[grid.cellsTheta() * grid.nj()];
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                double from = grid.theta(i, j);
                double to = grid.theta(i + 1, j);
                double r = grid.radius(j);
                radial[i * grid.nj() + j] = source(r) * (to - from) + streamAt(to, r) - streamAt(from, r);
            }
        }
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double r0 = grid.radius(j);
                double r1 = grid.radius(j + 1);
                double round = (turning(r0) + 4 * turning(0.5 * (r0 + r1)) + turning(r1)) / 6 * (r1 - r0);
                double out = 0.5 * (source(r0) + source(r1)) * (grid.theta(i, j + 1) - grid.theta(i, j));
                theta[i * grid.cellsRadial() + j] =
                        round - out - streamAt(grid.theta(i, j + 1), r1) + streamAt(grid.theta(i, j), r0);
            }
        }
        return RadialCase.film(
                grid,
                faces(),
                new LubricationField(Location.NODE, pressure, new MassFlows(theta, radial)),
                Frame.ROTATING,
                Frame.ROTATING);
    }

    public Film full(int nk, Frame velocityFrame) {
        double[] sigma = RadialCase.levels(nk);
        double[] pressure = new double[grid.nodes()];
        double[] ur = new double[grid.nodes() * nk];
        double[] ut = new double[ur.length];
        double[] uz = new double[ur.length];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                double theta = grid.theta(i, j);
                double r = grid.radius(j);
                double column = columnAt(theta, r);
                int node = grid.node(i, j);
                pressure[node] = pressureAt(theta, r);
                double outward = (source(r) + streamTheta(theta, r)) / (column * r);
                double driven = (turning(r) - streamRadial(theta, r)) / column + 0.5 * RadialCase.OMEGA * r;
                boolean feedEdge = Math.abs(r - RadialCase.FEED_RADIUS) < 1.01e-4;
                double supplied =
                        (RadialCase.INNER_FLOW + RadialCase.OUTER_FLOW) / (2 * Math.PI * RadialCase.FEED_RADIUS * 2e-4);
                for (int k = 0; k < nk; k++) {
                    double s = sigma[k];
                    double parabola = 6 * s * (1 - s);
                    int at = node * nk + k;
                    ur[at] = outward * parabola;
                    ut[at] = driven * parabola
                            - RadialCase.OMEGA * r * s
                            + (velocityFrame == Frame.STATIONARY ? RadialCase.OMEGA * r : 0);
                    uz[at] = feedEdge
                            ? -supplied / RadialCase.NITROGEN.density(pressure[node], 300) * s * s * (3 - 2 * s)
                            : 0;
                }
            }
        }
        return RadialCase.film(
                grid, faces(), new FullField(sigma, pressure, ur, ut, uz, null, null), velocityFrame, Frame.ROTATING);
    }

    /** The same full film in a mirror: θ and the rotation rate with the other sign. */
    public static Film mirrored(Film film) {
        FilmGrid grid = film.grid();
        FullField field = (FullField) film.field();
        int nk = field.nk();
        double[] radius = new double[grid.nj()];
        double[] theta = new double[grid.nodes()];
        double[] rotor = new double[grid.nodes()];
        double[] stator = new double[grid.nodes()];
        double[] sigma = new double[nk];
        double[] pressure = new double[grid.nodes()];
        double[] ur = new double[grid.nodes() * nk];
        double[] ut = new double[ur.length];
        double[] uz = new double[ur.length];
        for (int i = 0; i < grid.ni(); i++) {
            for (int j = 0; j < grid.nj(); j++) {
                int from = grid.node(grid.ni() - 1 - i, j);
                int to = grid.node(i, j);
                radius[j] = grid.radius(j);
                theta[to] = -grid.theta(grid.ni() - 1 - i, j);
                rotor[to] = film.faces().rotorZ(from);
                stator[to] = film.faces().statorZ(from);
                pressure[to] = field.pressure(from, 0);
                for (int k = 0; k < nk; k++) {
                    sigma[k] = field.sigma(k);
                    ur[to * nk + k] = field.velocityR(from, k);
                    ut[to * nk + k] = -field.velocityTheta(from, k);
                    uz[to * nk + k] = field.velocityZ(from, k);
                }
            }
        }
        FilmGrid turned = new FilmGrid(radius, theta, grid.sectors());
        Conditions c = film.conditions();
        return new Film(
                film.heading(),
                new Conditions(
                        -c.rotationRate(),
                        c.pressureInner(),
                        c.pressureOuter(),
                        c.pressureSupply(),
                        c.temperature(),
                        c.innerSide(),
                        c.outerSide()),
                film.gas(),
                turned,
                new RingFaces(Location.NODE, rotor, stator),
                film.velocityFrame(),
                film.steadyIn(),
                new FullField(sigma, pressure, ur, ut, uz, null, null),
                Optional.of(RadialCase.supply(turned)));
    }
}
