package org.whither.render;

/** From which side of the film a face is looked at, along the shaft. */
public enum ViewingSide {
    /** From the stator towards the rotor, against +z: +θ runs anticlockwise. */
    STATOR("seen from the stator towards the rotor"),
    /** From the rotor towards the stator, along +z: +θ runs clockwise. */
    ROTOR("seen from the rotor towards the stator");

    private final String words;

    ViewingSide(String words) {
        this.words = words;
    }

    /** How the picture says it. */
    String words() {
        return words;
    }
}
