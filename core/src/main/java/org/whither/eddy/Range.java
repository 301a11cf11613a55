package org.whither.eddy;

/**
 * From where to where something reaches.
 *
 * @param low lower end
 * @param high upper end
 */
public record Range(double low, double high) {
    /** Its length. */
    public double length() {
        return high - low;
    }

    /** Whether it holds a value. */
    public boolean holds(double value) {
        return value >= low && value <= high;
    }
}
