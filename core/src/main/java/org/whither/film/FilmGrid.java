package org.whither.film;

/**
 * The grid of one sector in the plane of the seal faces: rings of nodes at given radii, and lines across them that may
 * follow spiral grooves. Between two nodes of a line, its angle is linear in the radius.
 */
public final class FilmGrid {
    private final int ni;
    private final int nj;
    private final int sectors;
    private final double[] radius;
    private final double[] theta;

    /**
     * A grid.
     *
     * @param radius radii of the rings, strictly increasing, length nj (m); copied
     * @param theta angle of each node in the frame in which the film is steady, ni × nj, row-major, increasing in i
     *     (rad); the last line is the first one turned by 2π/sectors; copied
     * @param sectors how many such sectors make the ring, at least 1
     * @throws IllegalArgumentException where the lengths do not fit each other
     */
    public FilmGrid(double[] radius, double[] theta, int sectors) {
        if (radius.length < 2 || theta.length % radius.length != 0 || theta.length < 2 * radius.length || sectors < 1) {
            throw new IllegalArgumentException("grid of " + radius.length + " radii, " + theta.length + " angles and "
                    + sectors + " sectors; expected at least 2 × 2 nodes, angles for each node, and a sector");
        }
        this.nj = radius.length;
        this.ni = theta.length / nj;
        this.sectors = sectors;
        this.radius = radius.clone();
        this.theta = theta.clone();
    }

    /** Number of nodes along θ. */
    public int ni() {
        return ni;
    }

    /** Number of nodes along r. */
    public int nj() {
        return nj;
    }

    /** Number of cells along θ, ni − 1. */
    public int cellsTheta() {
        return ni - 1;
    }

    /** Number of cells along r, nj − 1. */
    public int cellsRadial() {
        return nj - 1;
    }

    /** How many sectors make the ring. */
    public int sectors() {
        return sectors;
    }

    /** Angle of one sector (rad). */
    public double pitch() {
        return 2 * Math.PI / sectors;
    }

    /** Radius of ring j (m). */
    public double radius(int j) {
        return radius[j];
    }

    /** Radius of the inner diameter (m). */
    public double innerRadius() {
        return radius[0];
    }

    /** Radius of the outer diameter (m). */
    public double outerRadius() {
        return radius[nj - 1];
    }

    /** Angle of node (i, j) in the frame in which the film is steady (rad). */
    public double theta(int i, int j) {
        return theta[i * nj + j];
    }

    /** Index of node (i, j) in a node array. */
    public int node(int i, int j) {
        return i * nj + j;
    }

    /** Index of cell (i, j) in a cell array. */
    public int cell(int i, int j) {
        return i * (nj - 1) + j;
    }

    /** Number of nodes of the sector. */
    public int nodes() {
        return ni * nj;
    }

    /** Number of cells of the sector. */
    public int cells() {
        return (ni - 1) * (nj - 1);
    }

    /**
     * Angle of grid line i at a radius within row j of cells.
     *
     * @param i line
     * @param j row of cells
     * @param r radius (m)
     * @return angle (rad)
     */
    public double lineTheta(int i, int j, double r) {
        double b = (r - radius[j]) / (radius[j + 1] - radius[j]);
        int n = i * nj + j;
        return theta[n] + b * (theta[n + 1] - theta[n]);
    }

    /** Slope dθ/dr of grid line i within row j of cells (rad/m). */
    public double lineSlope(int i, int j) {
        int n = i * nj + j;
        return (theta[n + 1] - theta[n]) / (radius[j + 1] - radius[j]);
    }

    /**
     * The row of cells that holds a radius.
     *
     * @param r radius (m)
     * @return row 0 … nj − 2; a radius outside the face is given the nearest row
     */
    public int row(double r) {
        int at = java.util.Arrays.binarySearch(radius, r);
        int j = at >= 0 ? at : -at - 2;
        return Math.max(0, Math.min(nj - 2, j));
    }

    /**
     * The column of cells that holds an angle at a radius within row j.
     *
     * @param theta angle within the sector at that radius (rad); see {@link #intoSector}
     * @param j row of cells
     * @param r radius (m)
     * @return column 0 … ni − 2; an angle outside the sector is given the nearest column
     */
    public int column(double theta, int j, double r) {
        int low = 0;
        int high = ni - 1;
        while (high - low > 1) {
            int middle = (low + high) >>> 1;
            if (lineTheta(middle, j, r) <= theta) {
                low = middle;
            } else {
                high = middle;
            }
        }
        return low;
    }

    /**
     * Whole sectors to take off an angle so that it falls within the sector.
     *
     * @param theta any angle (rad)
     * @param j row of cells
     * @param r radius (m)
     * @return number of sectors n, so that theta − n · pitch lies between the first and the last grid line
     */
    public long intoSector(double theta, int j, double r) {
        return (long) Math.floor((theta - lineTheta(0, j, r)) / pitch());
    }

    /** Area of cell (i, j) on the face (m²), exact for lines whose angle is linear in the radius. */
    public double cellArea(int i, int j) {
        double r0 = radius[j];
        double r1 = radius[j + 1];
        double d0 = theta(i + 1, j) - theta(i, j);
        double d1 = theta(i + 1, j + 1) - theta(i, j + 1);
        // ∫ r Δθ(r) dr with Δθ linear in r
        return (r1 - r0) * (d0 * (2 * r0 + r1) + d1 * (r0 + 2 * r1)) / 6;
    }
}
