package org.whither.io.units;

/** Turns numbers of one unit into SI. */
@FunctionalInterface
public interface ToSi {
    /**
     * The same amount in SI.
     *
     * @param value number in the unit that was read
     * @return number in the SI unit of the quantity
     */
    double convert(double value);

    /**
     * The same amounts in SI, in place.
     *
     * @param values numbers in the unit that was read; overwritten
     */
    default void convertAll(double[] values) {
        for (int n = 0; n < values.length; n++) {
            values[n] = convert(values[n]);
        }
    }
}
