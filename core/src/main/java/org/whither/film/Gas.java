package org.whither.film;

/**
 * The gas of the film, at the film temperature.
 *
 * @param name what it is called
 * @param molarMass molar mass (kg/mol)
 * @param viscosity dynamic viscosity (Pa·s)
 * @param compressibilityFactor Z in p = Z ρ R T / M (dimensionless)
 */
public record Gas(String name, double molarMass, double viscosity, double compressibilityFactor) {
    /** Molar gas constant (J/(mol K)); exact since the SI of 2019, CODATA 2018. */
    public static final double MOLAR_GAS_CONSTANT = 8.31446261815324;

    /**
     * The constant of this gas alone, Z R / M.
     *
     * @return specific gas constant, compressibility included (J/(kg K))
     */
    public double specificGasConstant() {
        return compressibilityFactor * MOLAR_GAS_CONSTANT / molarMass;
    }

    /**
     * Density from the gas law.
     *
     * @param pressure absolute pressure (Pa)
     * @param temperature temperature (K)
     * @return density (kg/m³)
     */
    public double density(double pressure, double temperature) {
        return pressure / (specificGasConstant() * temperature);
    }
}
