package org.whither.samples;

/**
 * How many cells a sample's grid has. They are dealt out so that the edges of grooves, pockets and feed lie on grid lines.
 *
 * @param cellsTheta cells along θ, over one sector
 * @param cellsRadial cells along r
 */
public record GridSize(int cellsTheta, int cellsRadial) {
    /** Fewest cells either way. */
    public static final int LEAST = 8;

    /** Most cells either way. */
    public static final int MOST = 2048;

    /**
     * A grid size.
     *
     * @throws IllegalArgumentException where a number is below {@link #LEAST} or above {@link #MOST}
     */
    public GridSize {
        if (cellsTheta < LEAST || cellsRadial < LEAST || cellsTheta > MOST || cellsRadial > MOST) {
            throw new IllegalArgumentException("a grid of " + cellsTheta + " × " + cellsRadial
                    + " cells was asked for; expected from " + LEAST + " to " + MOST + " cells along θ and along r");
        }
    }
}
