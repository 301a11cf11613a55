package org.whither.io.units;

import javax.measure.Unit;
import tech.units.indriya.AbstractUnit;
import tech.units.indriya.unit.Units;

/** The physical quantities that files carry, each with the SI unit that the program computes in. */
public enum Quantity {
    /** Radii, heights (m). */
    LENGTH("length", "m", Units.METRE),
    /** Absolute pressure (Pa). */
    PRESSURE("pressure", "Pa", Units.PASCAL),
    /** Plane angle (rad). */
    ANGLE("angle", "rad", Units.RADIAN),
    /** Rotation rate (rad/s). */
    ROTATION_RATE("rotation rate", "rad/s", Units.RADIAN.divide(Units.SECOND)),
    /** Velocity (m/s). */
    VELOCITY("velocity", "m/s", Units.METRE_PER_SECOND),
    /** Temperature (K). */
    TEMPERATURE("temperature", "K", Units.KELVIN),
    /** Mass flow (kg/s). */
    MASS_FLOW("mass flow", "kg/s", Units.KILOGRAM.divide(Units.SECOND)),
    /** Density (kg/m³). */
    DENSITY("density", "kg/m^3", Units.KILOGRAM.divide(Units.METRE.pow(3))),
    /** Mass flux (kg/(m² s)). */
    MASS_FLUX(
            "mass flux", "kg/(m^2*s)", Units.KILOGRAM.divide(Units.METRE.pow(2).multiply(Units.SECOND))),
    /** A pure number. */
    NUMBER("pure number", "1", AbstractUnit.ONE);

    private final String words;
    private final String spelling;
    private final Unit<?> unit;

    Quantity(String words, String spelling, Unit<?> unit) {
        this.words = words;
        this.spelling = spelling;
        this.unit = unit;
    }

    /** What it is called in a sentence. */
    public String words() {
        return words;
    }

    /** The SI unit as it is written into files, readable back by {@link UnitReader}. */
    public String siSpelling() {
        return spelling;
    }

    Unit<?> unit() {
        return unit;
    }
}
