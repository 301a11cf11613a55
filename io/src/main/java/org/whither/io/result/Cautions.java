package org.whither.io.result;

import java.util.List;

/** What every result must be read with. */
public final class Cautions {
    /** The caution that goes with every result. */
    public static final String TEXT = "This describes the computed steady field it was given, not the machine: it is no"
            + " approval and no guarantee of leakage. Massless tracers leave out diffusion, particles, transients, tilt,"
            + " wear, contact and loss of supply; 'no gas was found to cross' holds within the interval given and for"
            + " convection alone. Do not set trips, alarms, hazardous zones or exposure limits by it. Local codes, the"
            + " makers of the seal and the machine, the plant's safety studies, measured leakage and licensed practice"
            + " come first. Leaking gas may be toxic or flammable, and nitrogen asphyxiates.";

    /** The same at length, a sentence or two each: what a result is not, what it leaves out, and what comes before it. */
    public static final List<String> SENTENCES = List.of(
            "This describes the computed steady field it was given, not the machine. It is no approval and no guarantee of"
                    + " leakage.",
            "\"No gas was found to cross\" holds within the interval given and for gas carried along by the flow alone. It"
                    + " leaves out diffusion, transients, tilt, waviness, wear, contact and leakage past secondary seals.",
            "Supply pressure above that of the process is the barrier. When supply is lost or the pressures reverse, every"
                    + " result here is void.",
            "Tracers have no mass: nothing here predicts particles, droplets, deposits or erosion.",
            "Never set trips, alarms, hazardous zones or exposure limits by this. Local codes and standards (such as API 692"
                    + " and API 682), the makers of the seal and the machine, the plant's safety studies (HAZOP, IEC 61511),"
                    + " relief and flare design, measured leakage and licensed practice come first.",
            "Leaking gas may be toxic or flammable, and nitrogen asphyxiates.");

    private Cautions() {}
}
