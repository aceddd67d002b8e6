"""Connected patches of random fields by scipy, for the patches of the numeric core.

    python3 patches.py > ../values/patches.json

A field is random noise smoothed by a box of three, so that patches have holes, necks and corners; some cells are missing.
"""
import json
import sys

import numpy as np
import scipy
from scipy import ndimage

SEED = 408
random = np.random.default_rng(SEED)


def field(rows, columns, missing):
    values = ndimage.uniform_filter(random.lognormal(0, 1, (rows, columns)), 3).round(4)
    values[random.random((rows, columns)) < missing] = np.nan
    return values


def case(rows, columns, missing, level):
    values = field(rows, columns, missing)
    areas = random.uniform(0.5, 2, (rows, columns)).round(3)
    above = np.nan_to_num(values, nan=-1) >= level
    labels, count = ndimage.label(above, structure=np.ones((3, 3), int))
    numbers = range(1, count + 1)
    patches = [
        {
            'cells': int(cells),
            'areaKm2': float(area),
            'greatest': float(greatest),
            # Lines that go on with the same cell at a corner: one round each part joined over edges, one round each hole joined over corners.
            'rings': int(ndimage.label(labels == number)[1] + ndimage.label(~np.pad(labels == number, 1), structure=np.ones((3, 3), int))[1]) - 1,
        }
        for number, cells, area, greatest in zip(
            numbers,
            ndimage.sum_labels(above, labels, numbers),
            ndimage.sum_labels(areas, labels, numbers),
            ndimage.maximum(values, labels, numbers),
        )
    ]
    patches.sort(key=lambda patch: -patch['areaKm2'])
    return {
        'rows': rows,
        'columns': columns,
        'level': level,
        'values': [None if np.isnan(v) else v for v in values.ravel().tolist()],
        'areaKm2': areas.ravel().tolist(),
        'patches': patches,
    }


def main():
    cases = [
        case(1, 40, 0, 1.6), case(30, 1, 0.1, 1.5), case(12, 17, 0, 1.8), case(25, 25, 0.15, 1.5),
        case(25, 25, 0.5, 1.2), case(40, 30, 0.05, 1.2), case(40, 30, 0.02, 2.2), case(20, 20, 1, 1), case(20, 20, 0, 99),
    ]
    made = {
        'status': 'computed',
        'source': f'make/patches.py: scipy {scipy.__version__}, numpy {np.__version__}, python {sys.version.split()[0]}, seed {SEED}',
        'cases': cases,
    }
    json.dump(made, sys.stdout, separators=(',', ':'))


main()
