"""Writes the third set: rarer HDF5 filters and layouts, beside those of more_grids.py, and files that must be refused.

Run with Debian's python3 (numpy, h5py, hdf5plugin, tables, netCDF4, shapely), the packages hdf5-filter-plugin,
hdf5-filter-plugin-blosc-serial and hdf5-filter-plugin-zfp-serial, and the zstd command:
python3 tests/reference/make/filters.py
Values are read back with h5py. Of zstd Debian has no HDF5 filter: those chunks are packed by the zstd command and stored
as they are, and the values expected are the ones packed.
"""
import json
import os
import subprocess
import sys
import tempfile

import h5py
import hdf5plugin  # noqa: F401 (sets where h5py finds Debian's filters)
import numpy as np
import rasterio
import rasterio.transform
import shapely
import tables

import grids
import more_grids
from grids import CHL, OUT, days
from more_grids import LAT, LON, record_axes

grids.rng = np.random.default_rng(20250711)
grids.expected.clear()
REFUSED = os.path.normpath(os.path.join(OUT, '..', 'refused'))
NUMBERS = dict(lz4=32004, bzip2=307, bitshuffle=32008, blosc=32001, zstd=32015, zfp=32013)


FINE = (58.253 + 0.1 * np.arange(36), 2.2537 + 0.12 * np.arange(42))


def axes(f, lat=LAT, lon=LON):
    for axis, values, unit in (('time', np.array([19844.0]), 'days since 1970-01-01'), ('lat', lat, 'degrees_north'), ('lon', lon, 'degrees_east')):
        f.create_dataset(axis, data=values).attrs['units'] = unit


def meaning(f, v, fill=-9.0):
    v.attrs['units'], v.attrs['standard_name'] = 'mg m-3', CHL
    v.attrs['_FillValue'] = np.array([fill], v.dtype)
    for i, axis in enumerate(('time', 'lat', 'lon')):
        f[axis].make_scale(axis)
        v.dims[i].attach_scale(f[axis])


def stored(values, dtype='f4'):
    return np.where(np.isnan(values), -9, values).astype(dtype)


def file(name, create, libver='earliest', values=None, folder=OUT, place=(LAT, LON)):
    with h5py.File(os.path.join(folder, name), 'w', libver=libver) as f:
        axes(f, *place)
        meaning(f, create(f))
    if folder != OUT:
        return
    with h5py.File(os.path.join(OUT, name)) as f:
        v = f['chlor_a']
        masks = [v.id.get_chunk_info(i).filter_mask for i in range(v.id.get_num_chunks())] if v.chunks and libver == 'earliest' else []
    assert not any(masks) or 'without-its-filter' in name, f'{name} has chunks that no filter packed'
    if values is None:
        with h5py.File(os.path.join(OUT, name)) as f:
            values = f['chlor_a'][0].astype('f8')
    read = np.where(values == -9, np.nan, values)
    record_axes(name, 'chlor_a', {0: read}, *place, days(1))


def plain(data, **options):
    return lambda f: f.create_dataset('chlor_a', data=data, **options)


def by_hand(data, pipeline, chunk_of, mask=0, fill=None):
    """Chunks stored as given, under filters h5py itself may not have."""
    def create(f):
        plist = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
        plist.set_obj_track_times(False)
        plist.set_chunk((1, 6, 14))
        for number, options in pipeline:
            plist.set_filter(number, h5py.h5z.FLAG_OPTIONAL, options)
        if fill is not None:
            plist.set_fill_value(np.array(fill, data.dtype))
        space = h5py.h5s.create_simple(data.shape)
        dataset = h5py.Dataset(h5py.h5d.create(f.id, b'chlor_a', h5py.h5t.py_create(data.dtype), space, plist))
        for row in (0, 6):
            chunk = chunk_of(np.ascontiguousarray(data[:, row:row + 6]), row)
            if chunk is not None:
                dataset.id.write_direct_chunk((0, row, 0), chunk, filter_mask=mask if row == 0 else 0)
        return dataset
    return create


def zstd(chunk, _row):
    with tempfile.TemporaryDirectory() as folder:
        path = os.path.join(folder, 'chunk')
        with open(path, 'wb') as f:
            f.write(chunk.tobytes())
        return subprocess.run(['zstd', '-q', '-3', '--no-check', '-c', path], check=True, capture_output=True).stdout


def nbit(f):
    plist = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
    plist.set_obj_track_times(False)
    plist.set_chunk((1, 12, 14))
    plist.set_filter(h5py.h5z.FILTER_NBIT, h5py.h5z.FLAG_MANDATORY)
    kind = h5py.h5t.STD_I32LE.copy()
    kind.set_precision(17)
    dataset = h5py.Dataset(h5py.h5d.create(f.id, b'chlor_a', kind, h5py.h5s.create_simple((1, 12, 14)), plist))
    dataset[...] = np.ceil(stored(grids.field(1, 12, 14))).astype('i4')
    return dataset


def nbit_float(data):
    def create(f):
        plist = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
        plist.set_obj_track_times(False)
        plist.set_chunk((1, 12, 14))
        plist.set_filter(h5py.h5z.FILTER_NBIT, h5py.h5z.FLAG_MANDATORY)
        dataset = h5py.Dataset(h5py.h5d.create(f.id, b'chlor_a', h5py.h5t.IEEE_F32LE, h5py.h5s.create_simple((1, 12, 14)), plist))
        dataset[...] = data
        return dataset
    return create


def main():
    # Eighths pack well: every filter has something to do, which `file` tests.
    data = stored(np.ceil(grids.field(1, 12, 14) * 8) / 8)
    fine = stored(np.ceil(grids.field(1, 36, 42) * 8) / 8)
    filtered = dict(chunks=(1, 6, 14))
    file('h5-szip.h5', plain(data, compression='szip', compression_opts=('nn', 16), **filtered))
    file('h5-szip-entropy-int32.h5', plain(np.ceil(data).astype('i4'), compression='szip', compression_opts=('ec', 8), **filtered))
    file('h5-lz4.h5', plain(data, compression=NUMBERS['lz4'], compression_opts=(0,), **filtered))
    file('h5-bzip2.h5', plain(data, compression=NUMBERS['bzip2'], compression_opts=(9,), **filtered))
    file('h5-bitshuffle.h5', plain(data, compression=NUMBERS['bitshuffle'], compression_opts=(0, 0), **filtered))
    file('h5-bitshuffle-lz4.h5', plain(data, compression=NUMBERS['bitshuffle'], compression_opts=(0, 2), **filtered))
    for code, inner in enumerate(('blosclz', 'lz4', 'lz4hc', 'snappy', 'zlib', 'zstd')):
        if inner in ('snappy', 'zlib'):
            continue
        # Too small a chunk blosc leaves as it is.
        file(f'h5-blosc-{inner}.h5', plain(fine, compression=NUMBERS['blosc'], compression_opts=(0, 0, 0, 0, 5, 1, code), chunks=(1, 18, 42)), place=FINE)
    file('h5-zfp.h5', plain(data, compression=NUMBERS['zfp'], **filtered))
    file('h5-zstd.h5', by_hand(data, [(NUMBERS['zstd'], (3,))], zstd), values=data[0].astype('f8'))
    file('h5-nbit-float32.h5', nbit_float(data))
    file('h5-fletcher32.h5', plain(data, fletcher32=True, **filtered))
    file('h5-fletcher32-deflate-shuffle.h5', plain(data, fletcher32=True, shuffle=True, compression='gzip', **filtered))
    # One chunk stored as it is although the pipeline has deflate, the other never written.
    import zlib
    half = np.where(np.arange(12)[:, None] < 6, data[0], -9).astype('f8')
    file('h5-chunk-without-its-filter.h5', by_hand(data, [(1, (4,))], lambda c, row: c.tobytes() if row == 0 else zlib.compress(c.tobytes(), 4), mask=1),
         values=data[0].astype('f8'))
    file('h5-chunk-never-written.h5', by_hand(data, [(1, (4,))], lambda c, row: zlib.compress(c.tobytes(), 4) if row == 0 else None, fill=-9), values=half)
    file('h5-contiguous.h5', plain(data))
    file('h5-contiguous-big-endian-int16.h5', plain(np.ceil(data).astype('>i2')))
    file('h5-compact.h5', compact(data))
    file('h5-latest-implicit.h5', implicit(data), libver='latest')
    file('h5-latest-contiguous.h5', plain(data), libver='latest')
    file('h5-latest-fixed-array-paged.h5', plain(data, chunks=(1, 1, 1)), libver='latest')
    file('h5-latest-single-chunk-plain.h5', plain(data, chunks=(1, 12, 14)), libver='latest')
    file('h5-earliest-btree-two-levels.h5', plain(data, chunks=(1, 1, 1), compression='gzip'))
    refused(data)
    with open(os.path.join(OUT, 'expected-filters.json'), 'w') as out:
        json.dump({
            'status': 'computed by tests/reference/make/filters.py', 'seed': 20250711,
            'versions': {'numpy': np.__version__, 'shapely': shapely.__version__, 'h5py': h5py.__version__, 'hdf5': h5py.version.hdf5_version,
                         'hdf5plugin': hdf5plugin.version, 'tables': tables.__version__,
                         'zstd': subprocess.run(['zstd', '--version'], capture_output=True, text=True).stdout.strip()},
            'files': grids.expected,
        }, out, separators=(',', ':'))
        out.write('\n')


def compact(data):
    def create(f):
        plist = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
        plist.set_obj_track_times(False)
        plist.set_layout(h5py.h5d.COMPACT)
        dataset = h5py.Dataset(h5py.h5d.create(f.id, b'chlor_a', h5py.h5t.IEEE_F32LE, h5py.h5s.create_simple(data.shape), plist))
        dataset[...] = data
        return dataset
    return create


def implicit(data):
    def create(f):
        plist = h5py.h5p.create(h5py.h5p.DATASET_CREATE)
        plist.set_obj_track_times(False)
        plist.set_chunk((1, 5, 6))
        plist.set_alloc_time(h5py.h5d.ALLOC_TIME_EARLY)
        dataset = h5py.Dataset(h5py.h5d.create(f.id, b'chlor_a', h5py.h5t.IEEE_F32LE, h5py.h5s.create_simple(data.shape), plist))
        dataset[...] = data
        return dataset
    return create


def refused(data):
    """Each with what it points at or is packed by; the test knows the code and the sentence."""
    os.makedirs(REFUSED, exist_ok=True)
    file('h5-external-storage.h5', lambda f: f.create_dataset('chlor_a', (1, 12, 14), 'f4', external=[('package.json', 0, 672)]), folder=REFUSED)
    with h5py.File(os.path.join(REFUSED, 'h5-external-link.h5'), 'w') as f:
        axes(f)
        f['chlor_a'] = h5py.ExternalLink('../grids/h5-lzf.h5', 'chlor_a')
    layout = h5py.VirtualLayout((1, 12, 14), 'f4')
    layout[:] = h5py.VirtualSource('../grids/h5-contiguous.h5', 'chlor_a', (1, 12, 14))
    file('h5-virtual.h5', lambda f: f.create_virtual_dataset('chlor_a', layout, fillvalue=-9), libver='latest', folder=REFUSED)
    file('h5-unknown-filter.h5', by_hand(data, [(32999, (1,))], lambda c, _: c.tobytes()), folder=REFUSED)
    file('h5-fletcher32-damaged.h5', plain(data, fletcher32=True, chunks=(1, 6, 14)), folder=REFUSED)
    path = os.path.join(REFUSED, 'h5-fletcher32-damaged.h5')
    with open(path, 'rb') as f:
        content = bytearray(f.read())
    at = content.find(np.ascontiguousarray(data[0, :6]).tobytes())
    content[at + 40] ^= 1
    with open(path, 'wb') as f:
        f.write(content)
    file('h5-nbit-17-bits.h5', nbit, folder=REFUSED)
    fine = stored(np.ceil(grids.field(1, 36, 42) * 8) / 8)
    file('h5-blosc-zlib.h5', plain(fine, compression=NUMBERS['blosc'], compression_opts=(0, 0, 0, 0, 5, 1, 4), chunks=(1, 18, 42)), folder=REFUSED, place=FINE)
    hostile(data)
    with rasterio.open(os.path.join(REFUSED, 'rgb.tif'), 'w', driver='GTiff', height=8, width=8, count=3, dtype='uint8', photometric='RGB', crs='EPSG:4326',
                       transform=rasterio.transform.from_origin(2, 62, 0.3, 0.3)) as ds:
        ds.write((np.arange(192) % 256).reshape(3, 8, 8).astype('u1'))
    path = os.path.join(REFUSED, 'h5-lzo.h5')
    with tables.open_file(path, 'w') as f:
        f.create_carray('/', 'chlor_a', obj=data, chunkshape=(1, 6, 14), filters=tables.Filters(complevel=3, complib='lzo'))
    with h5py.File(path, 'r+') as f:
        axes(f)
        meaning(f, f['chlor_a'])


def hostile(data):
    import zlib
    # 28 MB out of a chunk that says it has 336 bytes; a chunk of 1.6 GB; 4e12 cells in a few kilobytes.
    file('h5-chunk-deflate-bomb.h5', by_hand(data, [(1, (9,))], lambda c, row: zlib.compress(bytes(28_000_000), 9) if row == 0 else zlib.compress(c.tobytes())), folder=REFUSED)
    for name, shape, chunks in (('h5-huge-chunk.h5', (1, 20000, 20000), (1, 20000, 20000)), ('h5-absurd-dimensions.h5', (1, 2000000, 2000000), (1, 10, 10))):
        lat, lon = (np.linspace(-80, 80, shape[1]), np.linspace(-170, 170, shape[2])) if 'chunk.' in name else (LAT, LON)
        with h5py.File(os.path.join(REFUSED, name), 'w') as f:
            f.create_dataset('time', data=np.array([19844.0])).attrs['units'] = 'days since 1970-01-01'
            for axis, values, unit, n in (('lat', lat, 'degrees_north', shape[1]), ('lon', lon, 'degrees_east', shape[2])):
                # An axis nobody wrote: its cells are all fill values.
                a = f.create_dataset(axis, (n,), 'f8', chunks=(min(n, 1000),), compression='gzip') if n > 100000 else f.create_dataset(axis, data=np.round(values, 1) if n < 100 else values, compression='gzip')
                a.attrs['units'] = unit
            meaning(f, f.create_dataset('chlor_a', shape, 'f4', chunks=chunks, compression='gzip'))
    with h5py.File(os.path.join(REFUSED, 'h5-groups-in-circles.h5'), 'w') as f:
        group = f
        for depth in range(60):
            group = group.create_group(f'g{depth}')
            group['again'] = f['/']
            group['up'] = group.parent
        group['data'] = data
    kind = np.dtype('f4')
    for depth in range(24):
        kind = np.dtype([(f'level{depth}', kind)])
    file('h5-deep-attributes.h5', lambda f: f.create_dataset('chlor_a', data=data), folder=REFUSED)
    with h5py.File(os.path.join(REFUSED, 'h5-deep-attributes.h5'), 'r+') as f:
        v = f['chlor_a']
        v.attrs.create('deep', np.zeros(3, kind))
        v.attrs.create('ragged', [np.arange(3.0), np.arange(2.0)], dtype=h5py.vlen_dtype('f8'))
        v.attrs.create('points at', v.ref, dtype=h5py.ref_dtype)
        v.attrs['empty'] = h5py.Empty('f4')
        f.attrs['<script>alert(1)</script>'] = '"><img src=x onerror=alert(2)>'
        for i in range(400):
            v.attrs[f'note {i:03}'] = 'x' * 100


if __name__ == '__main__':
    main()
