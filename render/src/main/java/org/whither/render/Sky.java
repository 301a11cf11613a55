package org.whither.render;

import org.whither.film.FilmGrid;

/**
 * How much of the sky the rotor face sees from each of its places: groove floors see less of it near their walls, and the
 * picture darkens them so. Heights are those of the drawing. The share of an evenly bright sky that lights a level place
 * is the mean, over directions round it, of cos² of the height of the horizon (N. L. Max, Horizon mapping, The Visual
 * Computer 4, 1988, from memory).
 */
final class Sky {
    private static final int DIRECTIONS = 12;

    /** Distances at which the horizon is looked for, in depths of the deepest groove. */
    private static final double[] DISTANCES = {0.08, 0.2, 0.4, 0.7, 1.1, 1.7, 2.6};

    private final FilmGrid grid;
    private final double depth;
    private final float[] heights;
    private final int columns;
    private final int rows;

    /** The heights of one sector of the rotor face, on an even grid in θ and r. */
    Sky(FilmShape shape, GapScene gap) {
        this.grid = shape.grid();
        this.depth = gap.height(shape.rotorHigh()) - gap.height(shape.rotorLow());
        boolean flat = !shape.rotorGrooved();
        double span = grid.outerRadius() - grid.innerRadius();
        this.rows = flat ? 0 : 160;
        this.columns = flat ? 0 : (int) Math.ceil(grid.pitch() * grid.outerRadius() / (span / rows));
        this.heights = new float[rows * columns];
        for (int a = 0; a < columns; a++) {
            for (int b = 0; b < rows; b++) {
                double r = grid.innerRadius() + span * (b + 0.5) / rows;
                heights[a * rows + b] = (float) gap.height(gap.rotorAt(grid.pitch() * (a + 0.5) / columns, r));
            }
        }
    }

    /** Drawn height at the nearest place of the even grid (mm); beyond the rims the lowest. */
    private double height(double theta, double r) {
        double f = (r - grid.innerRadius()) / (grid.outerRadius() - grid.innerRadius());
        if (f < 0 || f >= 1) {
            return -1e9;
        }
        double turns = theta / grid.pitch();
        int a = Math.min(columns - 1, (int) ((turns - Math.floor(turns)) * columns));
        return heights[a * rows + (int) (f * rows)];
    }

    /**
     * The share of the sky that a place sees, made a little smaller with depth.
     *
     * @param theta angle (rad)
     * @param r radius (m)
     * @param z drawn height (mm)
     * @return 0 … 1
     */
    double open(double theta, double r, double z) {
        if (rows == 0 || depth <= 0) {
            return 1;
        }
        double sum = 0;
        for (int d = 0; d < DIRECTIONS; d++) {
            double cos = Math.cos(2 * Math.PI * (d + 0.5) / DIRECTIONS);
            double sin = Math.sin(2 * Math.PI * (d + 0.5) / DIRECTIONS);
            double steepest = 0;
            for (double share : DISTANCES) {
                double s = share * depth;
                double rise = height(theta + 1e-3 * s * sin / r, r + 1e-3 * s * cos) - z;
                // Below this the face is flat but for the waviness of cells.
                if (rise > 0.02 * depth) {
                    steepest = Math.max(steepest, rise / s);
                }
            }
            sum += 1 / (1 + steepest * steepest);
        }
        return sum / DIRECTIONS * (1 - 0.12 * Math.min(1, Math.max(0, -z / depth)));
    }
}
