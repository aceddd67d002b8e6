"""Distances from points to the bundled land outline (Natural Earth 1:50m as world-atlas 2.0.2 packs it), independently:
TopoJSON decoded here, coast pieces near a point made dense and laid into an azimuthal equidistant plane about it
(Vincenty 1975 inverse on WGS84, so lengths from the point are geodesic), distance taken by shapely.
Run with Debian's python3-numpy and python3-shapely: python3 coast_distance.py > ../values/coast-distance.json"""
import json
import math
import os

import numpy as np
import shapely
from shapely.geometry import LineString, MultiLineString, Point

here = os.path.dirname(os.path.abspath(__file__))
topology = json.load(open(os.path.join(here, '../../../node_modules/world-atlas/land-50m.json')))
scale, translate = topology['transform']['scale'], topology['transform']['translate']


def arc(points):
    at = np.cumsum(np.array(points, dtype=float), axis=0)
    return at * scale + translate


arcs = [arc(a) for a in topology['arcs']]
A, F = 6378137.0, 1 / 298.257223563
B = A * (1 - F)


def vincenty(lat1, lon1, lat2, lon2):
    """Distance in m and azimuth at the first point."""
    u1, u2 = math.atan((1 - F) * math.tan(math.radians(lat1))), math.atan((1 - F) * math.tan(math.radians(lat2)))
    big_l = math.radians(lon2 - lon1)
    lam = big_l
    if big_l == 0 and lat1 == lat2:
        return 0.0, 0.0
    for _ in range(200):
        sin_s = math.hypot(math.cos(u2) * math.sin(lam), math.cos(u1) * math.sin(u2) - math.sin(u1) * math.cos(u2) * math.cos(lam))
        cos_s = math.sin(u1) * math.sin(u2) + math.cos(u1) * math.cos(u2) * math.cos(lam)
        sigma = math.atan2(sin_s, cos_s)
        sin_a = math.cos(u1) * math.cos(u2) * math.sin(lam) / sin_s
        cos2a = 1 - sin_a ** 2
        cos2sm = cos_s - 2 * math.sin(u1) * math.sin(u2) / cos2a if cos2a else 0
        c = F / 16 * cos2a * (4 + F * (4 - 3 * cos2a))
        before = lam
        lam = big_l + (1 - c) * F * sin_a * (sigma + c * sin_s * (cos2sm + c * cos_s * (-1 + 2 * cos2sm ** 2)))
        if abs(lam - before) < 1e-13:
            break
    uu = cos2a * (A * A - B * B) / (B * B)
    k1 = 1 + uu / 16384 * (4096 + uu * (-768 + uu * (320 - 175 * uu)))
    k2 = uu / 1024 * (256 + uu * (-128 + uu * (74 - 47 * uu)))
    ds = k2 * sin_s * (cos2sm + k2 / 4 * (cos_s * (-1 + 2 * cos2sm ** 2) - k2 / 6 * cos2sm * (-3 + 4 * sin_s ** 2) * (-3 + 4 * cos2sm ** 2)))
    azimuth = math.atan2(math.cos(u2) * math.sin(lam), math.cos(u1) * math.sin(u2) - math.sin(u1) * math.cos(u2) * math.cos(lam))
    return B * k1 * (sigma - ds), azimuth


def distance_km(lon, lat, within_deg):
    wide = within_deg / math.cos(math.radians(lat))
    lines = []
    for points in arcs:
        for (x1, y1), (x2, y2) in zip(points[:-1], points[1:]):
            if abs(x2 - x1) > 180 or (abs(x1) > 179.999 and abs(x2) > 179.999):
                continue
            turn = 360 * round((lon - (x1 + x2) / 2) / 360)
            if max(x1, x2) + turn < lon - wide or min(x1, x2) + turn > lon + wide or max(y1, y2) < lat - within_deg or min(y1, y2) > lat + within_deg:
                continue
            places = []
            steps = max(2, int(max(abs(x2 - x1), abs(y2 - y1)) / 0.0005))
            for t in np.linspace(0, 1, steps):
                away, azimuth = vincenty(lat, lon, y1 + t * (y2 - y1), x1 + turn + t * (x2 - x1))
                places.append((away * math.sin(azimuth), away * math.cos(azimuth)))
            lines.append(LineString(places))
    return MultiLineString(lines).distance(Point(0, 0)) / 1000 if lines else None


points = [
    [-11.0, 51.95], [-10.6, 53.32], [-9.4, 51.3], [-8.9, 51.4], [3.0, 54.0], [8.0, 54.3], [13.2, 44.0], [-80.7, 29.2],
    [179.2, -17.4], [-179.7, 51.6], [-60.0, -63.5], [25.0, 71.3], [20.0, 78.0], [144.0, -38.6], [-155.5, 18.8], [103.7, 1.15],
]
items = [{'longitude': lon, 'latitude': lat, 'km': distance_km(lon, lat, 0.6)} for lon, lat in points]
print(json.dumps({'source': f'tests/reference/make/coast_distance.py, numpy {np.__version__}, shapely {shapely.__version__}; null is farther than 0.6 degrees', 'items': items}, indent=1))
