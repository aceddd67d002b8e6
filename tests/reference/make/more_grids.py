"""Writes the second set of small gridded files, beside those of grids.py and by its definitions.

Run with Debian's python3 (numpy, netCDF4, h5py, rasterio, shapely): python3 tests/reference/make/more_grids.py
Formats (CDF-5, streamed, gzip, newer HDF5 chunk indexes, filters, both byte orders of TIFF), places (cell by cell,
projected by grid_mapping, rotated pole, levels), and times by global attributes.
"""
import gzip
import json
import os
import shutil
import struct

import h5py
import netCDF4
import numpy as np
import rasterio
import rasterio.crs
import rasterio.warp
import shapely
import shapely.affinity
import shapely.ops
from rasterio.transform import from_origin
from shapely.geometry import Polygon, mapping

import grids
from grids import CHL, DATELINE, OUT, REGIONS, days, field, figures, iso, midpoints, netcdf, on_axes, on_plane, packer, q, record

grids.rng = np.random.default_rng(20250307)
grids.shapely = shapely
expected = grids.expected
MG = {'units': 'mg m-3', 'standard_name': CHL}
LAT = 58.25 + 0.3 * np.arange(12)
LON = 2.25 + 0.35 * np.arange(14)


def copy_of(name, source, change):
    """The same content under another wrapping: what is expected of it stays."""
    with open(os.path.join(OUT, source), 'rb') as f:
        content = f.read()
    with open(os.path.join(OUT, name), 'wb') as f:
        f.write(change(content))
    first = json.load(open(os.path.join(OUT, 'expected.json')))['files']
    expected[name] = expected.get(source) or first[source]


def classic_and_hdf5():
    n = field(3, 12, 14)
    place = dict(lat=LAT, lon=LON)
    netcdf('cdf5-double.nc', n, form='NETCDF3_64BIT_DATA', dtype='f8', times=days(3), attrs=MG, **place)
    netcdf('cdf5-unsigned-short.nc', n[:, :, :13], form='NETCDF3_64BIT_DATA', lat=LAT, lon=LON[:13], dtype='u2', times=days(3),
           pack=packer(0.01, 0, 65535, 'u2'), attrs={'_FillValue': np.uint16(65535), 'scale_factor': 0.01, 'add_offset': 0.0, **MG})
    netcdf('cdf5-int64-lat-lon-time.nc', n, form='NETCDF3_64BIT_DATA', order=('lat', 'lon', 'time'), unlimited=False, dtype='i8', times=days(3),
           pack=packer(1e-6, 0, -1, 'i8'), attrs={'_FillValue': np.int64(-1), 'scale_factor': 1e-6, 'add_offset': 0.0, **MG}, **place)
    # A streamed file: nobody counted its records.
    copy_of('classic-streamed.nc', 'classic-64bit-odd.nc', lambda b: b[:4] + b'\xff\xff\xff\xff' + b[8:])
    copy_of('cdf5-streamed.nc', 'cdf5-unsigned-short.nc', lambda b: b[:4] + b'\xff' * 8 + b[12:])
    copy_of('classic-float.nc.gz', 'classic-float.nc', lambda b: gzip.compress(b, mtime=0))
    copy_of('nc4-packed-int16.nc.gz', 'nc4-packed-int16.nc', lambda b: gzip.compress(b, mtime=0))
    copy_of('tiff-int16-scaled-lzw-predictor2.tif.gz', 'tiff-int16-scaled-lzw-predictor2.tif', lambda b: gzip.compress(b, mtime=0))
    netcdf('nc4-many-steps-a-chunk.nc', n, times=days(3), attrs=MG, make=dict(zlib=True, chunksizes=(2, 5, 6)), **place)
    netcdf('nc4-21-to-379.nc', field(1, 18, 36), lat=np.linspace(85, -85, 18), lon=25.0 + 10 * np.arange(36), attrs=MG, times=days(1),
           region_set='greenwich')
    netcdf('nc4-lon-descending.nc', n[:1], lat=LAT[::-1], lon=LON[::-1], attrs=MG, times=days(1))
    netcdf('nc4-julian.nc', n[:2], attrs=MG, time=('days since 2024-04-18', [0, 1], 'julian'), times=days(2), **place)
    netcdf('nc4-minutes-with-zone.nc', n[:1], attrs=MG, time=('minutes since 2024-05-01 02:00 +2:00', [640.5], 'proleptic_gregorian'),
           times=['2024-05-01T10:40:30.000Z'], **place)
    netcdf('nc4-several-missing-values.nc', n[:1], dtype='i2', times=days(1), pack=packer(0.01, 0, -9, 'i2'),
           attrs={'missing_value': np.int16(-9), '_FillValue': np.int16(-8), 'scale_factor': 0.01, 'add_offset': 0.0, **MG}, **place)
    single_record_short(n)
    for name, options in {
        'h5-latest-fixed-array.h5': dict(chunks=(1, 5, 6), compression='gzip'),
        'h5-latest-extensible-array.h5': dict(chunks=(1, 5, 6), maxshape=(None, 12, 14), compression='gzip', shuffle=True),
        'h5-latest-btree2.h5': dict(chunks=(1, 5, 6), maxshape=(None, None, 14)),
        'h5-latest-single-chunk.h5': dict(chunks=(2, 12, 14), compression='gzip', fletcher32=True),
        'h5-lzf.h5': dict(chunks=(1, 12, 14), compression='lzf'),
        'h5-scale-offset.h5': dict(chunks=(1, 12, 14), scaleoffset=0, dtype='i4'),
        'h5-user-block.h5': dict(user=1024),
        'h5-no-scales.h5': dict(scales=False),
        'h5-two-filters-big-endian.h5': dict(chunks=(1, 4, 7), dtype='>f8', compression='gzip', shuffle=True),
    }.items():
        hdf5(name, n[:2], **options)


def single_record_short(n):
    """One variable that grows, of two-byte numbers and an odd count: its records are not padded."""
    name = 'classic-single-record-short.nc'
    stored = packer(0.01, 0, -1, 'i2')(n[:1, :11, :13])
    ds = netCDF4.Dataset(os.path.join(OUT, name), 'w', format='NETCDF3_CLASSIC')
    ds.createDimension('t', None)
    for axis, values, unit in (('lat', LAT[:11], 'degrees_north'), ('lon', LON[:13], 'degrees_east')):
        ds.createDimension(axis, len(values))
        v = ds.createVariable(axis, 'f8', (axis,))
        v.units, v[:] = unit, values
    v = ds.createVariable('chlor_a', 'i2', ('t', 'lat', 'lon'), fill_value=np.int16(-1))
    v.setncatts({'scale_factor': 0.01, 'add_offset': 0.0, **MG})
    v.set_auto_maskandscale(False)
    v[0:1] = stored
    ds.time_coverage_start, ds.time_coverage_end = '2024-05-01T10:40:00Z', '2024-05-01T10:45:00Z'
    ds.close()
    values = read_back(name)
    record_axes(name, 'chlor_a', {0: values[0]}, LAT[:11], LON[:13], ['2024-05-01T10:42:30.000Z'])


def read_back(name, variable='chlor_a'):
    with netCDF4.Dataset(os.path.join(OUT, name)) as ds:
        return np.ma.filled(np.ma.asarray(ds[variable][:]).astype('f8'), np.nan)


def record_axes(name, variable, steps, lat, lon, times, factor=1.0):
    lat_edges, lon_edges = midpoints(np.asarray(lat, 'f8'), True), midpoints(np.asarray(lon, 'f8'))
    record(name, variable, 'mg m-3', steps, 'north', times,
           lambda values: {k: on_axes(values, lat_edges, lon_edges, g) for k, g in REGIONS.items()},
           latEdges=[float(e) for e in lat_edges], lonEdges=[float(e) for e in lon_edges])


def hdf5(name, data, user=0, scales=True, dtype='f4', scaleoffset=None, **options):
    path = os.path.join(OUT, name)
    whole = dtype == 'i4'
    with h5py.File(path, 'w', libver='latest' if 'latest' in name else 'earliest', userblock_size=user) as f:
        t = f.create_dataset('time', data=np.array([19844.0, 19845.0]))
        t.attrs['units'], t.attrs['calendar'] = 'days since 1970-01-01', 'standard'
        for axis, values, unit in (('lat', LAT, 'degrees_north'), ('lon', LON, 'degrees_east')):
            a = f.create_dataset(axis, data=values)
            a.attrs['units'] = unit
        stored = np.where(np.isnan(data), -9, np.round(data / 0.01)) if whole else np.where(np.isnan(data), -9, data)
        v = f.create_dataset('chlor_a', data=stored.astype(dtype), scaleoffset=scaleoffset, **options)
        v.attrs['units'], v.attrs['standard_name'] = 'mg m-3', CHL
        v.attrs['_FillValue'] = np.array([-9], dtype)
        if whole:
            v.attrs['scale_factor'], v.attrs['add_offset'] = 0.01, 0.0
        if scales:
            for i, axis in enumerate(('time', 'lat', 'lon')):
                f[axis].make_scale(axis)
                v.dims[i].attach_scale(f[axis])
    with h5py.File(path) as f:
        read = f['chlor_a'][:].astype('f8')
        read[read == -9] = np.nan
        read = read * 0.01 if whole else read
    record_axes(name, 'chlor_a', {0: read[0], 1: read[1]}, LAT, LON, days(2))


# WGS84 area of a ring whose sides are straight in longitude and latitude: the integral of q along it, finely.
def ring_area(lons, lats, pieces=200):
    total = 0.0
    for i in range(len(lons)):
        j = (i + 1) % len(lons)
        s = (np.arange(pieces) + 0.5) / pieces
        total += float(np.sum(q(lats[i] + (lats[j] - lats[i]) * s))) / pieces * np.radians(lons[j] - lons[i])
    return abs(total)


def on_quads(values, corner_lon, corner_lat, polygon):
    found = []
    turns = [shapely.affinity.translate(polygon, xoff=360 * t) for t in (-1, 0, 1)]
    for r in range(values.shape[0]):
        for c in range(values.shape[1]):
            at = [(r, c), (r, c + 1), (r + 1, c + 1), (r + 1, c)]
            lons = np.degrees(np.unwrap(np.radians([corner_lon[p] for p in at])))
            lats = [corner_lat[p] for p in at]
            if np.isnan(lons).any() or np.isnan(lats).any():
                continue
            cell = Polygon(zip(lons, lats))
            overlap = sum(cell.intersection(p).area for p in turns if cell.intersects(p))
            if overlap > 0:
                found.append((values[r, c], overlap / cell.area, ring_area(lons, lats)))
    return figures(*np.array(found).T) if found else None


def corners_of(centres):
    wide = np.pad(centres, 1)
    wide[0, 1:-1], wide[-1, 1:-1] = 2 * centres[0] - centres[1], 2 * centres[-1] - centres[-2]
    wide[:, 0], wide[:, -1] = 2 * wide[:, 1] - wide[:, 2], 2 * wide[:, -2] - wide[:, -3]
    return (wide[:-1, :-1] + wide[:-1, 1:] + wide[1:, :-1] + wide[1:, 1:]) / 4


def curved(name, lat, lon, variable='chlor_a', corners=None, vertices=None, region_set=None, dtype='f8', groups=False, turned=False, mapped=None):
    rows, columns = lat.shape
    values = field(1, rows, columns)[0]
    path = os.path.join(OUT, name)
    ds = netCDF4.Dataset(path, 'w')
    ds.createDimension('row', rows)
    ds.createDimension('col', columns)
    navigation = ds.createGroup('navigation_data') if groups else ds
    home = ds.createGroup('geophysical_data') if groups else ds
    for axis, data, unit in (('latitude', lat, 'degrees_north'), ('longitude', (lon + 180) % 360 - 180, 'degrees_east')):
        v = navigation.createVariable(axis, dtype, ('row', 'col'), fill_value=-32767.0)
        v.units, v[:] = unit, np.where(np.isnan(data), -32767.0, data)
        if vertices:
            v.bounds = axis + '_vertices'
    if vertices:
        ds.createDimension('vertex', 4)
        for axis, data in zip(('latitude', 'longitude'), vertices):
            ds.createVariable(axis + '_vertices', 'f8', ('row', 'col', 'vertex'))[:] = data
    v = home.createVariable(variable, 'f4', ('col', 'row') if turned else ('row', 'col'), fill_value=np.float32(-999))
    v.setncatts(MG)
    if not groups:
        v.coordinates = 'longitude latitude'
    stored = np.where(np.isnan(values), -999, values)
    v[:] = stored.T if turned else stored
    ds.time_coverage_start, ds.time_coverage_end = '2024-05-01T10:40:00Z', '2024-05-01T10:45:00Z'
    ds.close()
    with netCDF4.Dataset(path) as ds:
        nav, phys = (ds['navigation_data'], ds['geophysical_data']) if groups else (ds, ds)
        lat_read, lon_read = (np.ma.filled(nav[k][:].astype('f8'), np.nan) for k in ('latitude', 'longitude'))
        read = np.ma.filled(phys[variable][:].astype('f8'), np.nan)
    read = read.T if turned else read
    lon_read = lon_read + 360 * np.round((lon - lon_read) / 360)
    corner_lon, corner_lat = corners or (corners_of(lon_read), corners_of(lat_read))
    names = {'north': REGIONS, 'dateline': DATELINE}
    record(name, ('geophysical_data/' if groups else '') + variable, 'mg m-3', {0: read}, region_set or 'north',
           ['2024-05-01T10:42:30.000Z'],
           lambda v: {k: on_quads(v, corner_lon, corner_lat, g) for k, g in names[region_set or 'north'].items()},
           corners=[[None if np.isnan(x + y) else [float(x), float(y)] for x, y in zip(*row)] for row in zip(corner_lon, corner_lat)])


def curvilinear():
    i, j = np.meshgrid(np.arange(26.0), np.arange(18.0))
    lon = 1 + 0.28 * i - 0.08 * j + 0.002 * i * j
    lat = 57.4 + 0.24 * j + 0.07 * i - 0.0015 * i * i
    curved('nc4-curvilinear.nc', lat, lon)
    curved('nc4-curvilinear-float32.nc', lat, lon, dtype='f4')
    curved('nc4-curvilinear-columns-first.nc', lat, lon, turned=True)
    curved('nc4-swath-in-groups.nc', lat[::-1], lon[::-1], groups=True, dtype='f4')
    a, b = np.meshgrid(np.arange(27.0), np.arange(19.0))
    corner_lon = 0.9 + 0.28 * a - 0.08 * b + 0.004 * np.sin(a * b)
    corner_lat = 57.3 + 0.24 * b + 0.07 * a - 0.0015 * a * a
    order = [(1, 0), (1, 1), (0, 1), (0, 0)]
    vertices = [np.stack([c[r:r + 18, k:k + 26] for r, k in order], axis=-1) for c in (corner_lat, corner_lon)]
    curved('nc4-curvilinear-vertices.nc', lat, lon, corners=(corner_lon, corner_lat), vertices=vertices)
    curved('nc4-curvilinear-dateline.nc', lat - 77.4, lon + 175.5, region_set='dateline')
    missing_lat, missing_lon = lat.copy(), lon.copy()
    missing_lat[:, -1] = missing_lon[:, -1] = np.nan
    keep = (slice(None), slice(0, 25))
    blank = [np.full((19, 27), np.nan) for _ in range(2)]
    for target, source in zip(blank, (missing_lon, missing_lat)):
        inner = source[keep]
        # With a missing last column only corners with three known centres are known: none of its own.
        target[:, :25] = corners_of(inner)[:, :25]
    curved('nc4-curvilinear-missing-places.nc', missing_lat, missing_lon, corners=(blank[0], blank[1]))
    # Latitude and longitude cell by cell that only repeat the axes.
    y, x = np.meshgrid(LAT, LON, indexing='ij')
    name = 'nc4-cell-by-cell-but-regular.nc'
    curved(name, y, x)
    values = np.array([[np.nan if v is None else v for v in row] for row in expected[name]['values']['0']])
    times = expected[name]['times']
    record_axes(name, 'chlor_a', {0: values}, LAT, LON, times)


def projected(name, mapping_attrs, crs, x0, y0, step, units='m', scale=1.0, wkt=None, aside=False, descending=True, rows=40, columns=36):
    path = os.path.join(OUT, name)
    values = field(1, rows, columns)[0]
    x = x0 + step * (np.arange(columns) + 0.5)
    y = y0 + step * (np.arange(rows) + 0.5)
    y = y[::-1] if descending else y
    ds = netCDF4.Dataset(path, 'w')
    ds.createDimension('time', 1)
    ds.createDimension('y', rows)
    ds.createDimension('x', columns)
    t = ds.createVariable('time', 'f8', ('time',))
    t.units, t[:] = 'days since 1970-01-01', 19844
    for axis, data in (('x', x), ('y', y)):
        v = ds.createVariable(axis, 'f8', (axis,))
        v.units, v.standard_name, v[:] = units, f'projection_{axis}_coordinate', data / scale
    g = ds.createVariable('crs', 'i4', ())
    g.setncatts({**mapping_attrs, **({'crs_wkt': wkt} if wkt else {})})
    if aside:
        lon, lat = rasterio.warp.transform(crs, 'EPSG:4326', *(a.ravel() for a in np.meshgrid(x, y)))
        for axis, data, unit in (('lat', lat, 'degrees_north'), ('lon', lon, 'degrees_east')):
            v = ds.createVariable(axis, 'f4', ('y', 'x'), zlib=True)
            v.units, v[:] = unit, np.array(data).reshape(rows, columns)
    v = ds.createVariable('chlor_a', 'f4', ('time', 'y', 'x'), fill_value=np.float32(-999), zlib=True)
    v.setncatts({**MG, 'grid_mapping': 'crs', **({'coordinates': 'lat lon'} if aside else {})})
    v[:] = np.where(np.isnan(values), -999, values)[None]
    ds.close()
    read = read_back(name)[0]
    t = rasterio.Affine(step, 0, x0, 0, -step if descending else step, y0 + rows * step if descending else y0)
    record(name, 'chlor_a', 'mg m-3', {0: read}, 'north', days(1), lambda v: {'bay': on_plane(v, t, crs, REGIONS['bay'])},
           transform=[t.c, t.a, t.b, t.f, t.d, t.e])


def mapped():
    projected('nc4-mapping-laea.nc', {
        'grid_mapping_name': 'lambert_azimuthal_equal_area', 'longitude_of_projection_origin': 10.0, 'latitude_of_projection_origin': 52.0,
        'false_easting': 4321000.0, 'false_northing': 3210000.0, 'semi_major_axis': 6378137.0, 'inverse_flattening': 298.257222101,
    }, 'EPSG:3035', 3800000, 3820000, 14000, aside=True)
    projected('nc4-mapping-polar.nc', {
        'grid_mapping_name': 'polar_stereographic', 'straight_vertical_longitude_from_pole': -45.0, 'latitude_of_projection_origin': 90.0,
        'standard_parallel': 70.0, 'false_easting': 0.0, 'false_northing': 0.0,
    }, 'EPSG:3413', 2100000, -2500000, 20000, units='km', scale=1000.0, descending=False)
    projected('nc4-mapping-lambert-sphere.nc', {
        'grid_mapping_name': 'lambert_conformal_conic', 'standard_parallel': [57.0, 63.0], 'longitude_of_central_meridian': 15.0,
        'latitude_of_projection_origin': 60.0, 'earth_radius': 6371000.0,
    }, '+proj=lcc +lat_1=57 +lat_2=63 +lat_0=60 +lon_0=15 +R=6371000 +units=m +no_defs', -780000, -230000, 12000)
    projected('nc4-mapping-mercator.nc', {
        'grid_mapping_name': 'mercator', 'longitude_of_projection_origin': 0.0, 'scale_factor_at_projection_origin': 1.0,
        'semi_major_axis': 6378137.0, 'inverse_flattening': 298.257223563,
    }, 'EPSG:3395', 200000, 8000000, 20000)
    projected('nc4-mapping-by-wkt.nc', {'long_name': 'coordinate system'}, 'EPSG:32632', 80000, 6440000, 12000,
              wkt=rasterio.crs.CRS.from_epsg(32632).to_wkt())
    rotated()


def rotated():
    """A rotated pole: corners in the rotated plane, placed by PROJ's own formula."""
    name = 'nc4-mapping-rotated-pole.nc'
    rows, columns, pole_lat, pole_lon = 30, 26, 30.0, -170.0
    x, y = -4.2 + 0.15 * np.arange(columns), -1.7 + 0.13 * np.arange(rows)
    values = field(1, rows, columns)[0]
    ds = netCDF4.Dataset(os.path.join(OUT, name), 'w')
    ds.createDimension('rlat', rows)
    ds.createDimension('rlon', columns)
    for axis, data, long in (('rlat', y, 'grid_latitude'), ('rlon', x, 'grid_longitude')):
        v = ds.createVariable(axis, 'f8', (axis,))
        v.units, v.standard_name, v[:] = 'degrees', long, data
    g = ds.createVariable('rotated_pole', 'i4', ())
    g.setncatts({'grid_mapping_name': 'rotated_latitude_longitude', 'grid_north_pole_latitude': pole_lat, 'grid_north_pole_longitude': pole_lon})
    v = ds.createVariable('chlor_a', 'f4', ('rlat', 'rlon'), fill_value=np.float32(-999))
    v.setncatts({**MG, 'grid_mapping': 'rotated_pole'})
    v[:] = np.where(np.isnan(values), -999, values)
    ds.time_coverage_start, ds.time_coverage_end = '2024-05-01T10:40:00Z', '2024-05-01T10:45:00Z'
    ds.close()
    read = read_back(name)
    xe, ye = np.meshgrid(midpoints(x), midpoints(y))
    crs = f'+proj=ob_tran +o_proj=longlat +o_lat_p={pole_lat} +o_lon_p=0 +lon_0={180 + pole_lon} +R=6371000 +to_meter=0.0174532925199433'
    lon, lat = rasterio.warp.transform(crs, '+proj=longlat +R=6371000', xe.ravel(), ye.ravel())
    corner_lon, corner_lat = np.array(lon).reshape(xe.shape), np.array(lat).reshape(xe.shape)
    record(name, 'chlor_a', 'mg m-3', {0: read}, 'north', ['2024-05-01T10:42:30.000Z'],
           lambda v: {k: on_quads(v, corner_lon, corner_lat, g) for k, g in REGIONS.items()},
           corners=[[[float(a), float(b)] for a, b in zip(*row)] for row in zip(corner_lon, corner_lat)])


def levels():
    """Three depths, the surface not the first of them; flags and their bits beside the values."""
    name = 'nc4-levels-and-flags.nc'
    values = field(3, 12, 14)
    ds = netCDF4.Dataset(os.path.join(OUT, name), 'w')
    for axis, size in (('time', 1), ('depth', 3), ('lat', 12), ('lon', 14)):
        ds.createDimension(axis, size)
    for axis, data, unit in (('time', [19844], 'days since 1970-01-01'), ('depth', [10.0, 0.0, 5.0], 'm'), ('lat', LAT, 'degrees_north'),
                             ('lon', LON, 'degrees_east')):
        v = ds.createVariable(axis, 'f8', (axis,))
        v.units, v[:] = unit, data
    ds['depth'].positive = 'down'
    v = ds.createVariable('chlor_a', 'f4', ('time', 'depth', 'lat', 'lon'), fill_value=np.float32(-999))
    v.setncatts({**MG, 'ancillary_variables': 'l2_flags'})
    v[:] = np.where(np.isnan(values), -999, values)[None]
    flags = grids.rng.integers(-2 ** 31, 2 ** 31, (1, 12, 14)).astype('i4')
    f = ds.createVariable('l2_flags', 'i4', ('time', 'lat', 'lon'))
    meanings = {'ATMFAIL': 1, 'LAND': 2, 'CLDICE': 512, 'SPARE32': -2 ** 31}
    f.flag_masks, f.flag_meanings, f.standard_name = np.array(list(meanings.values()), 'i4'), ' '.join(meanings), 'status_flag'
    f.set_auto_maskandscale(False)
    f[:] = flags
    ds.close()
    read = read_back(name)[0, 1]
    record_axes(name, 'chlor_a', {0: read}, LAT, LON, days(1))
    expected[name]['flags'] = {m: ((flags[0] & np.int32(mask)) != 0).astype(int).ravel().tolist() for m, mask in meanings.items()}


def composite():
    name = 'nc4-eight-days.nc'
    values = field(2, 12, 14)
    ds = netCDF4.Dataset(os.path.join(OUT, name), 'w')
    for axis, size in (('time', None), ('lat', 12), ('lon', 14), ('bnds', 2)):
        ds.createDimension(axis, size)
    for axis, data, unit in (('time', [4.0, 12.0], 'days since 2024-05-01'), ('lat', LAT, 'degrees_north'), ('lon', LON, 'degrees_east')):
        v = ds.createVariable(axis, 'f8', (axis,))
        v.units, v[:] = unit, data
    ds['time'].bounds = 'time_bnds'
    ds.createVariable('time_bnds', 'f8', ('time', 'bnds'))[:] = [[0, 8], [8, 16]]
    v = ds.createVariable('chlor_a', 'f4', ('time', 'lat', 'lon'), fill_value=np.float32(-999))
    v.setncatts({**MG, 'cell_methods': 'time: mean'})
    v[:] = np.where(np.isnan(values), -999, values)
    ds.close()
    read = read_back(name)
    record_axes(name, 'chlor_a', {0: read[0], 1: read[1]}, LAT, LON, [iso(2024, 5, 1), iso(2024, 5, 9)])
    expected[name]['ends'] = [iso(2024, 5, 9), iso(2024, 5, 17)]


def tiffs():
    north_up = from_origin(2, 62, 0.3, 0.3)
    f = field(1, 13, 17)[0]
    geotiff = grids.geotiff
    geotiff('tiff-big-endian-int16-predictor2.tif', f, north_up, dtype='int16', nodata=-32768, scale=0.002, offset=20.0, compress='lzw',
            predictor=2, ENDIANNESS='BIG')
    geotiff('bigtiff-big-endian-float32-deflate.tif', f, north_up, nodata=-999.0, compress='deflate', ENDIANNESS='BIG', BIGTIFF='YES',
            tiled=True, blockxsize=16, blockysize=16)
    geotiff('tiff-big-endian-float64.tif', f, north_up, dtype='float64', nodata=-999.0, ENDIANNESS='BIG')
    geotiff('tiff-float64-predictor3-zstd.tif', f, north_up, dtype='float64', nodata=-999.0, compress='zstd', predictor=3)
    geotiff('tiff-uint16-deflate-predictor2.tif', f, north_up, dtype='uint16', nodata=65535, scale=0.001, compress='deflate', predictor=2)
    geotiff('tiff-int32-lzw.tif', f, north_up, dtype='int32', nodata=-1, scale=0.0001, compress='lzw')
    geotiff('tiff-south-up.tif', f, rasterio.Affine(0.3, 0, 2, 0, 0.3, 58.1), nodata=-999.0)
    geotiff('tiff-polar-stereographic.tif', field(1, 40, 36)[0], from_origin(2100000, -1700000, 20000, 20000), crs='EPSG:3413', nodata=-999.0,
            compress='deflate')
    geotiff('tiff-mercator.tif', field(1, 40, 36)[0], from_origin(200000, 8800000, 20000, 20000), crs='EPSG:3395', nodata=-999.0, compress='deflate')
    several_bands(f, north_up)
    overviews()


def several_bands(f, transform):
    for name, interleave in (('tiff-two-bands-by-pixel.tif', 'pixel'), ('tiff-two-bands-by-band.tif', 'band')):
        path = os.path.join(OUT, name)
        with rasterio.open(path, 'w', driver='GTiff', height=13, width=17, count=2, dtype='float32', crs='EPSG:4326', transform=transform,
                           nodata=-999.0, interleave=interleave, compress='deflate') as ds:
            for band, (title, values) in enumerate((('sst', f + 7), ('chlor_a', f)), 1):
                ds.write(np.where(np.isnan(values), -999, values).astype('f4'), band)
                ds.set_band_description(band, title)
            ds.units = ('degree_C', 'mg m-3')
            ds.update_tags(time_coverage_start='2024-05-01T10:40:00Z', time_coverage_end='2024-05-01T10:45:00Z')
        record_tiff(name, 2)


def overviews():
    name = 'tiff-overviews.tif'
    path = os.path.join(OUT, name)
    values = field(1, 52, 68)[0]
    with rasterio.open(path, 'w', driver='GTiff', height=52, width=68, count=1, dtype='float32', crs='EPSG:4326',
                       transform=from_origin(2, 62, 0.075, 0.075), nodata=-999.0, compress='deflate', tiled=True, blockxsize=16, blockysize=16) as ds:
        ds.write(np.where(np.isnan(values), -999, values).astype('f4'), 1)
        ds.set_band_description(1, 'chlor_a')
        ds.set_band_unit(1, 'mg m-3')
        ds.update_tags(time_coverage_start='2024-05-01T10:40:00Z', time_coverage_end='2024-05-01T10:45:00Z')
    with rasterio.open(path, 'r+') as ds:
        ds.build_overviews([2, 4])
    record_tiff(name, 1)


def record_tiff(name, band):
    with rasterio.open(os.path.join(OUT, name)) as ds:
        read, t, shape = np.ma.filled(ds.read(band, masked=True).astype('f8'), np.nan), ds.transform, ds.shape
    lat_edges, lon_edges = t.f + t.e * np.arange(shape[0] + 1), t.c + t.a * np.arange(shape[1] + 1)
    record(name, 'chlor_a', 'mg m-3', {0: read}, 'north', ['2024-05-01T10:42:30.000Z'],
           lambda values: {k: on_axes(values, lat_edges, lon_edges, g) for k, g in REGIONS.items()},
           latEdges=[float(e) for e in lat_edges], lonEdges=[float(e) for e in lon_edges])


def main():
    classic_and_hdf5()
    curvilinear()
    mapped()
    levels()
    composite()
    tiffs()
    with open(os.path.join(OUT, 'expected-more.json'), 'w') as out:
        json.dump({
            'status': 'computed by tests/reference/make/more_grids.py', 'seed': 20250307,
            'versions': {'numpy': np.__version__, 'shapely': shapely.__version__, 'netCDF4': netCDF4.__version__, 'h5py': h5py.__version__,
                         'rasterio': rasterio.__version__, 'gdal': rasterio.__gdal_version__},
            'files': expected,
        }, out, separators=(',', ':'))
        out.write('\n')


if __name__ == '__main__':
    main()
