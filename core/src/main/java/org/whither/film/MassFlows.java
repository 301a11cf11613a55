package org.whither.film;

/** Mass flows through the faces of the cells of one sector, over the whole film thickness (kg/s). */
public final class MassFlows {
    private final double[] theta;
    private final double[] radial;

    /**
     * Mass flows.
     *
     * @param theta through the constant-i faces towards +θ, ni × (nj − 1), row-major (kg/s); copied
     * @param radial through the constant-j faces outwards, (ni − 1) × nj, row-major (kg/s); copied
     */
    public MassFlows(double[] theta, double[] radial) {
        this.theta = theta.clone();
        this.radial = radial.clone();
    }

    /** Flow through the constant-i face (i, j), row-major ni × (nj − 1), towards +θ (kg/s). */
    public double theta(FilmGrid grid, int i, int j) {
        return theta[i * grid.cellsRadial() + j];
    }

    /** Flow through the constant-j face (i, j), row-major (ni − 1) × nj, outwards (kg/s). */
    public double radial(FilmGrid grid, int i, int j) {
        return radial[i * grid.nj() + j];
    }

    /** All flows towards +θ, ni × (nj − 1), row-major (kg/s); a copy. */
    public double[] thetaValues() {
        return theta.clone();
    }

    /** All flows outwards, (ni − 1) × nj, row-major (kg/s); a copy. */
    public double[] radialValues() {
        return radial.clone();
    }
}
