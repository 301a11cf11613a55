package org.whither.bench;

import org.whither.film.Film;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * The motion of the gas as a general-purpose integrator sees it: rates at a point (θ, r, σ) of the frame in which the film
 * is steady. The piece of the film that holds the point is found by walking from that of the last call.
 */
final class LocatedFlow {
    private final FilmFlow flow;
    private final FilmGrid grid;
    private final double[] rates = new double[3];
    private int i;
    private int j;
    private int k;
    private long evaluations;

    LocatedFlow(FilmFlow flow) {
        this.flow = flow;
        this.grid = flow.film().grid();
    }

    /** How far along the radius a tracer is inside the film; 0 on the two diameters, negative beyond them (m). */
    double inside(double r) {
        return Math.min(r - grid.innerRadius(), grid.outerRadius() - r);
    }

    /**
     * What counts as an error of each part of the state at a tolerance, as {@link org.whither.trace.TraceSettings} has it.
     */
    static double[] errorScale(Film film, double tolerance) {
        FilmGrid grid = film.grid();
        double extent = grid.outerRadius() - grid.innerRadius();
        double middle = 0.5 * (grid.outerRadius() + grid.innerRadius());
        return new double[] {tolerance * extent / middle, tolerance * extent, tolerance};
    }

    /** How often the rates were asked for. */
    long evaluations() {
        return evaluations;
    }

    /** Rates at a state; points beyond the film are given the rates of the nearest point in it. */
    void rates(double[] state, double[] dydt) {
        evaluations++;
        double r = Math.max(grid.innerRadius(), Math.min(grid.outerRadius(), state[1]));
        double sigma = Math.max(0, Math.min(1, state[2]));
        while (j > 0 && r < grid.radius(j)) {
            j--;
        }
        while (j < grid.cellsRadial() - 1 && r >= grid.radius(j + 1)) {
            j++;
        }
        double first = grid.lineTheta(0, j, r);
        double turn = state[0] - first;
        double theta = first + turn - grid.pitch() * Math.floor(turn / grid.pitch());
        if (Math.abs(theta - grid.lineTheta(i, j, r)) > 0.5 * grid.pitch()) {
            i = grid.column(theta, j, r);
        }
        while (i > 0 && theta < grid.lineTheta(i, j, r)) {
            i--;
        }
        while (i < grid.cellsTheta() - 1 && theta >= grid.lineTheta(i + 1, j, r)) {
            i++;
        }
        while (k > 0 && sigma < flow.level(k)) {
            k--;
        }
        while (k < flow.layers() - 1 && sigma >= flow.level(k + 1)) {
            k++;
        }
        flow.rates(i, j, k, theta, r, sigma, rates);
        System.arraycopy(rates, 0, dydt, 0, 3);
    }
}
