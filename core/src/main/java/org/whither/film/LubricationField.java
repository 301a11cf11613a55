package org.whither.film;

import java.util.Optional;

/**
 * The field of a lubrication (Reynolds-equation) solver: a pressure that is constant across the film, from which the
 * velocities follow, and perhaps the mass flows through the faces of the cells.
 */
public final class LubricationField implements FieldData {
    private final Location pressureAt;
    private final double[] pressure;
    private final MassFlows massFlows;

    /**
     * A lubrication field.
     *
     * @param pressureAt where the pressure is given
     * @param pressure absolute pressure, one value a node or cell, row-major (Pa); copied
     * @param massFlows mass flows through the cell faces, or null where the solver gave none
     */
    public LubricationField(Location pressureAt, double[] pressure, MassFlows massFlows) {
        this.pressureAt = pressureAt;
        this.pressure = pressure.clone();
        this.massFlows = massFlows;
    }

    /** Where the pressure is given. */
    public Location pressureAt() {
        return pressureAt;
    }

    /** Absolute pressure at a node or cell index (Pa). */
    public double pressure(int index) {
        return pressure[index];
    }

    /** Number of pressure values. */
    public int size() {
        return pressure.length;
    }

    /** The solver's own mass flows, measured in the film's velocity frame, where it gave them. */
    public Optional<MassFlows> massFlows() {
        return Optional.ofNullable(massFlows);
    }
}
