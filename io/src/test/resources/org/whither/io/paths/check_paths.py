"""Reads paths.csv with Python's csv and paths.h5 with h5py, and compares them and paths.json with one another."""
import csv
import json
import sys

import h5py
import numpy as np

folder, both = sys.argv[1], sys.argv[2] == "both"
with open(folder + "/paths.csv", newline="", encoding="utf-8") as file:
    rows = list(csv.reader(file))
assert rows[0] == "tracer,time_s,theta_rad,radius_m,z_m,sigma,speed_m_s,pressure_pa".split(",")
table = np.array([[float(cell) for cell in row] for row in rows[1:]])
said = json.load(open(folder + "/paths.json", encoding="utf-8"))
with h5py.File(folder + "/paths.h5", "r") as file:
    assert file.attrs["result"] == "paths" and file.attrs["frame"] == said["frame"]
    units = {"time": "s", "theta": "rad", "radius": "m", "z": "m", "sigma": "1", "speed": "m/s", "pressure": "Pa"}
    assert set(file["points"]) == set(units)
    for column, (name, unit) in enumerate(units.items()):
        assert file["points"][name].attrs["units"] == unit, name
        assert np.array_equal(file["points"][name][:], table[:, column + 1]), name
    offset = file["tracers/point_offset"][:]
    count = len(said["tracers"])
    assert offset.dtype == np.int64 and len(offset) == count + 1 and offset[0] == 0 and offset[-1] == len(table)
    assert np.array_equal(np.repeat(np.arange(count), np.diff(offset)), table[:, 0])
    words = dict(reversed(part.split(" ")) for part in file["tracers/fate"].attrs["meaning"].split(", "))
    for n, tracer in enumerate(said["tracers"]):
        assert tracer["tracer"] == n and tracer["points"] == offset[n + 1] - offset[n]
        times = file["points/time"][offset[n]:offset[n + 1]]
        assert np.all(np.diff(times) >= 0) and (both or times[0] == 0)
        assert abs(times[-1] - times[0] - tracer["residence_time"]) <= 1e-12
        assert file["tracers/residence_time"][n] == tracer["residence_time"]
        assert file["tracers/revolutions"][n] == tracer["revolutions"]
        assert file["tracers/fate"][n] == int(words[tracer["fate"]])
        assert not both or file["tracers/from"][n] == int(words[tracer["from"]])
        for key in "theta", "radius", "sigma":
            assert file["tracers/release_" + key][n] == tracer["release"][key]
print(count, "tracers agree")
