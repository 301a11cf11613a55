package org.whither.film;

/**
 * Pressure and density within a film, and what a turning face drags along through the constant-i faces of the grid. The
 * place within a cell is a along θ and b along r, both 0 … 1. The squares of pressure and density are interpolated
 * rather than they themselves: p² is what the isothermal film obeys, and it is linear in ln r in a plain one.
 */
interface GasState {
    /** Absolute pressure at a place of a piece (Pa). */
    double pressure(int i, int j, int k, double a, double b, double sigma);

    /** Density at a place of a piece (kg/m³). */
    double density(int i, int j, int k, double a, double b, double sigma);

    /** Pressure over density where one ratio holds in the whole film (Pa m³/kg); else not a number. */
    double pressureOverDensity();

    /** What a turn of the observer by 1 rad/s adds to the flow through a constant-i face of row j: ∫ρh r dr (kg). */
    double rotationMoment(int i, int j);

    /** How far that leans along row j of a constant-i face: half its change over its mean. */
    double leanRadial(int i, int j);

    /** How far it bends along row j of a constant-i face: the mean of its ends over its mean, less 1. */
    double bendRadial(int i, int j);
}
