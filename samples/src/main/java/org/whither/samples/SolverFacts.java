package org.whither.samples;

/**
 * How well a film was solved, and its figures as a whole. Flows are of the whole ring.
 *
 * @param iterations Newton iterations, all speeds together
 * @param speedSteps steps in which the speed was raised; 0 at standstill
 * @param residual largest imbalance of a cell as a share of the gas that passes through the film
 * @param massClosure (all inflow − all outflow)/all inflow
 * @param supplyIn supply gas entering through the feed (kg/s)
 * @param supplyOut film gas leaving through the feed (kg/s)
 * @param innerIn gas entering at the inner diameter (kg/s)
 * @param innerOut gas leaving at the inner diameter (kg/s)
 * @param outerIn gas entering at the outer diameter (kg/s)
 * @param outerOut gas leaving at the outer diameter (kg/s)
 * @param openingForce absolute film pressure integrated over the face (N)
 * @param filmPower power the rotor spends on shearing the film (W)
 * @param peakPressure highest absolute pressure of a cell (Pa)
 * @param peakRadius radius of that cell's centre (m)
 * @param peakTheta angle of that cell's centre in the turning frame (rad)
 * @param reducedReynolds largest ρ |Ω| h²/µ of a cell
 * @param knudsen largest mean free path over film thickness, that at the two diameters included
 * @param upwindedShare share of the faces along which the pressure upstream had to be mixed into the rotation flow
 */
public record SolverFacts(
        int iterations,
        int speedSteps,
        double residual,
        double massClosure,
        double supplyIn,
        double supplyOut,
        double innerIn,
        double innerOut,
        double outerIn,
        double outerOut,
        double openingForce,
        double filmPower,
        double peakPressure,
        double peakRadius,
        double peakTheta,
        double reducedReynolds,
        double knudsen,
        double upwindedShare) {}
