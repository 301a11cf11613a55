package org.whither.film;

/** Where the two seal faces lie along the shaft; their distance is the film thickness. */
public final class RingFaces {
    private final Location at;
    private final double[] rotorZ;
    private final double[] statorZ;

    /**
     * The faces.
     *
     * @param at where on the grid they are given
     * @param rotorZ rotor face, one value a node or cell, row-major (m); copied
     * @param statorZ stator face, above the rotor face everywhere (m); copied
     * @throws IllegalArgumentException where the lengths differ or the film thickness is not positive
     */
    public RingFaces(Location at, double[] rotorZ, double[] statorZ) {
        if (rotorZ.length != statorZ.length) {
            throw new IllegalArgumentException("rotor face of " + rotorZ.length + " values, stator face of "
                    + statorZ.length + "; expected the same number");
        }
        for (int n = 0; n < rotorZ.length; n++) {
            if (!(statorZ[n] > rotorZ[n])) {
                throw new IllegalArgumentException("film thickness " + (statorZ[n] - rotorZ[n]) + " m at index " + n
                        + "; expected more than 0 everywhere");
            }
        }
        this.at = at;
        this.rotorZ = rotorZ.clone();
        this.statorZ = statorZ.clone();
    }

    /** Where on the grid the faces are given. */
    public Location at() {
        return at;
    }

    /** Height of the rotor face at a node or cell index (m). */
    public double rotorZ(int index) {
        return rotorZ[index];
    }

    /** Height of the stator face at a node or cell index (m). */
    public double statorZ(int index) {
        return statorZ[index];
    }

    /** Film thickness at a node or cell index (m). */
    public double thickness(int index) {
        return statorZ[index] - rotorZ[index];
    }

    /** Film thickness of cell (i, j): its own, or the mean of its four nodes (m). */
    public double cellThickness(FilmGrid grid, int i, int j) {
        if (at == Location.CELL) {
            return thickness(grid.cell(i, j));
        }
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return 0.25 * (thickness(n) + thickness(n + 1) + thickness(m) + thickness(m + 1));
    }

    /** Rotor face of cell (i, j): its own height, or the mean of its four nodes (m). */
    public double cellRotorZ(FilmGrid grid, int i, int j) {
        if (at == Location.CELL) {
            return rotorZ[grid.cell(i, j)];
        }
        int n = grid.node(i, j);
        int m = grid.node(i + 1, j);
        return 0.25 * (rotorZ[n] + rotorZ[n + 1] + rotorZ[m] + rotorZ[m + 1]);
    }

    /** Number of values of each face. */
    public int size() {
        return rotorZ.length;
    }
}
