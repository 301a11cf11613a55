package org.whither.eddy;

import java.util.Arrays;
import java.util.Optional;
import java.util.OptionalDouble;
import org.whither.film.Conditions;
import org.whither.film.FieldData;
import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;
import org.whither.film.Frame;
import org.whither.film.Gas;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.RingFaces;

/** A film of even thickness and density whose motion is a known function of the place, steady in the stationary frame. */
final class KnownMotion implements FilmFlow {
    static final Gas GAS = new Gas("air", 0.0289647, 1.8e-5, 1);
    static final double PRESSURE = 5e5;
    static final double THICKNESS = 5e-6;
    static final double DENSITY = GAS.density(PRESSURE, 300);

    /** The rates at a place. */
    @FunctionalInterface
    interface Rates {
        void at(double theta, double r, double sigma, double[] rates);
    }

    /** Mass flow outwards below a height, a unit of angle (kg/(s rad)). */
    @FunctionalInterface
    interface Below {
        double at(double theta, double r, double sigma);
    }

    private final Film film;
    private final Rates rates;
    private final Below below;

    KnownMotion(FilmGrid grid, double rotationRate, Rates rates, Below below) {
        double[] pressure = new double[grid.nodes()];
        Arrays.fill(pressure, PRESSURE);
        this.film = film(grid, THICKNESS, rotationRate, new LubricationField(Location.NODE, pressure, null));
        this.rates = rates;
        this.below = below;
    }

    static Film film(FilmGrid grid, double thickness, double rotationRate, FieldData field) {
        double[] stator = new double[grid.nodes()];
        Arrays.fill(stator, thickness);
        return new Film(
                new Film.Heading("known motion", "", ""),
                new Conditions(rotationRate, PRESSURE, PRESSURE, OptionalDouble.empty(), 300, "atmosphere", "process"),
                GAS,
                grid,
                new RingFaces(Location.NODE, new double[grid.nodes()], stator),
                Frame.STATIONARY,
                Frame.STATIONARY,
                field,
                Optional.empty());
    }

    /** A grid of straight lines and even steps. */
    static FilmGrid grid(int cellsTheta, int cellsRadial, double inner, double outer, int sectors) {
        double[] radius = new double[cellsRadial + 1];
        double[] theta = new double[(cellsTheta + 1) * radius.length];
        for (int j = 0; j <= cellsRadial; j++) {
            radius[j] = inner + (outer - inner) * j / cellsRadial;
            for (int i = 0; i <= cellsTheta; i++) {
                theta[i * radius.length + j] = 2 * Math.PI / sectors * i / cellsTheta;
            }
        }
        return new FilmGrid(radius, theta, sectors);
    }

    @Override
    public Film film() {
        return film;
    }

    @Override
    public int layers() {
        return 1;
    }

    @Override
    public double level(int k) {
        return k;
    }

    @Override
    public void rates(int i, int j, int k, double theta, double r, double sigma, double[] out) {
        rates.at(theta, r, sigma, out);
    }

    @Override
    public double pressure(int i, int j, int k, double theta, double r, double sigma) {
        return PRESSURE;
    }

    @Override
    public double density(int i, int j, int k, double theta, double r, double sigma) {
        return DENSITY;
    }

    @Override
    public double rotorZ(int i, int j, double theta, double r) {
        return 0;
    }

    @Override
    public double thickness(int i, int j, double theta, double r) {
        return THICKNESS;
    }

    @Override
    public double supplyFlow(int i, int j) {
        return 0;
    }

    @Override
    public double radialFlowBelow(int i, int j, double sigma) {
        FilmGrid grid = film.grid();
        double from = grid.theta(i, j);
        double width = grid.theta(i + 1, j) - from;
        double r = grid.radius(j);
        return width
                / 6
                * (below.at(from, r, sigma)
                        + 4 * below.at(from + 0.5 * width, r, sigma)
                        + below.at(from + width, r, sigma));
    }

    @Override
    public String interpolation() {
        return "known";
    }
}
