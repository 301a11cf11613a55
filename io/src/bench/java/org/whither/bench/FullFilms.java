package org.whither.bench;

import java.util.Optional;
import org.whither.film.Conditions;
import org.whither.film.Film;
import org.whither.film.FilmGrid;
import org.whither.film.FullField;
import org.whither.film.Location;
import org.whither.film.LubricationField;
import org.whither.film.MassFlows;
import org.whither.film.RingFaces;
import org.whither.film.Supply;
import org.whither.samples.GridSize;
import org.whither.samples.SampleSeals;

/**
 * Films of the demo seal for benchmarks: as its solver computes it, and as a flow solver would give it, with pressure and
 * velocities at nodes and levels. Groove edges, which a full field cannot hold as jumps, are ramps of two cells there.
 */
final class FullFilms {
    private FullFilms() {}

    /** The demo seal on a grid of nodes, as a lubrication film. */
    static Film lubrication(int ni, int nj) {
        return SampleSeals.compute("spiral", null, new GridSize(ni - 1, nj - 1), x -> {})
                .film();
    }

    /** The demo seal on a grid of nodes, as a full field of nk levels. */
    static Film full(int ni, int nj, int nk) {
        return full(lubrication(ni, nj), nk);
    }

    /**
     * A full field with the velocities of the thin film (Reynolds 1886) at the nodes of a lubrication film.
     *
     * @param film a lubrication film with values at the cells, its own mass flows and a feed through the stator, seen and
     *     steady in the rotating frame
     * @param nk number of levels, evenly spaced
     */
    static Film full(Film film, int nk) {
        FilmGrid grid = film.grid();
        Conditions conditions = film.conditions();
        LubricationField field = (LubricationField) film.field();
        MassFlows flows = field.massFlows().orElseThrow();
        Supply supply = film.supply().orElseThrow();
        double[] sigma = new double[nk];
        for (int k = 0; k < nk; k++) {
            sigma[k] = k / (nk - 1.0);
        }
        double[] rotorZ = new double[grid.nodes()];
        double[] statorZ = new double[grid.nodes()];
        double[] pressure = new double[grid.nodes() * nk];
        double[] velocityR = new double[pressure.length];
        double[] velocityTheta = new double[pressure.length];
        double[] velocityZ = new double[pressure.length];
        int nci = grid.cellsTheta();
        int ncj = grid.cellsRadial();
        for (int i = 0; i < grid.ni(); i++) {
            int[] columns = {Math.floorMod(i - 1, nci), i % nci};
            for (int j = 0; j < grid.nj(); j++) {
                int[] rows = {Math.max(0, j - 1), Math.min(ncj - 1, j)};
                int node = grid.node(i, j);
                double p = 0;
                double q = 0;
                double around = 0;
                double out = 0;
                double slope = 0;
                for (int row : rows) {
                    slope += 0.5 * grid.lineSlope(i, row);
                    around += 0.5 * flows.theta(grid, i, row) / (grid.radius(row + 1) - grid.radius(row));
                    for (int column : columns) {
                        int cell = grid.cell(column, row);
                        p += 0.25 * field.pressure(cell);
                        q += 0.25 * (supply.feeds(cell) ? supply.massFlux(cell) : 0);
                        rotorZ[node] += 0.25 * film.faces().rotorZ(cell);
                        statorZ[node] += 0.25 * film.faces().statorZ(cell);
                    }
                }
                for (int column : columns) {
                    out += 0.5 * flows.radial(grid, column, j) / (grid.theta(column + 1, j) - grid.theta(column, j));
                }
                if (j == 0) {
                    p = conditions.pressureInner();
                } else if (j == ncj) {
                    p = conditions.pressureOuter();
                }
                around += slope * out;
                double r = grid.radius(j);
                double density = film.gas().density(p, conditions.temperature());
                double column = density * (statorZ[node] - rotorZ[node]);
                double turning = -conditions.rotationRate() * r;
                for (int k = 0; k < nk; k++) {
                    double s = sigma[k];
                    int at = node * nk + k;
                    pressure[at] = p;
                    velocityR[at] = 6 * s * (1 - s) * out / (column * r);
                    velocityTheta[at] = turning * s + 6 * s * (1 - s) * (around / column - 0.5 * turning);
                    velocityZ[at] = -q / density * s * s * (3 - 2 * s);
                }
            }
        }
        return new Film(
                film.heading(),
                conditions,
                film.gas(),
                grid,
                new RingFaces(Location.NODE, rotorZ, statorZ),
                film.velocityFrame(),
                film.steadyIn(),
                new FullField(sigma, pressure, velocityR, velocityTheta, velocityZ, null, null),
                Optional.of(supply));
    }
}
