package org.whither.film;

import java.util.OptionalDouble;

/**
 * The operating point of the seal.
 *
 * @param rotationRate rotation rate of the rotor, positive towards +θ (rad/s)
 * @param pressureInner absolute pressure at the inner diameter (Pa)
 * @param pressureOuter absolute pressure at the outer diameter (Pa)
 * @param pressureSupply absolute pressure of the supply gas before its restriction (Pa), where known
 * @param temperature film temperature (K)
 * @param innerSide what lies at the inner diameter, such as "atmosphere"
 * @param outerSide what lies at the outer diameter, such as "process"
 */
public record Conditions(
        double rotationRate,
        double pressureInner,
        double pressureOuter,
        OptionalDouble pressureSupply,
        double temperature,
        String innerSide,
        String outerSide) {}
