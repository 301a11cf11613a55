package org.whither.film;

import java.util.ArrayList;
import java.util.List;

/**
 * How far a film keeps to what a thin, continuous, laminar film assumes: the largest values over the film.
 *
 * @param reducedReynolds ρ|Ω|h²/µ, inertia over viscosity in a thin film
 * @param knudsen mean free path over film thickness; mean free path µ/p √(π R T / 2M), from kinetic theory (Maxwell
 *     1860; any text on rarefied gases)
 * @param exitMach highest speed at the two diameters, at the middle of the film, over the isothermal speed of sound √(RT/M)
 * @param slope steepest slope of the film thickness along the face, steps left out
 */
public record Validity(double reducedReynolds, double knudsen, double exitMach, double slope) {
    /** Above this reduced Reynolds number inertia counts. */
    public static final double REYNOLDS_BOUND = 1;

    /** Above this Knudsen number the gas slips along the faces. */
    public static final double KNUDSEN_BOUND = 0.01;

    /** Above this exit Mach number the exit may be choked. */
    public static final double MACH_BOUND = 0.7;

    /** Above this slope the film is not thin in the sense of the lubrication approximation. */
    public static final double SLOPE_BOUND = 0.05;

    /**
     * The validity figures of a film.
     *
     * @param flow its motion
     * @return the figures
     */
    public static Validity of(FilmFlow flow) {
        Film film = flow.film();
        FilmGrid grid = film.grid();
        double omega = Math.abs(film.conditions().rotationRate());
        double viscosity = film.gas().viscosity();
        double thermal = film.gas().specificGasConstant() * film.conditions().temperature();
        double reynolds = 0;
        double knudsen = 0;
        double mach = 0;
        double slope = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                // At both ends of the cell along r, since the pressure is lowest on the very edge of a diameter.
                for (int end = 0; end <= 1; end++) {
                    double r = grid.radius(j + end);
                    double theta = 0.5 * (grid.theta(i, j + end) + grid.theta(i + 1, j + end));
                    double h = flow.thickness(i, j, theta, r);
                    double rho = flow.density(i, j, 0, theta, r, 0);
                    double p = flow.pressure(i, j, 0, theta, r, 0);
                    reynolds = Math.max(reynolds, rho * omega * h * h / viscosity);
                    knudsen = Math.max(knudsen, viscosity / p * Math.sqrt(Math.PI * thermal / 2) / h);
                }
                if (film.faces().at() == Location.NODE) {
                    double rise = film.faces().thickness(grid.node(i, j + 1))
                            - film.faces().thickness(grid.node(i, j));
                    slope = Math.max(slope, Math.abs(rise) / (grid.radius(j + 1) - grid.radius(j)));
                }
            }
            mach = Math.max(mach, Math.max(exitMach(flow, i, 0, thermal), exitMach(flow, i, grid.nj() - 1, thermal)));
        }
        return new Validity(reynolds, knudsen, mach, slope);
    }

    private static double exitMach(FilmFlow flow, int i, int j, double thermal) {
        FilmGrid grid = flow.film().grid();
        int row = Math.min(j, grid.cellsRadial() - 1);
        double r = grid.radius(j);
        double left = grid.theta(i, j);
        double width = grid.theta(i + 1, j) - left;
        double theta = left + 0.5 * width;
        double column = flow.density(i, row, 0, theta, r, 0) * flow.thickness(i, row, theta, r) * r * width;
        return 1.5 * Math.abs(flow.radialFlowBelow(i, j, 1)) / column / Math.sqrt(thermal);
    }

    /** What a user must know where a bound is passed, a sentence each; empty where none is. */
    public List<String> warnings() {
        List<String> said = new ArrayList<>();
        if (reducedReynolds > REYNOLDS_BOUND) {
            said.add(String.format(
                    java.util.Locale.ROOT,
                    "The reduced Reynolds number reaches %.2g, above %.0f: inertia counts in this film, and a field"
                            + " computed without it is in doubt.",
                    reducedReynolds,
                    REYNOLDS_BOUND));
        }
        if (knudsen > KNUDSEN_BOUND) {
            said.add(String.format(
                    java.util.Locale.ROOT,
                    "The mean free path reaches %.2g of the film thickness, above %.2f: the gas slips along the faces,"
                            + " and a field computed without slip understates the leakage there.",
                    knudsen,
                    KNUDSEN_BOUND));
        }
        if (exitMach > MACH_BOUND) {
            said.add(String.format(
                    java.util.Locale.ROOT,
                    "The gas leaves at up to %.2g of the speed of sound, above %.1f: the exit may be choked.",
                    exitMach,
                    MACH_BOUND));
        }
        if (slope > SLOPE_BOUND) {
            said.add(String.format(
                    java.util.Locale.ROOT,
                    "The film thickness changes by up to %.2g along the face, above %.2f: the film is not thin there.",
                    slope,
                    SLOPE_BOUND));
        }
        return said;
    }
}
