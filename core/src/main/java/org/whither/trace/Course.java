package org.whither.trace;

/** Which way from its release a path is followed. */
public enum Course {
    /** To where the gas goes. */
    FORWARD,
    /** To where it came from. */
    BACKWARD,
    /** Both, as one path from where the gas came from to where it goes. */
    BOTH
}
