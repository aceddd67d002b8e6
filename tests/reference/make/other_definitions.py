"""
The same questions put to tools that define them otherwise: GDAL's rasterizing (through rasterio) and CDO's field
statistics. Writes values/other-definitions.json. Needs Debian's python3-rasterio, python3-netcdf4 and cdo.
"""
import json
import os
import subprocess
import tempfile

import netCDF4
import numpy
import rasterio
from affine import Affine
from rasterio.features import rasterize

here = os.path.dirname(os.path.abspath(__file__))
values = os.path.join(here, "..", "values")
shares = json.load(open(os.path.join(values, "cell-shares.json")))
name = "whole degrees, north first"
grid = shares["grids"][name]
shape = (len(grid["lat"]) - 1, len(grid["lon"]) - 1)
transform = Affine(1, 0, grid["lon"][0], 0, -1, grid["lat"][0])
rasters = {}
for polygon, geometry in shares["polygons"].items():
    if not any(case["polygon"] == polygon and case["grid"] == name and case["index"] for case in shares["cases"]):
        continue
    cells = lambda touched: numpy.flatnonzero(rasterize([geometry], shape, transform=transform, all_touched=touched)).tolist()
    rasters[polygon] = {"touched": cells(True), "centreInside": cells(False)}

# A world of 15 degrees: CDO's mean over a box by its own (spherical) areas, and by the areas of the WGS84 ellipsoid.
random = numpy.random.default_rng(20240229)
lat = numpy.arange(-82.5, 90, 15)
lon = numpy.arange(-172.5, 180, 15)
field = 10 ** random.normal(0, 0.4, (lat.size, lon.size))
field[random.random(field.shape) < 0.3] = numpy.nan
a, f = 6378137.0, 1 / 298.257223563
e = numpy.sqrt(f * (2 - f))


def zone(degrees):
    """Area of the ellipsoid from the equator to a parallel, in one radian of longitude (Snyder 1987, eq. 3-12)."""
    s = numpy.sin(numpy.radians(degrees))
    return a * a * (1 - e * e) / 2 * (s / (1 - (e * s) ** 2) - numpy.log((1 - e * s) / (1 + e * s)) / (2 * e))


area = numpy.repeat(((zone(lat + 7.5) - zone(lat - 7.5)) * numpy.radians(15) / 1e6)[:, None], lon.size, axis=1)
with tempfile.TemporaryDirectory() as folder:
    for file, data in (("field.nc", field), ("area.nc", area)):
        with netCDF4.Dataset(os.path.join(folder, file), "w") as out:
            out.createDimension("lat", lat.size)
            out.createDimension("lon", lon.size)
            for axis, numbers, units in (("lat", lat, "degrees_north"), ("lon", lon, "degrees_east")):
                out.createVariable(axis, "f8", (axis,))[:] = numbers
                out[axis].units = units
            v = out.createVariable("v", "f8", ("lat", "lon"), fill_value=-999.0)
            v[:] = numpy.ma.masked_invalid(data)

    def cdo(*operators):
        text = subprocess.run(["cdo", "-s", "outputf,%.17g", *operators, os.path.join(folder, "field.nc")], capture_output=True, text=True, check=True).stdout
        return float(text)

    box = "-sellonlatbox,-60,75,-45,60"
    out_area = os.path.join(folder, "area-box.nc")
    subprocess.run(["cdo", "-s", box, os.path.join(folder, "area.nc"), out_area], check=True)
    cdo_values = {
        "meanBySphere": cdo("-fldmean", box),
        "meanByEllipsoid": cdo("-fldmean", f"-setgridarea,{out_area}", box),
        "max": cdo("-fldmax", box),
    }
version = "CDO " + (lambda run: (run.stdout + run.stderr).split("version ")[1].split()[0])(subprocess.run(["cdo", "-V"], capture_output=True, text=True))
json.dump(
    {
        "status": "computed",
        "source": f"make/other_definitions.py: rasterio {rasterio.__version__}, GDAL {rasterio.__gdal_version__}, {version}, netCDF4 {netCDF4.__version__}, numpy {numpy.__version__}, seed 20240229",
        "grid": name,
        "rasters": rasters,
        "world": {"box": [-60, -45, 75, 60], "lat": lat.tolist(), "lon": lon.tolist(), "field": [None if numpy.isnan(x) else x for x in field.ravel()], **cdo_values},
    },
    open(os.path.join(values, "other-definitions.json"), "w"),
    indent=1,
)
