package org.whither.film;

/** One of the two seal faces that bound the film. */
public enum Face {
    /** The face of the rotating ring, σ = 0. */
    ROTOR,
    /** The face of the stationary ring, σ = 1. */
    STATOR
}
