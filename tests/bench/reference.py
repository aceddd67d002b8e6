"""The same work with Debian's numpy and netCDF4: figures of every region on every day of a file. Prints seconds."""
import json
import sys
import time

import netCDF4
import numpy

path, regions_path = sys.argv[1:3]
regions = json.load(open(regions_path))
started = time.perf_counter()
count = 0
with netCDF4.Dataset(path) as dataset:
    variable = dataset.variables["chlor_a"]
    prepared = [(numpy.array(r["index"]), numpy.array(r["weight"])) for r in regions]
    for step in range(variable.shape[0]):
        field = numpy.ma.filled(variable[step], numpy.nan).ravel()
        for index, weight in prepared:
            values = field[index]
            seen = numpy.isfinite(values)
            count += 1
            if not seen.any():
                continue
            v, w = values[seen], weight[seen]
            order = numpy.argsort(v)
            cumulated = numpy.cumsum(w[order])
            percentiles = [v[order][numpy.searchsorted(cumulated, p * cumulated[-1])] for p in (0.1, 0.25, 0.5, 0.75, 0.9, 0.95)]
            logs = numpy.log10(v[v > 0])
            wl = w[v > 0]
            mean_log = numpy.average(logs, weights=wl)
            figures = (numpy.average(v, weights=w), 10**mean_log, numpy.sqrt(numpy.average((logs - mean_log) ** 2, weights=wl)), percentiles, v.max())
print(json.dumps({"seconds": time.perf_counter() - started, "views": count, "numpy": numpy.__version__, "netCDF4": netCDF4.__version__}))
