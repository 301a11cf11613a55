package org.whither.film;

/** Where on the grid a quantity is given. */
public enum Location {
    /** At the nodes, ni × nj values. */
    NODE,
    /** At the cell centres, (ni − 1) × (nj − 1) values; a step is a jump between neighbouring cells. */
    CELL
}
