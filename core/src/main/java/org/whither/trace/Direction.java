package org.whither.trace;

/** Whether a tracer is followed to where the gas goes or to where it came from. */
public enum Direction {
    /** With time. */
    FORWARD(1),
    /** Against time. */
    BACKWARD(-1);

    private final int sign;

    Direction(int sign) {
        this.sign = sign;
    }

    /** 1 or −1. */
    public int sign() {
        return sign;
    }
}
