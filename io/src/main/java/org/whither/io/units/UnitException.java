package org.whither.io.units;

/** A unit is not understood, or is one of another quantity; the message says which, as part of a sentence. */
public final class UnitException extends Exception {
    private static final long serialVersionUID = 1L;

    UnitException(String message) {
        super(message);
    }
}
