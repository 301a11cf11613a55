package org.whither.io.result;

/** What every result must be read with. */
public final class Cautions {
    /** The caution that goes with every result. */
    public static final String TEXT = "This describes the computed steady field it was given, not the machine: it is no"
            + " approval and no guarantee of leakage. Massless tracers leave out diffusion, particles, transients, tilt,"
            + " wear, contact and loss of supply; 'no gas was found to cross' holds within the interval given and for"
            + " convection alone. Do not set trips, alarms, hazardous zones or exposure limits by it. Local codes, the"
            + " makers of the seal and the machine, the plant's safety studies, measured leakage and licensed practice"
            + " come first. Leaking gas may be toxic or flammable, and nitrogen asphyxiates.";

    private Cautions() {}
}
