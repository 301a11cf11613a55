package org.whither.eddy;

import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * Looks up the film at any place of the frame in which it is steady. One instance belongs to one thread.
 */
final class Spot {
    private final FilmFlow flow;
    private final FilmGrid grid;
    private int i;
    private int j;
    private int k;
    private double theta;
    private double r;
    private double sigma;

    Spot(FilmFlow flow) {
        this.flow = flow;
        this.grid = flow.film().grid();
    }

    /**
     * Goes to a place.
     *
     * @param at angle, of any sector (rad)
     * @param radius radius within the face (m)
     * @param height fraction of the film thickness
     * @return this
     */
    Spot go(double at, double radius, double height) {
        r = radius;
        sigma = height;
        j = grid.row(radius);
        theta = at - grid.intoSector(at, j, radius) * grid.pitch();
        i = grid.column(theta, j, radius);
        k = layer(flow, height);
        return this;
    }

    /** Goes to a phase, of any sector. */
    Spot goPhase(double phase, double radius, double height) {
        return go(grid.lineTheta(0, grid.row(radius), radius) + phase * grid.pitch(), radius, height);
    }

    /** The layer that holds a height. */
    static int layer(FilmFlow flow, double height) {
        int k = 0;
        while (k < flow.layers() - 1 && flow.level(k + 1) <= height) {
            k++;
        }
        return k;
    }

    int i() {
        return i;
    }

    int j() {
        return j;
    }

    /** Angle within the sector (rad). */
    double theta() {
        return theta;
    }

    /** Angle counted from the first grid line, as a part of the sector, 0 … 1. */
    double phase() {
        return (theta - grid.lineTheta(0, j, r)) / grid.pitch();
    }

    /** dθ/dt, dr/dt, dσ/dt; overwritten. */
    void rates(double[] rates) {
        flow.rates(i, j, k, theta, r, sigma, rates);
    }

    double density() {
        return flow.density(i, j, k, theta, r, sigma);
    }

    double pressure() {
        return flow.pressure(i, j, k, theta, r, sigma);
    }

    double thickness() {
        return flow.thickness(i, j, theta, r);
    }

    /** Mass of gas a unit of θ, r and σ: ρ h r (kg/(rad m)). */
    double massDensity() {
        return density() * thickness() * r;
    }
}
