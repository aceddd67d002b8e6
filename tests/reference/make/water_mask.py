"""Share of layers in which each cell of a small stack is valid, the water mask at 5 %, and coverage of two regions by it.
Whether a cell is valid in a layer is a rule anybody can write again: (31 l + 17 c + l c) mod 101 < c mod 23.
Cell areas on the WGS84 ellipsoid by the authalic latitude. Run: python3 water_mask.py > ../values/water-mask.json"""
import json

import numpy as np

ROWS, COLUMNS, LAYERS = 9, 12, 140
SHARE = 0.05
layer, cell = np.mgrid[0:LAYERS, 0:ROWS * COLUMNS]
valid = (31 * layer + 17 * cell + layer * cell) % 101 < cell % 23
share = valid.mean(axis=0)
water = valid.sum(axis=0) / LAYERS >= SHARE

lat_edges = np.linspace(50.0, 50.9, ROWS + 1)
lon_edges = np.linspace(-13.2, -12.0, COLUMNS + 1)
A, F = 6378137.0, 1 / 298.257223563
E = np.sqrt(F * (2 - F))


def q(phi):
    s = np.sin(phi)
    return (1 - E * E) * (s / (1 - (E * s) ** 2) + np.arctanh(E * s) / E)


strip = A * A / 2 * np.diff(q(np.radians(lat_edges))) * np.radians(np.diff(lon_edges)[0]) / 1e6
area = np.repeat(strip, COLUMNS)

# Shares of cells inside: a box of whole cells, and one whose edges run through the middle of cells.
boxes = {'whole': (50.2, 50.6, -12.9, -12.4), 'halves': (50.15, 50.65, -12.85, -12.25)}
wanted = [0, 7, 139]


def overlap(edges, low, high):
    return np.clip(np.minimum(edges[1:], high) - np.maximum(edges[:-1], low), 0, None) / np.diff(edges)


regions = {}
for name, (south, north, west, east) in boxes.items():
    part = np.outer(overlap(lat_edges, south, north), overlap(lon_edges, west, east)).ravel()
    weight = part * area * water
    regions[name] = {
        'box': [south, north, west, east],
        'waterKm2': float(weight.sum()),
        'coverage': [float((weight * valid[i]).sum() / weight.sum()) for i in wanted],
    }

print(json.dumps({
    'made': f'numpy {np.__version__}, tests/reference/make/water_mask.py',
    'rows': ROWS, 'columns': COLUMNS, 'layers': LAYERS, 'minShare': SHARE,
    'share': share.tolist(), 'water': water.astype(int).tolist(), 'exactly': int((valid.sum(axis=0) * 20 == LAYERS).sum()),
    'days': wanted, 'regions': regions,
}))
