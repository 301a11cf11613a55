package org.whither.eddy;

/** Which way the gas of a zone turns, in the frame in which the film is steady. */
public enum Sense {
    /** Round an axis along the shaft, the same way as the rotor. */
    WITH_ROTATION("with rotation"),
    /** Round an axis along the shaft, against the rotor. */
    AGAINST_ROTATION("against rotation"),
    /** In the plane of radius and film thickness. */
    MERIDIONAL("meridional"),
    /** In the plane of circumference and film thickness. */
    CIRCUMFERENTIAL("circumferential"),
    /** No turn was seen. */
    NONE("none");

    private final String words;

    Sense(String words) {
        this.words = words;
    }

    /** As told in results. */
    public String words() {
        return words;
    }
}
