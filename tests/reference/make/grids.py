"""Writes small gridded files and, beside them, what numpy and shapely find in them.

Run with Debian's python3: python3 tests/reference/make/grids.py
Values are read back with netCDF4 and rasterio (never taken from what was meant to be written), so that the expected
numbers come from readers Offing does not use. Region figures follow the project's definitions: a cell weighs its share
inside the polygon (overlap over cell area in the longitude/latitude plane, for the projected raster in its own plane)
times its area on the WGS84 ellipsoid; percentiles over cells are the weighted inverse distribution (type 1).
"""
import json
import math
import os
import sys
from datetime import datetime, timezone

import netCDF4
import numpy as np
import rasterio
import rasterio.warp
import shapely
from rasterio.transform import from_origin
from shapely.geometry import MultiPolygon, Polygon, box, mapping

SEED = 20240611
HERE = os.path.dirname(os.path.abspath(__file__))
OUT = os.path.normpath(os.path.join(HERE, '..', 'grids'))
rng = np.random.default_rng(SEED)

LAT = 58.125 + 0.25 * np.arange(16)
LON = 2.125 + 0.25 * np.arange(20)
CHL = 'mass_concentration_of_chlorophyll_a_in_sea_water'

REGIONS = {
    'bay': Polygon([(2.31, 58.4), (5.77, 58.22), (6.4, 60.9), (4.1, 59.35), (2.9, 61.3)]),
    'two parts and a hole': MultiPolygon([
        Polygon([(2.5, 59.1), (4.63, 59.1), (4.63, 61.07), (2.5, 61.07)], [[(3.1, 59.6), (3.9, 59.6), (3.9, 60.4), (3.1, 60.4)]]),
        Polygon([(5.2, 58.3), (6.9, 58.9), (6.1, 60.2)]),
    ]),
    'smaller than a cell': Polygon([(4.3, 60.3), (4.36, 60.3), (4.36, 60.34), (4.3, 60.34)]),
}
DATELINE = {
    'across 180': MultiPolygon([
        Polygon([(178.1, -17.3), (180, -17.9), (180, -15.2), (178.6, -15.4)]),
        Polygon([(-180, -17.9), (-178.4, -18.6), (-177.7, -16.1), (-180, -15.2)]),
    ]),
}
GREENWICH = {'across 0': Polygon([(-2.6, 48.3), (2.9, 48.8), (1.7, 50.6), (-1.9, 50.1)])}


def field(steps, rows, columns, missing=0.15):
    base = np.exp(rng.normal(0.2, 0.8, (steps, rows, columns)))
    base[rng.random((steps, rows, columns)) < missing] = np.nan
    return base


# WGS84 area between two parallels, per radian of longitude (km2)
A, F = 6378.137, 1 / 298.257223563
E = math.sqrt(F * (2 - F))
B = A * (1 - F)


def q(latitude):
    s = np.sin(np.radians(latitude))
    return B * B / 2 * (s / (1 - (E * s) ** 2) + np.log((1 + E * s) / (1 - E * s)) / (2 * E))


def midpoints(centres, poles=False):
    edges = np.empty(len(centres) + 1)
    edges[1:-1] = (centres[:-1] + centres[1:]) / 2
    edges[0] = 2 * centres[0] - edges[1]
    edges[-1] = 2 * centres[-1] - edges[-2]
    return np.clip(edges, -90, 90) if poles else edges


def type1(values, weights, p):
    order = np.argsort(values, kind='stable')
    cumulated = np.cumsum(weights[order])
    return float(values[order][np.searchsorted(cumulated, p * cumulated[-1] * (1 - 1e-12))])


def figures(values, share, area):
    weight = share * area
    ok = ~np.isnan(values)
    v, w = values[ok], weight[ok]
    out = {'cells': int(len(values)), 'valid': int(ok.sum()), 'validAreaKm2': float(w.sum())}
    if len(v) == 0:
        return out
    positive = v > 0
    logs, lw = np.log10(v[positive]), w[positive]
    centre = float((logs * lw).sum() / lw.sum())
    out.update({
        'mean': float((v * w).sum() / w.sum()),
        'geometricMean': 10 ** centre,
        'sdLog10': math.sqrt(float((lw * (logs - centre) ** 2).sum() / lw.sum())),
        'max': float(v.max()),
    })
    for name, p in [('p10', .1), ('p25', .25), ('median', .5), ('p75', .75), ('p90', .9), ('p95', .95)]:
        out[name] = type1(v, w, p)
    return out


def on_axes(values, lat_edges, lon_edges, polygon):
    """Every copy of a column on the globe is one cell; the polygon is looked for at whole turns round it."""
    found = []
    columns = len(lon_edges) - 1
    while columns > 1 and abs((lon_edges[columns - 1] + lon_edges[columns]) / 2 - lon_edges[0]) >= 360 - 1e-9:
        columns -= 1
    turns = [shapely.affinity.translate(polygon, xoff=360 * t) for t in (-2, -1, 0, 1, 2)]
    for r in range(len(lat_edges) - 1):
        south, north = sorted(lat_edges[r:r + 2])
        for c in range(columns):
            west, east = sorted(lon_edges[c:c + 2])
            cell = box(west, south, east, north)
            overlap = sum(cell.intersection(p).area for p in turns if cell.intersects(p))
            if overlap > 0:
                area = math.radians(east - west) * float(q(north) - q(south))
                found.append((values[r, c], overlap / cell.area, area))
    return figures(*np.array(found).T) if found else None


def on_plane(values, transform, crs, polygon):
    plane = shapely.ops.transform(lambda x, y: rasterio.warp.transform('EPSG:4326', crs, x, y), densified(polygon))
    found = []
    for r in range(values.shape[0]):
        for c in range(values.shape[1]):
            cell = Polygon([transform * p for p in [(c, r), (c + 1, r), (c + 1, r + 1), (c, r + 1)]])
            overlap = cell.intersection(plane).area
            if overlap > 0:
                ring = list(cell.segmentize(250).exterior.coords) if hasattr(cell, 'segmentize') else points(cell, 16)
                lon, lat = rasterio.warp.transform(crs, 'EPSG:4326', *zip(*ring))
                x, y = np.radians(lon), q(np.array(lat))
                area = abs(float(np.sum(x[:-1] * y[1:] - x[1:] * y[:-1])) / 2)
                found.append((values[r, c], overlap / cell.area, area))
    return figures(*np.array(found).T)


def points(polygon, pieces):
    coords = list(polygon.exterior.coords)
    ring = []
    for (x1, y1), (x2, y2) in zip(coords[:-1], coords[1:]):
        ring += [(x1 + (x2 - x1) * i / pieces, y1 + (y2 - y1) * i / pieces) for i in range(pieces)]
    return ring + [coords[0]]


def densified(polygon):
    return Polygon(points(polygon, 200))


expected = {}


def plain(values):
    """Ten digits are more than any test asks for, and keep the file small."""
    return [[None if np.isnan(v) else float(f'{v:.10g}') for v in row] for row in values]


def record(name, variable, unit, steps, regions, times, summaries, **more):
    expected[name] = {
        'variable': variable, 'unit': unit, 'times': times,
        'values': {str(step): plain(values) for step, values in steps.items()},
        'summaries': {str(step): summaries(values) for step, values in steps.items()},
        'regions': regions, **more,
    }


def iso(year, month, day, hour=0, minute=0):
    return datetime(year, month, day, hour, minute, tzinfo=timezone.utc).strftime('%Y-%m-%dT%H:%M:%S.000Z')


def netcdf(name, data, lat=LAT, lon=LON, form='NETCDF4', dtype='f4', order=('time', 'lat', 'lon'), variable='chlor_a',
           attrs=None, make=None, pack=None, unlimited=True, time=None, bounds=None, group=None, extra=None, factor=1.0,
           log10=False, regions=None, times=None, region_set='north', more=None, steps=None, coordinate_type='f8', endian='native'):
    path = os.path.join(OUT, name)
    ds = netCDF4.Dataset(path, 'w', format=form)
    count = data.shape[0]
    ds.createDimension('time', None if unlimited else count)
    ds.createDimension('lat', len(lat))
    ds.createDimension('lon', len(lon))
    t = ds.createVariable('time', 'f8', ('time',))
    unit, numbers, calendar = time or ('days since 1970-01-01', [19844 + i for i in range(count)], 'standard')
    t.units, t.calendar, t.standard_name = unit, calendar, 'time'
    y = ds.createVariable('lat', coordinate_type, ('lat',))
    y.units, y.standard_name = 'degrees_north', 'latitude'
    x = ds.createVariable('lon', coordinate_type, ('lon',))
    x.units, x.standard_name = 'degrees_east', 'longitude'
    y[:], x[:] = lat, lon
    if bounds:
        ds.createDimension('nv', 2)
        for axis, edges in zip((y, x), bounds):
            axis.bounds = axis.name + '_bnds'
            b = ds.createVariable(axis.bounds, 'f8', (axis.name, 'nv'))
            b[:] = np.stack([edges[:-1], edges[1:]], axis=1)
    dims = order
    if extra:
        ds.createDimension(extra, 1)
        z = ds.createVariable(extra, 'f8', (extra,))
        z.positive, z.units, z[:] = 'down', 'm', 0
        dims = (order[0], extra) + tuple(order[1:])
    attrs = dict(attrs or {})
    home = ds.createGroup(group) if group else ds
    dtype = np.dtype(dtype).newbyteorder('>') if endian == 'big' else dtype
    options = dict(fill_value=attrs.pop('_FillValue', None), endian=endian, **(make or {}))
    v = home.createVariable(variable, dtype, dims, **options)
    v.setncatts(attrs)
    v.set_auto_maskandscale(False)
    t[:] = numbers
    stored = pack(data) if pack else np.where(np.isnan(data), v._FillValue if '_FillValue' in v.ncattrs() else 9.969209968386869e36, data)
    inner = np.moveaxis(stored, [0, 1, 2], [order.index(d) for d in ('time', 'lat', 'lon')])
    written = inner[:, None] if extra else inner
    if more and 'written' in more:
        v[more['written']] = written[more['written']]
    else:
        v[:] = written
    ds.close()

    ds = netCDF4.Dataset(path)
    v = (ds[group] if group else ds)[variable]
    read = np.ma.filled(np.ma.asarray(v[:]).astype('f8'), np.nan)
    if extra:
        read = read[:, 0]
    read = np.moveaxis(read, [order.index(d) for d in ('time', 'lat', 'lon')], [0, 1, 2])
    with np.errstate(over='ignore'):
        read = (10.0 ** read if log10 else read) * factor
    lat_back, lon_back = ds['lat'][:].filled().astype('f8'), np.degrees(np.unwrap(np.radians(ds['lon'][:].filled().astype('f8'))))
    ds.close()
    if lon_back.max() - lon_back.min() > 300:
        lon_back = np.asarray(lon, 'f8')
    lat_edges, lon_edges = bounds or (midpoints(lat_back, True), midpoints(lon_back))
    region_set_of = {'north': REGIONS, 'dateline': DATELINE, 'greenwich': GREENWICH}[region_set]
    wanted = steps or sorted({0, count - 1})
    record(
        name, (group + '/' if group else '') + variable, 'mg m-3', {s: read[s] for s in wanted}, region_set, times,
        lambda values: {key: on_axes(values, lat_edges, lon_edges, polygon) for key, polygon in region_set_of.items()},
        latEdges=[float(e) for e in lat_edges], lonEdges=[float(e) for e in lon_edges],
    )


def packer(scale, offset, fill, dtype):
    return lambda data: np.where(np.isnan(data), fill, np.round((data - offset) / scale)).astype(dtype)


def days(n, start=(2024, 5, 1)):
    first = datetime(*start, tzinfo=timezone.utc).timestamp()
    return [datetime.fromtimestamp(first + 86400 * i, timezone.utc).strftime('%Y-%m-%dT%H:%M:%S.000Z') for i in range(n)]


def main():
    os.makedirs(OUT, exist_ok=True)
    mg = {'units': 'mg m-3', 'standard_name': CHL}
    n = field(3, 16, 20)

    netcdf('nc4-packed-int16.nc', n[:2], dtype='i2', pack=packer(0.002, 20, -32767, 'i2'), times=days(2),
           attrs={'_FillValue': np.int16(-32767), 'scale_factor': 0.002, 'add_offset': 20.0, **mg},
           make=dict(zlib=True, shuffle=True, fletcher32=True, chunksizes=(1, 7, 9)))
    netcdf('classic-float.nc', n, form='NETCDF3_CLASSIC', lat=LAT[::-1], times=days(3), attrs={'_FillValue': np.float32(-999), **mg})
    netcdf('classic-64bit-odd.nc', n[:, :15, :19], form='NETCDF3_64BIT_OFFSET', lat=LAT[:15], lon=LON[:19], dtype='i2',
           pack=packer(0.01, 0, -32767, 'i2'), times=days(3), attrs={'scale_factor': 0.01, 'add_offset': 0.0, **mg})
    netcdf('nc4-contiguous-big-endian.nc', n[:2], endian='big', unlimited=False, attrs=mg, times=days(2), make=dict(contiguous=True))
    netcdf('nc4-lat-lon-time.nc', n, order=('lat', 'lon', 'time'), unlimited=False, attrs=mg, times=days(3))
    netcdf('classic-lat-lon-time.nc', n, form='NETCDF3_CLASSIC', order=('lat', 'lon', 'time'), unlimited=False, attrs=mg, times=days(3))
    netcdf('nc4-time-lon-lat.nc', n[:2], order=('time', 'lon', 'lat'), attrs=mg, times=days(2))
    netcdf('nc4-depth.nc', n[:2], extra='depth', attrs=mg, times=days(2))
    netcdf('nc4-group.nc', n[:1], group='geophysical_data', attrs=mg, times=days(1))
    netcdf('nc4-float32-axes.nc', n[:1], coordinate_type='f4', attrs=mg, times=days(1))

    # Values beyond the valid range, a missing value and a fill value, all tested on the stored numbers.
    wild = packer(0.01, 0, -32767, 'i2')(n[:2])
    wild[0, 3, 4], wild[0, 5, 6], wild[0, 9, 9], wild[1, 8, 8] = -5, 2001, -32766, 32000
    netcdf('nc4-valid-range.nc', n[:2], dtype='i2', pack=lambda _: wild, times=days(2),
           attrs={'_FillValue': np.int16(-32767), 'missing_value': np.int16(-32766), 'valid_range': np.array([0, 2000], 'i2'),
                  'scale_factor': 0.01, 'add_offset': 0.0, **mg})
    netcdf('classic-valid-min-max.nc', n[:2], form='NETCDF3_CLASSIC', dtype='f8', times=days(2),
           attrs={'valid_min': 0.3, 'valid_max': 4.0, **mg})
    netcdf('classic-unsigned-byte.nc', n[:1], form='NETCDF3_CLASSIC', dtype='i1', times=days(1),
           pack=lambda d: np.where(np.isnan(d), 255, np.clip(np.round(d / 0.05), 0, 250)).astype('u1').view('i1'),
           attrs={'_FillValue': np.int8(-1), '_Unsigned': 'true', 'scale_factor': 0.05, 'add_offset': 0.0, **mg})
    netcdf('nc4-kg-per-m3.nc', n[:1] * 1e-6, dtype='f8', attrs={'units': 'kg m-3', 'standard_name': CHL}, factor=1e6, times=days(1))
    netcdf('nc4-ug-per-litre.nc', n[:1], variable='CHL', attrs={'units': 'µg L-1', 'long_name': 'Chlorophyll'}, times=days(1))
    netcdf('nc4-log10.nc', np.log10(n[:1]), variable='chl', attrs={'units': 'log10(mg m-3)', 'standard_name': CHL}, log10=True, times=days(1))

    uneven = np.array([58.0, 58.2, 58.5, 58.9, 59.2, 59.4, 59.9, 60.3, 60.6, 60.8, 61.1, 61.6, 61.9])
    lons = np.linspace(2, 7, 18)
    netcdf('nc4-bounds.nc', field(1, 12, 17), lat=uneven[:-1] + 0.37 * np.diff(uneven), lon=(lons[:-1] + lons[1:]) / 2,
           bounds=(uneven, lons), attrs=mg, times=days(1))

    south = -18.875 + 0.25 * np.arange(16)
    east = np.concatenate([177.125 + 0.25 * np.arange(12), -179.875 + 0.25 * np.arange(11)])
    netcdf('nc4-past-180.nc', field(1, 16, 23), lat=south, lon=east, attrs=mg, times=days(1), region_set='dateline')
    netcdf('classic-past-180-as-360.nc', field(1, 16, 23), form='NETCDF3_CLASSIC', lat=south[::-1], lon=np.where(east < 0, east + 360, east),
           attrs=mg, times=days(1), region_set='dateline')
    netcdf('nc4-0-to-360-world.nc', field(1, 36, 72), lat=np.linspace(87.5, -87.5, 36), lon=2.5 + 5 * np.arange(72), attrs=mg,
           times=days(1), region_set='greenwich')
    netcdf('nc4-repeated-column.nc', field(1, 19, 37), lat=np.linspace(-90, 90, 19), lon=10.0 * np.arange(37), attrs=mg,
           times=days(1), region_set='greenwich')
    netcdf('nc4-wrapped-at-greenwich.nc', field(1, 16, 28), lat=47.625 + 0.25 * np.arange(16),
           lon=np.mod(-3.375 + 0.25 * np.arange(28), 360), attrs=mg, times=days(1), region_set='greenwich')

    # The second step was never written: every cell is fill.
    netcdf('nc4-never-written.nc', n, attrs={'_FillValue': np.float32(-1), **mg}, times=days(3), steps=[0, 1, 2],
           make=dict(chunksizes=(1, 8, 10)), more={'written': [0, 2]})
    netcdf('nc4-noleap-hours.nc', n[:2], attrs=mg, time=('hours since 2020-02-28 23:10:00', [0, 24], 'noleap'),
           times=[iso(2020, 2, 28, 23, 10), iso(2020, 3, 1, 23, 10)])
    netcdf('nc4-360-day.nc', n[:2], attrs=mg, time=('days since 2001-01-01', [60, 75], '360_day'), times=None)
    netcdf('nc4-year-1.nc', n[:2], attrs=mg, time=('seconds since 0001-01-01', [63850204800.0 + 2 * 86400, 63850204800.0 + 2 * 86400 + 3600], 'standard'),
           times=None)
    for name in ('nc4-360-day.nc', 'nc4-year-1.nc'):
        with netCDF4.Dataset(os.path.join(OUT, name)) as ds:
            t = ds['time']
            dates = netCDF4.num2date(t[:], t.units, t.calendar)
            expected[name]['times'] = [iso(d.year, d.month, d.day, d.hour, d.minute) for d in dates]

    geotiffs()
    result = {
        'status': 'computed by tests/reference/make/grids.py',
        'seed': SEED,
        'versions': {'python': sys.version.split()[0], 'numpy': np.__version__, 'shapely': shapely.__version__,
                     'netCDF4': netCDF4.__version__, 'rasterio': rasterio.__version__, 'gdal': rasterio.__gdal_version__},
        'regions': {'north': {k: mapping(g) for k, g in REGIONS.items()}, 'dateline': {k: mapping(g) for k, g in DATELINE.items()},
                    'greenwich': {k: mapping(g) for k, g in GREENWICH.items()}},
        'files': expected,
    }
    with open(os.path.join(OUT, 'expected.json'), 'w') as out:
        json.dump(result, out, separators=(',', ':'))
        out.write('\n')


def geotiff(name, data, transform, crs='EPSG:4326', dtype='float32', nodata=None, scale=1.0, offset=0.0, area=True, mask=False, **options):
    path = os.path.join(OUT, name)
    stored = data if scale == 1 else np.round((data - offset) / scale)
    blank = np.isnan(stored)
    stored = np.where(blank, 0 if nodata is None else nodata, stored) if (nodata is not None or mask or dtype != 'float32') else stored
    with rasterio.Env(GDAL_TIFF_INTERNAL_MASK=True):
        with rasterio.open(path, 'w', driver='GTiff', height=data.shape[0], width=data.shape[1], count=1, dtype=dtype, crs=crs,
                           transform=transform, nodata=nodata, **options) as ds:
            ds.write(stored.astype(dtype), 1)
            ds.set_band_description(1, 'chlor_a')
            ds.set_band_unit(1, 'mg m-3')
            ds.scales, ds.offsets = (scale,), (offset,)
            ds.update_tags(time_coverage_start='2024-05-01T10:40:00Z', time_coverage_end='2024-05-01T10:45:00Z')
            if not area:
                ds.update_tags(AREA_OR_POINT='Point')
            if mask:
                ds.write_mask(np.where(blank, 0, 255).astype('u1'))
    with rasterio.open(path) as ds:
        read = np.ma.filled(ds.read(1, masked=True).astype('f8'), np.nan) * ds.scales[0] + ds.offsets[0]
        t = ds.transform
    times = [iso(2024, 5, 1, 10, 42)[:-7] + '30.000Z']
    if crs == 'EPSG:4326' and t.b == 0 and t.d == 0:
        lat_edges, lon_edges = t.f + t.e * np.arange(data.shape[0] + 1), t.c + t.a * np.arange(data.shape[1] + 1)
        record(name, 'chlor_a', 'mg m-3', {0: read}, 'north', times,
               lambda values: {k: on_axes(values, lat_edges, lon_edges, g) for k, g in REGIONS.items()},
               latEdges=[float(e) for e in lat_edges], lonEdges=[float(e) for e in lon_edges])
    else:
        record(name, 'chlor_a', 'mg m-3', {0: read}, 'north', times,
               lambda values: {'bay': on_plane(values, t, crs, REGIONS['bay'])},
               transform=[t.c, t.a, t.b, t.f, t.d, t.e])


def geotiffs():
    north_up = from_origin(2, 62, 0.25, 0.25)
    f = field(1, 16, 20)[0]
    geotiff('tiff-float32-nan.tif', f, north_up, nodata=float('nan'))
    geotiff('tiff-float32-deflate-predictor3-tiled.tif', f, north_up, nodata=-999.0, compress='deflate', predictor=3, tiled=True,
            blockxsize=16, blockysize=16)
    geotiff('tiff-int16-scaled-lzw-predictor2.tif', f, north_up, dtype='int16', nodata=-32768, scale=0.002, offset=20.0,
            compress='lzw', predictor=2)
    geotiff('tiff-uint8-packbits.tif', np.clip(f, 0, 12), north_up, dtype='uint8', nodata=255, scale=0.05, offset=0.0, compress='packbits')
    geotiff('tiff-big-float64-zstd.tif', f, north_up, dtype='float64', nodata=-1.0, compress='zstd', BIGTIFF='YES')
    geotiff('tiff-pixel-is-point.tif', f, north_up, nodata=-999.0, area=False)
    geotiff('tiff-internal-mask.tif', f, north_up, mask=True, compress='deflate')
    geotiff('tiff-sparse.tif', np.full((32, 32), np.nan), from_origin(2, 62, 0.125, 0.125), nodata=-999.0, tiled=True, blockxsize=16,
            blockysize=16, SPARSE_OK=True)
    geotiff('tiff-utm32.tif', field(1, 60, 50)[0], from_origin(90000, 6860000, 8000, 8000), crs='EPSG:32632', nodata=-999.0,
            compress='deflate')
    geotiff('tiff-utm32-rotated.tif', field(1, 50, 50)[0], rasterio.Affine.translation(60000, 6700000) * rasterio.Affine.rotation(25)
            * rasterio.Affine.scale(8000, -8000), crs='EPSG:32632', nodata=-999.0)
    geotiff('tiff-laea-europe.tif', field(1, 50, 50)[0], from_origin(3850000, 4350000, 10000, 10000), crs='EPSG:3035', nodata=-999.0)


if __name__ == '__main__':
    import shapely.affinity
    import shapely.ops
    main()
