"""
The same work with Debian's numpy and netCDF4: windows of each region read from each layer, the same figures. Prints
seconds without imports. Arguments: a JSON file {files, variable, regions: [{window: [row, column, rows, columns],
index, weight, water}]}, index counted within the window; "read" as second argument only reads whole layers.
"""
import json
import sys
import time

import netCDF4
import numpy

task = json.load(open(sys.argv[1]))
only_read = sys.argv[2:] == ["read"]
shares = (0.1, 0.25, 0.5, 0.75, 0.9, 0.95)
regions = [
    (tuple(r["window"]), numpy.array(r["index"]), numpy.array(r["weight"]), numpy.array(r["water"], bool)) for r in task["regions"]
]
started = time.perf_counter()
count = 0
for path in task["files"]:
    with netCDF4.Dataset(path) as dataset:
        variable = dataset.variables[task["variable"]]
        for step in range(variable.shape[0]):
            if only_read:
                numpy.ma.filled(variable[step], numpy.nan)
                continue
            for (row, column, rows, columns), index, weight, water in regions:
                values = numpy.ma.filled(variable[step, row : row + rows, column : column + columns], numpy.nan).ravel()[index].astype("f8")
                seen = numpy.isfinite(values)
                count += 1
                coverage = weight[seen & water].sum() / weight[water].sum()
                if not seen.any():
                    continue
                v, w = values[seen], weight[seen]
                order = numpy.argsort(v)
                ordered = v[order]
                cumulated = numpy.cumsum(w[order])
                percentiles = ordered[numpy.searchsorted(cumulated, numpy.array(shares) * cumulated[-1])]
                positive = v > 0
                logs, wl = numpy.log10(v[positive]), w[positive]
                mean_log = numpy.average(logs, weights=wl)
                bins = numpy.clip(numpy.floor((logs + 3) * 20).astype(int) + 1, 0, 121)
                figures = (
                    coverage,
                    w.sum(),
                    numpy.average(v, weights=w),
                    10**mean_log,
                    numpy.sqrt(numpy.average((logs - mean_log) ** 2, weights=wl)),
                    percentiles,
                    index[seen][numpy.argmax(v)],
                    numpy.bincount(bins, weights=wl, minlength=122),
                )
print(json.dumps({"seconds": time.perf_counter() - started, "views": count, "numpy": numpy.__version__, "netCDF4": netCDF4.__version__}))
