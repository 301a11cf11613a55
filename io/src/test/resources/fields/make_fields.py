"""Writes the small field files of the reader's tests with h5py, in many ways of storing the same numbers.

    /usr/bin/python3 make_fields.py FOLDER

The numbers are invented; the formulas below are repeated in FieldFixture.java. Needs Debian's python3-h5py.
"""

import sys
from pathlib import Path

import h5py
import numpy as np

NI, NJ, NK, SECTORS = 7, 5, 4, 12
PITCH = 2 * np.pi / SECTORS

i = np.arange(NI).reshape(NI, 1)
j = np.arange(NJ).reshape(1, NJ)
turn = i % (NI - 1)  # the last node line is the first one of the next sector
radius = 0.05 + 0.0025 * np.arange(NJ)
theta = PITCH * i / (NI - 1) + 0.05 * j
lines = PITCH * np.arange(NI) / (NI - 1)
rotor = -5e-6 * ((turn >= 2) & (turn <= 3) & (j >= 2))
stator = 4e-6 + 0.25e-6 * j + 0 * i
pressure = 100000.0 + 50000 * j + 1000 * turn

i3, j3, k3 = np.meshgrid(turn.ravel(), j.ravel(), np.arange(NK), indexing="ij")
sigma = np.array([0, 0.25, 0.75, 1])
pressure3 = 100000.0 + 50000 * j3 + 1000 * i3 + 10 * k3
velocity_r = i3 - 2.0 * j3 + 0.5 * k3
velocity_theta = 10.0 * j3 - 0.25 * k3 + i3
velocity_z = 0.0078125 * k3 * (i3 - j3)
density = 1 + 0.25 * j3 + 0.125 * k3
temperature = 300.0 + j3 + 0.5 * k3

ic = np.arange(NI - 1).reshape(NI - 1, 1)
jc = np.arange(NJ - 1).reshape(1, NJ - 1)
rotor_cell = -5e-6 * ((ic >= 2) & (ic <= 3) & (jc >= 2))
stator_cell = 4e-6 + 0.25e-6 * jc + 0 * ic
pressure_cell = 100000.0 + 50000 * jc + 1000 * ic
mask = (0 * ic + (jc == 1)).astype("i1")
mass_flux = 0.5 * mask * (1 + ic)
flow_theta = 1e-6 * (turn + 10.0 * jc)
flow_r = 1e-6 * (ic - 10.0 * j)


def put(group, name, data, units, dtype="<f8", **storage):
    dataset = group.create_dataset(name, data=np.asarray(data).astype(dtype), **storage)
    if units is not None:
        dataset.attrs["units"] = units
    return dataset


def head(file, text=str, one=lambda x: x):
    """Root, conditions and gas; `text` and `one` say how strings and numbers are stored."""
    file.attrs["layout"] = text("film-field")
    file.attrs["layout_version"] = one(1)
    file.attrs["title"] = text("An invented film")
    file.attrs["origin"] = text("make_fields.py")
    file.attrs["created"] = text("2026-01-02T03:04:05Z")
    conditions = file.create_group("conditions")
    conditions.attrs["rotation_rate"] = one(-1000.5)
    conditions.attrs["pressure_inner"] = one(100000.0)
    conditions.attrs["pressure_outer"] = one(300000.0)
    conditions.attrs["pressure_supply"] = one(400000.0)
    conditions.attrs["temperature"] = one(300.0)
    conditions.attrs["inner_side"] = text("process")
    conditions.attrs["outer_side"] = text("atmosphere")
    gas = file.create_group("gas")
    gas.attrs["name"] = text("nitrogen")
    gas.attrs["molar_mass"] = one(0.0280134)
    gas.attrs["viscosity"] = one(1.78e-5)
    gas.attrs["compressibility_factor"] = one(0.99)
    grid = file.create_group("grid")
    grid.attrs["sectors"] = one(SECTORS)
    field = file.create_group("field")
    field.attrs["velocity_frame"] = text("stationary")
    field.attrs["steady_in"] = text("rotating")
    return grid, field


def feed_mask(file, dtype="i1", flux=True):
    supply = file.create_group("supply")
    supply.attrs["face"] = "stator"
    put(supply, "mask", mask, None, dtype)
    if flux:
        put(supply, "mass_flux", mass_flux, "kg/(m^2*s)")


def feed_annulus(file, text=str, one=lambda x: x):
    supply = file.create_group("supply")
    supply.attrs["face"] = text("rotor")
    supply.attrs["radius_from"] = one(0.0525)
    supply.attrs["radius_to"] = one(0.055)


def full(file, grid, field, f="<f8", store=None):
    store = store or (lambda data: {})
    put(grid, "radius", radius, "m", f)
    put(grid, "theta", theta, "rad", f)
    put(grid, "rotor_z", rotor, "m", f)
    put(grid, "stator_z", stator, "m", f)
    put(grid, "sigma", sigma, "1", f)
    put(field, "pressure", pressure3, "Pa", f, **store(pressure3))
    put(field, "velocity_r", velocity_r, "m/s", f, **store(velocity_r))
    put(field, "velocity_theta", velocity_theta, "m/s", f, **store(velocity_theta))
    put(field, "velocity_z", velocity_z, "m/s", f, **store(velocity_z))
    put(field, "density", density, "kg/m^3", f, **store(density))
    put(field, "temperature", temperature, "K", f, **store(temperature))


def full_plain(path):
    with h5py.File(path, "w", libver="earliest") as file:
        full(file, *head(file))
        feed_mask(file)


def full_units(path):
    """32-bit, chunked with deflate and shuffle, chunks that overhang, engineers' units."""
    with h5py.File(path, "w") as file:
        grid, field = head(file)
        chunked = dict(chunks=(3, 2, 3), compression="gzip", shuffle=True)
        put(grid, "radius", radius * 1e3, "mm", "<f4")
        put(grid, "theta", np.degrees(theta), "deg", "<f8", chunks=(2, 2), compression=9)
        put(grid, "rotor_z", rotor * 1e6, "um", "<f4", chunks=(7, 5), shuffle=True)
        put(grid, "stator_z", stator * 1e6, "µm", "<f4")
        put(grid, "sigma", sigma, "", "<f4")
        put(field, "pressure", pressure3 / 1e5, "bar", "<f4", **chunked)
        put(field, "velocity_r", velocity_r * 1e3, "mm/s", "<f4", **chunked)
        put(field, "velocity_theta", velocity_theta, "m s-1", "<f4", fletcher32=True, **chunked)
        put(field, "velocity_z", velocity_z, "m/s", "<f4", **chunked)
        put(field, "density", density, "kg m-3", "<f4", **chunked)
        put(field, "temperature", temperature - 273.15, "degC", "<f4", **chunked)
        supply = file.create_group("supply")
        put(supply, "mask", mask, "1", "i1", chunks=(4, 3), compression="gzip")
        put(supply, "mass_flux", mass_flux * 3600, "kg/(m2.h)", "<f4")


def full_big_endian(path):
    with h5py.File(path, "w") as file:
        grid, field = head(file, one=lambda x: np.array(x, ">f8") if isinstance(x, float) else np.array(x, ">i2"))
        full(file, grid, field, ">f8")
        feed_mask(file, ">i4")
        del file["field/velocity_r"], file["field/velocity_theta"]
        put(field, "velocity_r", velocity_r, "m/s", ">f4", chunks=(4, 5, 4), compression="gzip", shuffle=True)
        put(field, "velocity_theta", velocity_theta, "m/s", ">f2")


def full_latest(path):
    """The newest file format, with each of its chunk indices, a compact dataset, and more links than fit a header."""
    with h5py.File(path, "w", libver="latest") as file:
        grid, field = head(file)
        put(grid, "radius", radius, "m")
        put(grid, "theta", theta, "rad")
        put(grid, "rotor_z", rotor, "m")
        put(grid, "sigma", sigma, "1")
        property_list = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
        property_list.set_layout(h5py.h5d.COMPACT)
        space = h5py.h5s.create_simple((NI, NJ))
        compact = h5py.Dataset(h5py.h5d.create(grid.id, b"stator_z", h5py.h5t.IEEE_F64BE, space, property_list))
        compact[...] = stator
        compact.attrs["units"] = "m"
        put(field, "pressure", pressure3, "Pa", chunks=(NI, NJ, NK), compression="gzip")  # single chunk
        put(field, "velocity_r", velocity_r, "m/s", chunks=(3, 2, 3), compression="gzip")  # fixed array
        put(field, "velocity_theta", velocity_theta, "m/s", chunks=(2, 3, 4), maxshape=(None, NJ, NK))  # extensible
        put(field, "velocity_z", velocity_z, "m/s", chunks=(2, 3, 4), maxshape=(None, None, NK), shuffle=True)  # B-tree
        put(field, "density", density, "kg.m-3", chunks=(2, 5, 4))  # fixed array, no filter
        early = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
        early.set_chunk((3, 5, 2))
        early.set_alloc_time(h5py.h5d.ALLOC_TIME_EARLY)
        space = h5py.h5s.create_simple((NI, NJ, NK))
        implicit = h5py.Dataset(h5py.h5d.create(field.id, b"temperature", h5py.h5t.IEEE_F64LE, space, early))
        implicit[...] = temperature
        implicit.attrs["units"] = "K"
        for n in range(12):
            field.create_dataset("other_%d" % n, data=np.arange(n))
            field.attrs["other_%d" % n] = n
        feed_mask(file)


def full_user_block(path):
    """Bytes of another program before the HDF5 part, arrays of compound and text beside ours, links inside the file."""
    with h5py.File(path, "w", userblock_size=1024) as file:
        grid, field = head(file)
        full(file, grid, field)
        feed_mask(file)
        file.create_group("other")
        file["other/table"] = np.zeros(3, [("a", "f8"), ("b", "S5")])
        file["other/lines"] = ["one", "two"]
        file.move("grid/radius", "other/rings")
        grid["radius"] = h5py.SoftLink("/other/rings")
        file.move("grid/sigma", "grid/levels")
        grid["sigma"] = h5py.SoftLink("levels")
        file.move("field", "other/field")
        file["field"] = h5py.SoftLink("other/field")
        field["density_again"] = field["density"]


def film_nodes(path):
    """Pressure and faces at the nodes, whole numbers of pascals, fixed-length texts, one-element arrays."""
    fixed = lambda text: np.bytes_(text)
    with h5py.File(path, "w", libver="earliest") as file:
        grid, field = head(file, text=fixed, one=lambda x: [x])
        put(grid, "radius", radius, fixed("m"))
        put(grid, "theta", lines, [fixed("rad")])
        put(grid, "rotor_z", rotor, fixed("m"))
        put(grid, "stator_z", stator, fixed("m"))
        put(field, "pressure", pressure, fixed("Pa"), "<u4")
        feed_annulus(file, text=fixed, one=lambda x: np.array([[x]]))


def film_cells(path):
    """Pressure and faces at the cell centres, with the mass flows of the faces, and a mask of truth values."""
    with h5py.File(path, "w", libver="latest") as file:
        grid, field = head(file)
        put(grid, "radius", radius, "m")
        put(grid, "theta", theta, "rad")
        put(grid, "rotor_z", rotor_cell, "m")
        put(grid, "stator_z", stator_cell, "m")
        put(field, "pressure", pressure_cell / 1e3, "kPa")
        put(field, "mass_flow_theta", flow_theta * 3.6e6, "g/h")
        put(field, "mass_flow_r", flow_r * 1e3, "g/s", chunks=(6, 5), compression="gzip")
        feed_mask(file, bool, flux=False)


def film_mixed(path):
    """Pressure at the cell centres, faces at the nodes; defaults left out; no feed."""
    with h5py.File(path, "w") as file:
        grid, field = head(file)
        for name in ("title", "origin", "created"):
            del file.attrs[name]
        for name in ("pressure_supply", "inner_side", "outer_side"):
            del file["conditions"].attrs[name]
        del file["gas"].attrs["compressibility_factor"]
        del field.attrs["steady_in"]
        put(grid, "radius", radius, "m")
        put(grid, "theta", lines, "rad")
        put(grid, "rotor_z", rotor, "m")
        put(grid, "stator_z", stator, "m")
        put(field, "pressure", pressure_cell, "Pa", "<i8")


# Files that a reader refuses, and that only the HDF5 library can make. All start from film_mixed.


def spoil(path, change):
    film_mixed(path)
    with h5py.File(path, "a") as file:
        change(file)


def bad_external_raw(file):
    del file["field/pressure"]
    elsewhere = [("elsewhere.raw", 0, h5py.h5f.UNLIMITED)]
    pressure = file["field"].create_dataset("pressure", (NI - 1, NJ - 1), "f8", external=elsewhere)
    pressure.attrs["units"] = "Pa"


def bad_virtual(file):
    del file["grid/stator_z"]
    layout = h5py.VirtualLayout(shape=(NI, NJ), dtype="f8")
    layout[:] = h5py.VirtualSource("elsewhere.h5", "stator_z", shape=(NI, NJ))
    file["grid"].create_virtual_dataset("stator_z", layout).attrs["units"] = "m"


def bad_external_link(file):
    del file["grid/radius"]
    file["grid/radius"] = h5py.ExternalLink("full-plain.h5", "/grid/radius")


def bad_link_round(file):
    del file["grid/radius"]
    file["grid/radius"] = h5py.SoftLink("/grid/rings")
    file["grid/rings"] = h5py.SoftLink("radius")


def bad_link_lost(file):
    del file["grid/radius"]
    file["grid/radius"] = h5py.SoftLink("/grid/rings")


def bad_link_through(file):
    del file["grid/radius"]
    file["other"] = h5py.ExternalLink("full-plain.h5", "/grid")
    file["grid/radius"] = h5py.SoftLink("/other/radius")


def bad_never_filled(file):
    del file["field/pressure"]
    file["field"].create_dataset("pressure", (NI - 1, NJ - 1), "f8").attrs["units"] = "Pa"


def bad_half_filled(file):
    del file["field/pressure"]
    pressure = file["field"].create_dataset("pressure", (NI - 1, NJ - 1), "f8", chunks=(2, 2))
    pressure.attrs["units"] = "Pa"
    pressure[:4, :] = pressure_cell[:4, :]


def bad_other_filter(file):
    del file["field/pressure"]
    put(file["field"], "pressure", pressure_cell, "Pa", chunks=(6, 4), scaleoffset=3)


def bad_compound(file):
    del file["field/pressure"]
    put(file["field"], "pressure", np.zeros((NI - 1, NJ - 1)), "Pa", [("a", "f4"), ("b", "f4")])


def bad_long_double(file):
    del file["field/pressure"]
    put(file["field"], "pressure", pressure_cell, "Pa", np.longdouble)


def bad_infinite(file):
    file["grid/stator_z"][3, 2] = np.inf


def make_all(folder):
    for make in (full_plain, full_units, full_big_endian, full_latest, full_user_block):
        make(folder / (make.__name__.replace("_", "-") + ".h5"))
    for make in (film_nodes, film_cells, film_mixed):
        make(folder / (make.__name__.replace("_", "-") + ".h5"))
    for name, change in globals().items():
        if name.startswith("bad_"):
            spoil(folder / (name.replace("_", "-") + ".h5"), change)


if __name__ == "__main__":
    make_all(Path(sys.argv[1]))
