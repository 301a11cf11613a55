package org.whither.film;

/**
 * The field of a flow solver: pressure and velocity at the nodes of the grid and at levels across the film. Values are
 * ni × nj × nk, row-major, and are kept without a copy, since they may fill most of the memory.
 */
public final class FullField implements FieldData {
    private final double[] sigma;
    private final Values pressure;
    private final Values velocityR;
    private final Values velocityTheta;
    private final Values velocityZ;
    private final Values density;
    private final Values temperature;
    private final boolean constantAcross;

    /**
     * A full field.
     *
     * @param sigma levels across the film, from 0 to 1, strictly increasing, length nk; copied
     * @param pressure absolute pressure, ni × nj × nk, or ni × nj where constant across the film (Pa); kept
     * @param velocityR radial velocity, ni × nj × nk (m/s); kept
     * @param velocityTheta circumferential velocity in the film's velocity frame (m/s); kept
     * @param velocityZ velocity along the shaft (m/s); kept
     * @param density density, ni × nj × nk (kg/m³), or null: the gas law then gives it; kept
     * @param temperature temperature, ni × nj × nk (K), or null: the film temperature; kept
     */
    public FullField(
            double[] sigma,
            Values pressure,
            Values velocityR,
            Values velocityTheta,
            Values velocityZ,
            Values density,
            Values temperature) {
        this.sigma = sigma.clone();
        this.pressure = pressure;
        this.velocityR = velocityR;
        this.velocityTheta = velocityTheta;
        this.velocityZ = velocityZ;
        this.density = density;
        this.temperature = temperature;
        this.constantAcross = pressure.size() != velocityR.size();
    }

    /** The same from arrays, which are kept. */
    public FullField(
            double[] sigma,
            double[] pressure,
            double[] velocityR,
            double[] velocityTheta,
            double[] velocityZ,
            double[] density,
            double[] temperature) {
        this(
                sigma,
                Values.of(pressure),
                Values.of(velocityR),
                Values.of(velocityTheta),
                Values.of(velocityZ),
                density == null ? null : Values.of(density),
                temperature == null ? null : Values.of(temperature));
    }

    /** Number of levels across the film. */
    public int nk() {
        return sigma.length;
    }

    /** Level k as a fraction of the film thickness. */
    public double sigma(int k) {
        return sigma[k];
    }

    /** Whether the pressure is given once a column rather than at each level. */
    public boolean pressureConstantAcrossFilm() {
        return constantAcross;
    }

    /** Absolute pressure at a node index and level (Pa). */
    public double pressure(int node, int k) {
        return pressure.at(constantAcross ? node : node * sigma.length + k);
    }

    /** Radial velocity at a node index and level (m/s). */
    public double velocityR(int node, int k) {
        return velocityR.at(node * sigma.length + k);
    }

    /** Circumferential velocity in the film's velocity frame at a node index and level (m/s). */
    public double velocityTheta(int node, int k) {
        return velocityTheta.at(node * sigma.length + k);
    }

    /** Velocity along the shaft at a node index and level (m/s). */
    public double velocityZ(int node, int k) {
        return velocityZ.at(node * sigma.length + k);
    }

    /** Whether the solver gave a temperature. */
    public boolean hasTemperature() {
        return temperature != null;
    }

    /** Whether the solver gave a density. */
    public boolean hasDensity() {
        return density != null;
    }

    /** Temperature at a node index and level (K); only where {@link #hasTemperature}. */
    public double temperature(int node, int k) {
        return temperature.at(node * sigma.length + k);
    }

    /**
     * Density at a node index and level: the solver's, or from the gas law.
     *
     * @param node node index
     * @param k level
     * @param gas the gas
     * @param filmTemperature temperature where the solver gave none (K)
     * @return density (kg/m³)
     */
    public double density(int node, int k, Gas gas, double filmTemperature) {
        if (density != null) {
            return density.at(node * sigma.length + k);
        }
        double t = temperature == null ? filmTemperature : temperature.at(node * sigma.length + k);
        return gas.density(pressure(node, k), t);
    }
}
