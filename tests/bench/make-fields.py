"""Fields for the bench, of a fixed seed: smooth patches with noise under half cloud, as float32 chlorophyll in NetCDF-4."""
import datetime
import os
import sys

import netCDF4
import numpy

folder = sys.argv[1]
random = numpy.random.default_rng(20261201)


def smooth(rows, columns, step):
    """Noise on a coarse mesh, drawn out linearly to all cells."""
    mesh = random.standard_normal((rows // step + 2, columns // step + 2))
    y = numpy.linspace(0, mesh.shape[0] - 1.001, rows)
    x = numpy.linspace(0, mesh.shape[1] - 1.001, columns)
    y0, x0 = y.astype(int), x.astype(int)
    fy, fx = (y - y0)[:, None], (x - x0)[None, :]
    top = mesh[y0][:, x0] * (1 - fx) + mesh[y0][:, x0 + 1] * fx
    bottom = mesh[y0 + 1][:, x0] * (1 - fx) + mesh[y0 + 1][:, x0 + 1] * fx
    return top * (1 - fy) + bottom * fy


def field(rows, columns):
    values = 10 ** (0.4 * smooth(rows, columns, 48) + 0.08 * random.standard_normal((rows, columns)))
    values[smooth(rows, columns, 24) > 0.0] = numpy.nan
    return values.astype("f4")


def dataset(path, rows, columns, west, north, cell, days):
    out = netCDF4.Dataset(path, "w", format="NETCDF4")
    out.createDimension("lat", rows)
    out.createDimension("lon", columns)
    out.createVariable("lat", "f8", ("lat",))[:] = north - cell * (numpy.arange(rows) + 0.5)
    out.createVariable("lon", "f8", ("lon",))[:] = west + cell * (numpy.arange(columns) + 0.5)
    out["lat"].units, out["lon"].units = "degrees_north", "degrees_east"
    out.createDimension("time", len(days))
    out.createVariable("time", "f8", ("time",))[:] = days
    out["time"].units = "days since 1970-01-01"
    return out


def chlorophyll(out, chunks=None):
    """Without chunks the library chooses, as it does for most who write files."""
    v = out.createVariable("chlor_a", "f4", ("time", "lat", "lon"), zlib=True, complevel=4, shuffle=True, chunksizes=chunks, fill_value=-32767.0)
    v.units, v.standard_name = "mg m-3", "mass_concentration_of_chlorophyll_a_in_sea_water"
    return v


rows, columns = 4320, 8640
everywhere = numpy.ma.masked_invalid(field(rows, columns))
for name, chunks in (("global", None), ("global-small-chunks", (1, 216, 216))):
    with dataset(os.path.join(folder, f"{name}.nc"), rows, columns, -180, 90, 360 / columns, [20000.5]) as out:
        chlorophyll(out, chunks)[0] = everywhere

start = datetime.date(2016, 1, 1)
kinds = [field(300, 300) for _ in range(25)]
day = 0
for year in range(10):
    days = [(start - datetime.date(1970, 1, 1)).days + day + i + 0.5 for i in range(365)]
    with dataset(os.path.join(folder, f"year-{year}.nc"), 300, 300, -14, 56, 0.04, days) as out:
        v = chlorophyll(out, (1, 300, 300))
        for i in range(365):
            # A day is one of the fields, moved and scaled, so that ten years need not be drawn cell by cell.
            moved = numpy.roll(kinds[(day * 7) % 25], (day * 13 % 300, day * 29 % 300), (0, 1)) * numpy.float32(1 + 0.3 * numpy.sin(day / 58))
            v[i] = numpy.ma.masked_invalid(moved)
            day += 1
