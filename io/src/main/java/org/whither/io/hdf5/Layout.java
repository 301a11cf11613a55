package org.whither.io.hdf5;

/** The names of the film-field layout, version 1, as {@code io/LAYOUT.md} publishes them. */
final class Layout {
    static final String NAME = "film-field";
    static final int VERSION = 1;

    static final String LAYOUT = "layout";
    static final String LAYOUT_VERSION = "layout_version";
    static final String TITLE = "title";
    static final String ORIGIN = "origin";
    static final String CREATED = "created";

    static final String CONDITIONS = "conditions";
    static final String ROTATION_RATE = "rotation_rate";
    static final String PRESSURE_INNER = "pressure_inner";
    static final String PRESSURE_OUTER = "pressure_outer";
    static final String PRESSURE_SUPPLY = "pressure_supply";
    static final String TEMPERATURE = "temperature";
    static final String INNER_SIDE = "inner_side";
    static final String OUTER_SIDE = "outer_side";
    static final String DEFAULT_INNER_SIDE = "atmosphere";
    static final String DEFAULT_OUTER_SIDE = "process";

    static final String GAS = "gas";
    static final String GAS_NAME = "name";
    static final String MOLAR_MASS = "molar_mass";
    static final String VISCOSITY = "viscosity";
    static final String COMPRESSIBILITY_FACTOR = "compressibility_factor";

    static final String GRID = "grid";
    static final String SECTORS = "sectors";
    static final String RADIUS = "radius";
    static final String THETA = "theta";
    static final String ROTOR_Z = "rotor_z";
    static final String STATOR_Z = "stator_z";
    static final String SIGMA = "sigma";

    static final String FIELD = "field";
    static final String VELOCITY_FRAME = "velocity_frame";
    static final String STEADY_IN = "steady_in";
    static final String PRESSURE = "pressure";
    static final String VELOCITY_R = "velocity_r";
    static final String VELOCITY_THETA = "velocity_theta";
    static final String VELOCITY_Z = "velocity_z";
    static final String DENSITY = "density";
    static final String MASS_FLOW_THETA = "mass_flow_theta";
    static final String MASS_FLOW_R = "mass_flow_r";

    static final String SUPPLY = "supply";
    static final String FACE = "face";
    static final String RADIUS_FROM = "radius_from";
    static final String RADIUS_TO = "radius_to";
    static final String MASK = "mask";
    static final String MASS_FLUX = "mass_flux";

    static final String UNITS = "units";

    private Layout() {}
}
