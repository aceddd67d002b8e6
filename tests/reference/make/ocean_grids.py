"""What xarray reads from the ocean grids that Debian's package ferret-datasets ships (none of them made here).

Run with Debian's python3 after `apt-get install ferret-datasets python3-xarray python3-netcdf4`:
python3 tests/reference/make/ocean_grids.py
"""
import json
import os

import numpy as np
import xarray as xr

FOLDER = '/usr/share/ferret-vis/data'
HERE = os.path.dirname(os.path.abspath(__file__))
WANTED = [
    # file, variable, selections beside the last two dimensions
    ('etopo60.cdf', 'ROSE', [{}]),
    ('etopo20.cdf', 'ROSE', [{}]),
    ('monthly_navy_winds.cdf', 'UWND', [{'TIME': 0}, {'TIME': 77}, {'TIME': 131}]),
    ('monthly_navy_winds.cdf', 'VWND', [{'TIME': 50}]),
    ('levitus_climatology.cdf', 'TEMP', [{'ZAXLEVITR': 0}]),
    ('levitus_climatology.cdf', 'SALT', [{'ZAXLEVITR': 0}]),
]


def figures(values):
    seen = values[~np.isnan(values)]
    rows, columns = values.shape
    rng = np.random.default_rng(3)
    picks = [(int(r), int(c)) for r, c in zip(rng.integers(0, rows, 40), rng.integers(0, columns, 40))]
    return {
        'cells': int(values.size), 'valid': int(seen.size), 'mean': float(seen.mean()), 'min': float(seen.min()), 'max': float(seen.max()),
        'sumOfSquares': float((seen ** 2).sum()),
        'picks': [[r, c, None if np.isnan(values[r, c]) else float(values[r, c])] for r, c in picks],
    }


files = []
for name, variable, selections in WANTED:
    with xr.open_dataset(os.path.join(FOLDER, name), decode_times=name.startswith('monthly')) as ds:
        for selection in selections:
            slab = ds[variable].isel(selection)
            y, x = (ds[d].values for d in slab.dims)
            time = ds['TIME'].values[selection['TIME']] if 'TIME' in selection else None
            files.append({
                'file': name, 'variable': variable, 'step': selection.get('TIME', 0),
                'time': None if time is None else str(np.datetime64(time, 'ms')) + 'Z', 'rows': slab.shape[0], 'columns': slab.shape[1],
                'firstLat': float(y[0]), 'lastLat': float(y[-1]), 'firstLon': float(x[0]), 'lastLon': float(x[-1]),
                **figures(slab.values.astype('f8')),
            })
with open(os.path.join(HERE, '..', 'values', 'ocean-grids.json'), 'w') as out:
    json.dump({'status': 'computed by tests/reference/make/ocean_grids.py', 'package': 'ferret-datasets 7.6.0-5', 'versions': {'xarray': '2023.01.0'},
               'files': files, 'refused': {'coads_climatology.cdf': 'climatology', 'esku_heat_budget.cdf': 'climatology',
                                           'ocean_atlas_subset.nc': 'climatology'}}, out, indent=1)
    out.write('\n')
