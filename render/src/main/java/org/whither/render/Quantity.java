package org.whither.render;

import org.whither.film.Frame;

/** What a plan shows in colour. */
public enum Quantity {
    /** Film pressure at mid film. */
    PRESSURE(ColourScale.PRESSURE, 1e-5),
    /** Film thickness. */
    THICKNESS(ColourScale.THICKNESS, 1e6),
    /** Speed of the gas at mid film, in the chosen frame. */
    SPEED(ColourScale.SPEED, 1),
    /** Time since the gas entered the film: the median of each column of gas. */
    AGE(ColourScale.AGE, 1e3),
    /** Where the gas at mid film goes. */
    DESTINATION(null, 1);

    private final ColourScale scale;
    private final double unit;

    Quantity(ColourScale scale, double unit) {
        this.scale = scale;
        this.unit = unit;
    }

    /** Its colour scale; null for destinations, which have colours of their own. */
    ColourScale scale() {
        return scale;
    }

    /** What to multiply an SI value by for the unit that the picture shows: bar, µm, m/s, ms. */
    public double unit() {
        return unit;
    }

    /** What the colour bar says. */
    String caption(Frame frame) {
        return switch (this) {
            case PRESSURE -> "film pressure, bar absolute";
            case THICKNESS -> "film thickness, µm";
            case SPEED -> "speed of the gas at mid film " + Words.frame(frame) + ", m/s";
            case AGE -> "age of the gas since it entered, median across the film, ms";
            case DESTINATION -> "where the gas at mid film goes";
        };
    }
}
