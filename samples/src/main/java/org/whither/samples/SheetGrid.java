package org.whither.samples;

import org.whither.film.FilmGrid;

/**
 * The solver's grid of one sector in the plane (θ, y = ln r), in which logarithmic spirals are straight lines and the
 * Laplace operator keeps its form. Its cells are parallelograms: the lines across the rings lie at θ = ξ(i) + offset(j),
 * so every row of cells has the same widths along θ, and its own shear.
 */
final class SheetGrid {
    private final double[] xi;
    private final double[] radius;
    private final double[] offset;
    private final int sectors;

    /**
     * A grid.
     *
     * @param xi angles of the lines at offset 0, strictly increasing by 2π/sectors in all, length nx + 1 (rad); kept
     * @param radius radii of the rings of nodes, strictly increasing, length nr + 1 (m); kept
     * @param offset turn of each ring of nodes, length nr + 1 (rad); kept
     * @param sectors how many such sectors make the ring
     */
    SheetGrid(double[] xi, double[] radius, double[] offset, int sectors) {
        this.xi = xi;
        this.radius = radius;
        this.offset = offset;
        this.sectors = sectors;
    }

    /** Cells along θ. */
    int nx() {
        return xi.length - 1;
    }

    /** Cells along r. */
    int nr() {
        return radius.length - 1;
    }

    /** All cells. */
    int cells() {
        return nx() * nr();
    }

    /** Index of cell (i, j), as in {@link FilmGrid#cell}. */
    int cell(int i, int j) {
        return i * nr() + j;
    }

    /** Angle of line i at offset 0 (rad). */
    double xi(int i) {
        return xi[i];
    }

    /** Radius of ring j (m). */
    double radius(int j) {
        return radius[j];
    }

    /** Width of column i along θ (rad). */
    double width(int i) {
        return xi[i + 1] - xi[i];
    }

    /** Height of row j in y (dimensionless). */
    double height(int j) {
        return Math.log(radius[j + 1] / radius[j]);
    }

    /** How far the lines turn over row j (rad). */
    double turn(int j) {
        return offset[j + 1] - offset[j];
    }

    /** Radius of the centres of row j's cells, in the middle of the row in y (m). */
    double middleRadius(int j) {
        return Math.sqrt(radius[j] * radius[j + 1]);
    }

    /** Angle of the centre of cell (i, j) (rad). */
    double middleTheta(int i, int j) {
        return 0.5 * (xi[i] + xi[i + 1] + offset[j] + offset[j + 1]);
    }

    /** Number of sectors. */
    int sectors() {
        return sectors;
    }

    /** The same grid in the words of the film. */
    FilmGrid toFilmGrid() {
        double[] theta = new double[xi.length * radius.length];
        for (int i = 0; i < xi.length; i++) {
            for (int j = 0; j < radius.length; j++) {
                theta[i * radius.length + j] = xi[i] + offset[j];
            }
        }
        return new FilmGrid(radius, theta, sectors);
    }
}
