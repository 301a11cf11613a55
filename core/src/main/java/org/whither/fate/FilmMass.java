package org.whither.fate;

import org.whither.film.FilmFlow;
import org.whither.film.FilmGrid;

/** The mass of gas in the film. */
public final class FilmMass {
    private static final double GAUSS = 0.5 / Math.sqrt(3);

    private FilmMass() {}

    /**
     * Mass of the gas in the whole ring, by Gauss–Legendre integration with two points a direction in each piece.
     *
     * @param flow the motion of the gas
     * @return mass (kg)
     */
    public static double of(FilmFlow flow) {
        FilmGrid grid = flow.film().grid();
        double sum = 0;
        for (int i = 0; i < grid.cellsTheta(); i++) {
            for (int j = 0; j < grid.cellsRadial(); j++) {
                double dr = grid.radius(j + 1) - grid.radius(j);
                for (int n = 0; n < 4; n++) {
                    double r = grid.radius(j) + dr * (0.5 + ((n & 1) == 0 ? -GAUSS : GAUSS));
                    double left = grid.lineTheta(i, j, r);
                    double width = grid.lineTheta(i + 1, j, r) - left;
                    double theta = left + width * (0.5 + ((n & 2) == 0 ? -GAUSS : GAUSS));
                    double area = 0.25 * dr * width * r;
                    double h = flow.thickness(i, j, theta, r);
                    for (int k = 0; k < flow.layers(); k++) {
                        double low = flow.level(k);
                        double thick = flow.level(k + 1) - low;
                        double density = 0.5
                                * (flow.density(i, j, k, theta, r, low + thick * (0.5 - GAUSS))
                                        + flow.density(i, j, k, theta, r, low + thick * (0.5 + GAUSS)));
                        sum += area * h * thick * density;
                    }
                }
            }
        }
        return sum * grid.sectors();
    }
}
