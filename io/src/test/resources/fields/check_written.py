"""Reads a file that the program wrote with h5py, compares it with the formulas of make_fields.py, and its storage with
the layout.

    /usr/bin/python3 check_written.py FILE full|nodes|cells
"""

import sys

import h5py
import numpy as np
import make_fields as made


def same(file, path, units, expected, dtype="f8"):
    dataset = file[path]
    assert dataset.dtype == np.dtype(dtype), (path, dataset.dtype)
    assert dataset.attrs["units"] == units, (path, dataset.attrs["units"])
    assert dataset.shape == np.shape(expected), (path, dataset.shape)
    np.testing.assert_allclose(dataset[...], expected, rtol=0, atol=4e-16 * np.abs(expected).max(), err_msg=path)


def attributes(node, **expected):
    found = {name: value for name, value in node.attrs.items()}
    assert found.keys() == expected.keys(), (node.name, found)
    for name, value in expected.items():
        assert found[name] == value, (node.name, name, found[name])
        assert np.ndim(found[name]) == 0, (node.name, name)
        assert isinstance(found[name], str) == isinstance(value, str), (node.name, name)


kind = sys.argv[2]
with h5py.File(sys.argv[1], "r") as file:
    attributes(
        file,
        layout="film-field",
        layout_version=1,
        title="An invented film",
        origin="make_fields.py",
        created="2026-01-02T03:04:05Z",
    )
    attributes(
        file["conditions"],
        rotation_rate=-1000.5,
        pressure_inner=100000.0,
        pressure_outer=300000.0,
        pressure_supply=400000.0,
        temperature=300.0,
        inner_side="process",
        outer_side="atmosphere",
    )
    attributes(file["gas"], name="nitrogen", molar_mass=0.0280134, viscosity=1.78e-5, compressibility_factor=0.99)
    attributes(file["grid"], sectors=made.SECTORS)
    attributes(file["field"], velocity_frame="stationary", steady_in="rotating")
    same(file, "grid/radius", "m", made.radius)
    same(file, "grid/theta", "rad", made.lines if kind == "nodes" else made.theta)
    same(file, "grid/rotor_z", "m", made.rotor_cell if kind == "cells" else made.rotor)
    same(file, "grid/stator_z", "m", made.stator_cell if kind == "cells" else made.stator)
    if kind == "full":
        same(file, "grid/sigma", "1", made.sigma)
        same(file, "field/pressure", "Pa", made.pressure3)
        same(file, "field/velocity_r", "m/s", made.velocity_r)
        same(file, "field/velocity_theta", "m/s", made.velocity_theta)
        same(file, "field/velocity_z", "m/s", made.velocity_z)
        same(file, "field/density", "kg/m^3", made.density)
        same(file, "field/temperature", "K", made.temperature)
        attributes(file["supply"], face="stator")
        same(file, "supply/mask", "1", made.mask, "i1")
        same(file, "supply/mass_flux", "kg/(m^2*s)", made.mass_flux)
    if kind == "nodes":
        same(file, "field/pressure", "Pa", made.pressure)
        attributes(file["supply"], face="rotor", radius_from=0.0525, radius_to=0.055)
    if kind == "cells":
        same(file, "field/pressure", "Pa", made.pressure_cell)
        same(file, "field/mass_flow_theta", "kg/s", made.flow_theta)
        same(file, "field/mass_flow_r", "kg/s", made.flow_r)
        attributes(file["supply"], face="stator")
        same(file, "supply/mask", "1", made.mask, "i1")
    names = []
    file.visit(names.append)
    print(len(names), "objects agree")
