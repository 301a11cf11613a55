package org.whither.trace;

/**
 * What a tracer met on its way.
 *
 * @param length length of its path in the stationary frame, whatever the frame of integration (m)
 * @param lowestPressure lowest absolute pressure met; not a number where it took no step (Pa)
 * @param highestPressure highest absolute pressure met; not a number where it took no step (Pa)
 */
public record PathMeasure(double length, double lowestPressure, double highestPressure) {}
