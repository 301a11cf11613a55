package org.whither.film;

/** The observer of an angle or a velocity. */
public enum Frame {
    /** Turns with the rotor: the rotor face stands still. */
    ROTATING,
    /** Stands with the stator: the stator face stands still. */
    STATIONARY;

    /**
     * Angular speed of this frame seen from the stator.
     *
     * @param rotationRate rotation rate of the rotor (rad/s)
     * @return angular speed (rad/s)
     */
    public double angularSpeed(double rotationRate) {
        return this == ROTATING ? rotationRate : 0;
    }
}
