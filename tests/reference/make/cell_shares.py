"""Shares of cells inside polygons, by intersecting every cell with the polygon in shapely.

    python3 cell_shares.py > ../values/cell-shares.json
"""
import json
import math
import sys

import numpy as np
import shapely
import shapely.ops
from shapely.affinity import translate
from shapely.geometry import MultiPolygon, Polygon, mapping

SEED = 20240229
random = np.random.default_rng(SEED)


def star(lon, lat, radius, points):
    angles = np.sort(random.uniform(0, 2 * math.pi, points))
    radii = radius * random.uniform(0.3, 1, points)
    return Polygon([(lon + r * math.cos(a), lat + r * math.sin(a)) for a, r in zip(angles, radii)])


square = Polygon([(2, 46), (5, 46), (5, 49), (2, 49)])
polygons = {
    'box on cell edges': square,
    'box off cell edges': Polygon([(2.3, 46.1), (5.7, 46.1), (5.7, 48.9), (2.3, 48.9)]),
    'triangle': Polygon([(1.1, 45.2), (8.7, 47.9), (3.3, 52.6)]),
    'wound clockwise': Polygon([(1.1, 45.2), (3.3, 52.6), (8.7, 47.9)]),
    'concave comb': Polygon(
        [(1, 45.5), (9, 45.5), (9, 53), (8.2, 53), (7.4, 46.2), (6.1, 53), (5.3, 53), (4.4, 46.2), (3.2, 53), (1, 53)]
    ),
    'with two holes': Polygon(
        [(0.5, 45.5), (9.5, 45.9), (9.1, 53.7), (0.9, 53.1)],
        [[(2.2, 47.1), (4.6, 47.3), (3.9, 50.2)], [(6.05, 48.4), (6.1, 51.6), (7.9, 50.2)]],
    ),
    'several parts': shapely.ops.unary_union(
        [star(2, 47, 1.4, 9), star(6.5, 51, 2.2, 17), star(8.8, 46, 0.8, 5)]
    ),
    'sliver': Polygon([(0.2, 45.123), (9.8, 53.456), (9.8, 53.4560001)]),
    'smaller than a cell': Polygon([(4.61, 48.32), (4.63, 48.33), (4.62, 48.35)]),
    'a metre across': Polygon([(4.61, 48.32), (4.61001, 48.32), (4.61001, 48.32001), (4.61, 48.32001)]),
    'reaching past the grid': star(0, 45, 7, 31),
    'ragged star': star(5, 49.5, 4.4, 240),
    'over the date line, 170 to 190': Polygon([(171.3, -21.2), (188.4, -19.8), (186.2, -8.1), (177, -12.3)]),
    'over the date line, cut in two': None,
    'over Greenwich': Polygon([(-7.4, 41.2), (9.1, 44.3), (4.2, 58.8), (-3.3, 52)]),
    'right round the world': Polygon([(-180, 40), (180, 40), (180, 47.5), (-180, 47.5)]),
}
whole = polygons['over the date line, 170 to 190']
west = whole.intersection(Polygon([(100, -90), (180, -90), (180, 90), (100, 90)]))
east = translate(whole.intersection(Polygon([(180, -90), (260, -90), (260, 90), (180, 90)])), -360)
polygons['over the date line, cut in two'] = MultiPolygon([west, east])

stretched = [0, 0.4, 1.3, 2.7, 3.1, 5.2, 5.25, 7.9, 9.3, 10]
grids = {
    'whole degrees, north first': {'lat': list(range(55, 43, -1)), 'lon': list(range(0, 11))},
    'whole degrees, south first, east first': {'lat': list(range(44, 56)), 'lon': list(range(10, -1, -1))},
    'uneven': {'lat': [45 + y for y in stretched], 'lon': stretched},
    'world from -180': {'lat': list(np.arange(90, -91, -15.0)), 'lon': list(np.arange(-180, 181, 15.0))},
    'world from 0': {'lat': list(np.arange(-90, 91, 15.0)), 'lon': list(np.arange(0, 361, 15.0))},
    'world and one column again': {'lat': list(np.arange(-90, 91, 15.0)), 'lon': list(np.arange(-7.5, 368, 15.0))},
    'cut at 21 east': {'lat': list(np.arange(60, -31, -7.5)), 'lon': list(np.linspace(21, 379, 31))},
    'Pacific, 160 to 200': {'lat': list(np.arange(-25, -4.9, 2.5)), 'lon': list(np.arange(160, 201, 2.5))},
}
# Column and row to x and y: turned, sheared, rows going down; the plane is longitude and latitude itself.
turned = {'transform': [1.5, 0.71, 0.23, 53.1, 0.19, -0.83], 'rows': 9, 'columns': 11}


def corners(grid):
    """Index and outline of every cell; a column whose middle lies past a full circle is the first one again."""
    if 'transform' in grid:
        t = grid['transform']
        at = lambda c, r: (t[0] + t[1] * c + t[2] * r, t[3] + t[4] * c + t[5] * r)
        for row in range(grid['rows']):
            for col in range(grid['columns']):
                ring = [at(col, row), at(col + 1, row), at(col + 1, row + 1), at(col, row + 1)]
                yield row * grid['columns'] + col, Polygon(ring)
        return
    lat, lon = grid['lat'], grid['lon']
    for row in range(len(lat) - 1):
        for col in range(len(lon) - 1):
            if abs((lon[col] + lon[col + 1]) / 2 - lon[0]) >= 360:
                continue
            ring = [(lon[col], lat[row]), (lon[col + 1], lat[row]), (lon[col + 1], lat[row + 1]), (lon[col], lat[row + 1])]
            yield row * (len(lon) - 1) + col, Polygon(ring)


def shares(polygon, grid):
    turns = [0] if 'transform' in grid else [-360, 0, 360]
    copies = [translate(polygon, turn) for turn in turns]
    index, share = [], []
    for cell, outline in corners(grid):
        area = sum(outline.intersection(copy).area for copy in copies) / outline.area
        # Intersections that only touch, give or take a rounding.
        if area > 1e-13:
            index.append(cell)
            share.append(area)
    return {'index': index, 'share': share}


def main():
    grids['turned'] = turned
    cases = []
    for name, polygon in polygons.items():
        assert polygon.is_valid, name
        for grid_name, grid in grids.items():
            found = shares(polygon, grid)
            if found['index']:
                cases.append({'polygon': name, 'grid': grid_name, **found})
    json.dump(
        {
            'status': 'computed',
            'source': 'make/cell_shares.py: shapely %s (GEOS %s), numpy %s, python %s, seed %d'
            % (shapely.__version__, shapely.geos.geos_version, np.__version__, sys.version.split()[0], SEED),
            'polygons': {name: mapping(polygon) for name, polygon in polygons.items()},
            'grids': grids,
            'cases': cases,
        },
        sys.stdout,
        separators=(',', ':'),
        default=float,
    )


main()
