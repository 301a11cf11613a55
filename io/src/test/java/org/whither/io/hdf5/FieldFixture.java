package org.whither.io.hdf5;

import static org.junit.jupiter.api.Assertions.assertEquals;

import java.nio.file.Path;
import java.util.Optional;
import java.util.OptionalDouble;
import java.util.function.IntUnaryOperator;
import org.whither.film.Conditions;
import org.whither.film.Face;
import org.whither.film.FieldData;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.FullField;
import org.whither.film.Gas;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.RingFaces;
import org.whither.film.Supply;

/** The invented films of {@code fields/make_fields.py}, from the same formulas, and how two films are compared. */
final class FieldFixture {
    static final Path FOLDER = Path.of("src", "test", "resources", "fields");
    static final int NI = 7;
    static final int NJ = 5;
    static final int NK = 4;
    static final int SECTORS = 12;
    private static final double[] SIGMA = {0, 0.25, 0.75, 1};

    private FieldFixture() {}

    static Film full() {
        int count = NI * NJ * NK;
        double[] pressure = new double[count];
        double[] velocityR = new double[count];
        double[] velocityTheta = new double[count];
        double[] velocityZ = new double[count];
        double[] density = new double[count];
        double[] temperature = new double[count];
        for (int n = 0; n < count; n++) {
            int k = n % NK;
            int j = n / NK % NJ;
            int i = n / NK / NJ % (NI - 1);
            pressure[n] = 100000.0 + 50000 * j + 1000 * i + 10 * k;
            velocityR[n] = i - 2.0 * j + 0.5 * k;
            velocityTheta[n] = 10.0 * j - 0.25 * k + i;
            velocityZ[n] = 0.0078125 * k * (i - j);
            density[n] = 1 + 0.25 * j + 0.125 * k;
            temperature[n] = 300.0 + j + 0.5 * k;
        }
        FullField field = new FullField(SIGMA, pressure, velocityR, velocityTheta, velocityZ, density, temperature);
        return film(heading(), conditions(), 0.99, grid(0.05), faces(Location.NODE), field, Optional.of(mask(true)));
    }

    static Film filmNodes() {
        FilmGrid grid = grid(0);
        Supply supply = Supply.ofAnnulus(grid, Face.ROTOR, new Supply.Annulus(0.0525, 0.055), null);
        LubricationField field = new LubricationField(Location.NODE, pressure(NI, NJ), null);
        return film(heading(), conditions(), 0.99, grid, faces(Location.NODE), field, Optional.of(supply));
    }

    static Film filmCells() {
        double[] theta = new double[NI * (NJ - 1)];
        for (int n = 0; n < theta.length; n++) {
            theta[n] = 1e-6 * (n / (NJ - 1) % (NI - 1) + 10.0 * (n % (NJ - 1)));
        }
        double[] radial = new double[(NI - 1) * NJ];
        for (int n = 0; n < radial.length; n++) {
            radial[n] = 1e-6 * ((double) (n / NJ) - 10.0 * (n % NJ));
        }
        LubricationField field =
                new LubricationField(Location.CELL, pressure(NI - 1, NJ - 1), new MassFlows(theta, radial));
        return film(heading(), conditions(), 0.99, grid(0.05), faces(Location.CELL), field, Optional.of(mask(false)));
    }

    static Film filmMixed() {
        LubricationField field = new LubricationField(Location.CELL, pressure(NI - 1, NJ - 1), null);
        Conditions conditions =
                new Conditions(-1000.5, 100000, 300000, OptionalDouble.empty(), 300, "atmosphere", "process");
        Film.Heading heading = new Film.Heading("", "", "");
        return film(heading, conditions, 1, grid(0), faces(Location.NODE), field, Optional.empty());
    }

    private static Film.Heading heading() {
        return new Film.Heading("An invented film", "make_fields.py", "2026-01-02T03:04:05Z");
    }

    private static Conditions conditions() {
        return new Conditions(-1000.5, 100000, 300000, OptionalDouble.of(400000), 300, "process", "atmosphere");
    }

    private static Film film(
            Film.Heading heading,
            Conditions conditions,
            double compressibility,
            FilmGrid grid,
            RingFaces faces,
            FieldData field,
            Optional<Supply> supply) {
        Gas gas = new Gas("nitrogen", 0.0280134, 1.78e-5, compressibility);
        return new Film(heading, conditions, gas, grid, faces, Frame.STATIONARY, Frame.ROTATING, field, supply);
    }

    private static FilmGrid grid(double twist) {
        double[] radius = new double[NJ];
        for (int j = 0; j < NJ; j++) {
            radius[j] = 0.05 + 0.0025 * j;
        }
        double[] theta = new double[NI * NJ];
        for (int n = 0; n < theta.length; n++) {
            theta[n] = 2 * Math.PI / SECTORS * (double) (n / NJ) / (NI - 1) + twist * (n % NJ);
        }
        return new FilmGrid(radius, theta, SECTORS);
    }

    private static RingFaces faces(Location at) {
        int columns = at == Location.NODE ? NJ : NJ - 1;
        int rows = at == Location.NODE ? NI : NI - 1;
        double[] rotor = new double[rows * columns];
        double[] stator = new double[rows * columns];
        for (int n = 0; n < rotor.length; n++) {
            int i = n / columns % (NI - 1);
            int j = n % columns;
            rotor[n] = i >= 2 && i <= 3 && j >= 2 ? -5e-6 : 0;
            stator[n] = 4e-6 + 0.25e-6 * j;
        }
        return new RingFaces(at, rotor, stator);
    }

    private static double[] pressure(int rows, int columns) {
        double[] pressure = new double[rows * columns];
        for (int n = 0; n < pressure.length; n++) {
            pressure[n] = 100000.0 + 50000 * (n % columns) + 1000 * (n / columns % (NI - 1));
        }
        return pressure;
    }

    private static Supply mask(boolean flux) {
        boolean[] cells = new boolean[(NI - 1) * (NJ - 1)];
        double[] massFlux = new double[cells.length];
        for (int n = 0; n < cells.length; n++) {
            cells[n] = n % (NJ - 1) == 1;
            massFlux[n] = cells[n] ? 0.5 * (1 + n / (NJ - 1)) : 0;
        }
        return Supply.ofCells(Face.STATOR, cells, flux ? massFlux : null);
    }

    /** Asserts that two films are the same, numbers within a share of the largest of their kind. */
    static void assertSame(Film expected, Film actual, double share) {
        assertEquals(expected.heading(), actual.heading());
        assertEquals(expected.conditions(), actual.conditions());
        assertEquals(expected.gas(), actual.gas());
        assertEquals(expected.velocityFrame(), actual.velocityFrame());
        assertEquals(expected.steadyIn(), actual.steadyIn());
        FilmGrid grid = expected.grid();
        assertEquals(grid.ni(), actual.grid().ni());
        assertEquals(grid.nj(), actual.grid().nj());
        assertEquals(grid.sectors(), actual.grid().sectors());
        same("radius", grid.nj(), share, grid::radius, actual.grid()::radius);
        same(
                "theta",
                grid.nodes(),
                share,
                n -> grid.theta(n / grid.nj(), n % grid.nj()),
                n -> actual.grid().theta(n / grid.nj(), n % grid.nj()));
        assertEquals(expected.faces().at(), actual.faces().at());
        assertEquals(expected.faces().size(), actual.faces().size());
        same("rotor_z", expected.faces().size(), share, expected.faces()::rotorZ, actual.faces()::rotorZ);
        same("stator_z", expected.faces().size(), share, expected.faces()::statorZ, actual.faces()::statorZ);
        if (expected.field() instanceof FullField) {
            sameFull(grid, (FullField) expected.field(), (FullField) actual.field(), share);
        } else {
            sameLubrication((LubricationField) expected.field(), (LubricationField) actual.field(), share);
        }
        assertEquals(expected.supply().isPresent(), actual.supply().isPresent());
        if (expected.supply().isPresent()) {
            sameSupply(grid, expected.supply().get(), actual.supply().get(), share);
        }
    }

    private static void sameFull(FilmGrid grid, FullField expected, FullField actual, double share) {
        int nk = expected.nk();
        int count = grid.nodes() * nk;
        assertEquals(nk, actual.nk());
        assertEquals(expected.pressureConstantAcrossFilm(), actual.pressureConstantAcrossFilm());
        assertEquals(expected.hasDensity(), actual.hasDensity());
        assertEquals(expected.hasTemperature(), actual.hasTemperature());
        same("sigma", nk, share, expected::sigma, actual::sigma);
        same("pressure", count, share, n -> expected.pressure(n / nk, n % nk), n -> actual.pressure(n / nk, n % nk));
        same(
                "velocity_r",
                count,
                share,
                n -> expected.velocityR(n / nk, n % nk),
                n -> actual.velocityR(n / nk, n % nk));
        same(
                "velocity_theta",
                count,
                share,
                n -> expected.velocityTheta(n / nk, n % nk),
                n -> actual.velocityTheta(n / nk, n % nk));
        same(
                "velocity_z",
                count,
                share,
                n -> expected.velocityZ(n / nk, n % nk),
                n -> actual.velocityZ(n / nk, n % nk));
        if (expected.hasDensity()) {
            same(
                    "density",
                    count,
                    share,
                    n -> expected.density(n / nk, n % nk, null, 0),
                    n -> actual.density(n / nk, n % nk, null, 0));
        }
        if (expected.hasTemperature()) {
            same(
                    "temperature",
                    count,
                    share,
                    n -> expected.temperature(n / nk, n % nk),
                    n -> actual.temperature(n / nk, n % nk));
        }
    }

    private static void sameLubrication(LubricationField expected, LubricationField actual, double share) {
        assertEquals(expected.pressureAt(), actual.pressureAt());
        assertEquals(expected.size(), actual.size());
        same("pressure", expected.size(), share, expected::pressure, actual::pressure);
        assertEquals(expected.massFlows().isPresent(), actual.massFlows().isPresent());
        if (expected.massFlows().isPresent()) {
            double[] theta = expected.massFlows().get().thetaValues();
            double[] actualTheta = actual.massFlows().get().thetaValues();
            assertEquals(theta.length, actualTheta.length);
            same("mass_flow_theta", theta.length, share, n -> theta[n], n -> actualTheta[n]);
            double[] radial = expected.massFlows().get().radialValues();
            double[] actualRadial = actual.massFlows().get().radialValues();
            assertEquals(radial.length, actualRadial.length);
            same("mass_flow_r", radial.length, share, n -> radial[n], n -> actualRadial[n]);
        }
    }

    private static void sameSupply(FilmGrid grid, Supply expected, Supply actual, double share) {
        assertEquals(expected.face(), actual.face());
        assertEquals(expected.annulus(), actual.annulus());
        assertEquals(expected.hasMassFlux(), actual.hasMassFlux());
        IntUnaryOperator feed = n -> expected.feeds(n) ? 1 : 0;
        same("mask", grid.cells(), 0, feed::applyAsInt, n -> actual.feeds(n) ? 1 : 0);
        if (expected.hasMassFlux()) {
            same("mass_flux", grid.cells(), share, expected::massFlux, actual::massFlux);
        }
    }

    private static void same(
            String name,
            int count,
            double share,
            java.util.function.IntToDoubleFunction expected,
            java.util.function.IntToDoubleFunction actual) {
        double largest = 0;
        for (int n = 0; n < count; n++) {
            largest = Math.max(largest, Math.abs(expected.applyAsDouble(n)));
        }
        for (int n = 0; n < count; n++) {
            assertEquals(expected.applyAsDouble(n), actual.applyAsDouble(n), share * largest, name + " " + n);
        }
    }
}
