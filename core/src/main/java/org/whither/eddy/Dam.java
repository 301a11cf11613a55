package org.whither.eddy;

import java.util.Optional;
import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/**
 * The dam of a grooved face: of the rings without grooves the one at the end of the grooves that is nearest to the highest
 * pressure of the film.
 *
 * @param from its inner edge (m)
 * @param to its outer edge (m)
 */
record Dam(double from, double to) {
    /** A row of cells whose film thickness varies by less than this share of the least has no grooves. */
    private static final double GROOVE = 0.1;

    static Optional<Dam> of(FilmFlow flow) {
        FilmGrid grid = flow.film().grid();
        int rows = grid.cellsRadial();
        boolean[] grooved = new boolean[rows];
        boolean any = false;
        double highest = Double.NEGATIVE_INFINITY;
        double highestAt = Double.NaN;
        for (int j = 0; j < rows; j++) {
            double least = Double.POSITIVE_INFINITY;
            double most = 0;
            double pressure = 0;
            double r = 0.5 * (grid.radius(j) + grid.radius(j + 1));
            for (int i = 0; i < grid.cellsTheta(); i++) {
                double theta = 0.5 * (grid.lineTheta(i, j, r) + grid.lineTheta(i + 1, j, r));
                double h = flow.thickness(i, j, theta, r);
                least = Math.min(least, h);
                most = Math.max(most, h);
                pressure += flow.pressure(i, j, Spot.layer(flow, 0.5), theta, r, 0.5);
            }
            grooved[j] = most - least > GROOVE * least;
            any |= grooved[j];
            if (pressure > highest) {
                highest = pressure;
                highestAt = r;
            }
        }
        Dam best = null;
        double nearest = Double.POSITIVE_INFINITY;
        for (int j = 0; any && j < rows; ) {
            int end = j;
            while (end < rows && grooved[end] == grooved[j]) {
                end++;
            }
            if (!grooved[j]) {
                double from = grid.radius(j);
                double to = grid.radius(end);
                double away = Math.max(0, Math.max(from - highestAt, highestAt - to));
                if (away < nearest) {
                    nearest = away;
                    best = new Dam(from, to);
                }
            }
            j = end;
        }
        return Optional.ofNullable(best);
    }

    DamDistance distance(double radius) {
        return new DamDistance(from, to, radius - from, radius - to);
    }
}
