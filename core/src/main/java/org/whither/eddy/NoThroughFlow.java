package org.whither.eddy;

/** A film through which no gas goes, so that nothing tells what a long stay is. */
public final class NoThroughFlow extends IllegalArgumentException {
    private static final long serialVersionUID = 1L;

    NoThroughFlow(String found) {
        super(found);
    }
}
