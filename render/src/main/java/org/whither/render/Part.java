package org.whither.render;

/** How much of the ring a picture shows. */
public enum Part {
    /** The whole ring, and where there is room one sector enlarged. */
    BOTH,
    /** The whole ring. */
    RING,
    /** One sector, or a few of them where the sectors are narrow. */
    SECTOR
}
