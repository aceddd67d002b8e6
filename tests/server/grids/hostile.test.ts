import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { deflateSync, gzipSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hdf5Library } from '../../../server/grids/hdf5-library'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { maxCurvedCells } from '../../../server/grids/read/limits'
import { writeGeotiff } from '../../../server/grids/write/geotiff'
import { startWorkers, type Workers } from '../../../server/workers/workers'

const bundle = new URL('../../../dist/server/worker.js', import.meta.url).pathname
const reference = new URL('../../reference/', import.meta.url).pathname
const mostSeconds = 20
const mostGrowthMb = 500

let folder: string
let workers: Workers
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-hostile-'))
  workers = startWorkers(bundle, { inspectFile: mostSeconds })
})
afterAll(async () => {
  await workers.close()
  await rm(folder, { recursive: true })
})

/** As the server looks at what arrives: in a thread, within a time, and without the process growing much on the way. */
async function look(path: string, mostMb = mostGrowthMb) {
  const before = process.memoryUsage.rss()
  let peak = before
  const watch = setInterval(() => (peak = Math.max(peak, process.memoryUsage.rss())), 20)
  const outcome: unknown = await workers.heavy('inspectFile', { path, fileName: path.split('/').at(-1)! }).catch((error: unknown) => error)
  clearInterval(watch)
  expect((Math.max(peak, process.memoryUsage.rss()) - before) / 2 ** 20).toBeLessThan(mostMb)
  return outcome
}

async function refusalOf(content: Buffer | string, name = 'sent.nc'): Promise<LayerRefused> {
  const path = join(folder, name)
  await writeFile(path, content)
  return refusalAt(path)
}

async function refusalAt(path: string): Promise<LayerRefused> {
  const outcome = await look(path)
  expect(outcome).toBeInstanceOf(LayerRefused)
  return outcome as LayerRefused
}

const int = (n: number) => Buffer.from(Uint32Array.of(n).buffer).reverse()
const word = (text: string) => Buffer.concat([int(Buffer.byteLength(text)), Buffer.from(text), Buffer.alloc((4 - (Buffer.byteLength(text) % 4)) % 4)])
const list = (tag: number, items: Buffer[]) => Buffer.concat([int(items.length ? tag : 0), int(items.length), ...items])
const note = (name: string, value: string) => Buffer.concat([word(name), int(2), word(value)])

interface Sketch {
  dimensions: [string, number][]
  variables: { name: string; on: number[]; notes?: [string, string][]; values?: number[] }[]
  notes?: [string, string][]
  records?: number
}

/** A classic NetCDF file of doubles, laid out as its header says; what is not given is left out at the end. */
function classic({ dimensions, variables, notes = [], records = 0 }: Sketch): Buffer {
  const sizes = variables.map(({ on }) => on.reduce((product, d) => product * Math.max(1, dimensions[d]![1]), 8))
  const head = (begins: number[]) =>
    Buffer.concat([
      Buffer.from('CDF\x01', 'latin1'), int(records),
      list(10, dimensions.map(([name, size]) => Buffer.concat([word(name), int(size)]))),
      list(12, notes.map(([name, value]) => note(name, value))),
      list(11, variables.map((variable, i) =>
        Buffer.concat([
          word(variable.name), int(variable.on.length), ...variable.on.map(int), list(12, (variable.notes ?? []).map(([name, value]) => note(name, value))),
          int(6), int(Math.min(sizes[i]!, 0xffffffff)), int(begins[i]!),
        ]))),
    ])
  let next = head(variables.map(() => 0)).length
  const begins = sizes.map((size, i) => {
    const at = next
    if (variables[i]!.values) next += size
    return at
  })
  const body = variables.flatMap(({ values }) => (values ? [Buffer.from(Float64Array.from(values).buffer).swap64()] : []))
  return Buffer.concat([head(begins), ...body])
}

const north: [string, string][] = [['units', 'degrees_north']]
const east: [string, string][] = [['units', 'degrees_east']]
const chl: [string, string][] = [['units', 'mg m-3'], ['standard_name', 'mass_concentration_of_chlorophyll_a_in_sea_water']]
const axes = (lat: number[], lon: number[]): Sketch['variables'] => [{ name: 'lat', on: [0], notes: north, values: lat }, { name: 'lon', on: [1], notes: east, values: lon }]
const small = (lat: number[], lon: number[]): Buffer =>
  classic({
    dimensions: [['lat', lat.length], ['lon', lon.length]],
    variables: [...axes(lat, lon), { name: 'chl', on: [0, 1], notes: chl, values: Array.from({ length: lat.length * lon.length }, (_, i) => i + 1) }],
  })

describe('a classic file that means harm', () => {
  it('is read when it means none', async () => {
    await writeFile(join(folder, 'good.nc'), small([1, 2, 3], [4, 5]))
    expect(await look(join(folder, 'good.nc'))).toMatchObject({ report: { variables: [{ name: 'chl', valid: 6 }] } })
  })

  it.each([
    ['declares a huge grid in a few bytes', classic({ dimensions: [['lat', 2_000_000_000], ['lon', 2_000_000_000]], variables: [{ name: 'chl', on: [0, 1], notes: chl }] }), /^(damaged|too-large|truncated)$/, /declares|reach|impossible/],
    ['declares an axis that is not there', classic({ dimensions: [['lat', 900_000], ['lon', 3]], variables: [{ name: 'lat', on: [0], notes: north }] }), /^truncated$/, /lat should reach to byte/],
    ['lies about its records', Buffer.concat([classic({ dimensions: [['time', 0], ['x', 3]], variables: [{ name: 't', on: [0, 1], values: [1, 2, 3] }], records: 4_000_000 })]), /^truncated$/, /should reach to byte/],
    ['has a dimension of no size', classic({ dimensions: [['lat', 3], ['lon', 2], ['none', 0]], variables: [...axes([1, 2, 3], [4, 5]), { name: 'chl', on: [2, 0, 1], notes: chl }] }), /^(no-grid|unknown-place)$/, /\S/],
    ['has a time axis that is empty', classic({
      dimensions: [['time', 0], ['lat', 3], ['lon', 2]],
      variables: [
        { name: 'lat', on: [1], notes: north, values: [1, 2, 3] }, { name: 'lon', on: [2], notes: east, values: [4, 5] },
        { name: 'time', on: [0], notes: [['units', 'days since 2024-01-01']] }, { name: 'chl', on: [0, 1, 2], notes: chl },
      ],
    }), /^no-time$/, /its time axis is empty/],
    ['has latitudes that are no numbers', small([NaN, NaN, NaN], [4, 5]), /^unknown-place$/, /lat/],
    ['has one longitude that is no number', small([1, 2, 3], [4, NaN]), /^unknown-place$/, /lon/],
    ['has infinite longitudes', small([1, 2, 3], [4, Infinity]), /^unknown-place$/, /lon/],
    ['has latitudes past the poles', small([80, 90, 100], [4, 5]), /^unknown-place$/, /lat holds 100, beyond the poles/],
    ['has longitudes of many turns', small([1, 2], [4, 4e9]), /^unknown-place$/, /lon/],
    ['has coordinates of another length than its data', classic({
      dimensions: [['lat', 3], ['lon', 2], ['other', 4]],
      variables: [{ name: 'lat', on: [2], notes: north, values: [1, 2, 3, 4] }, { name: 'lon', on: [1], notes: east, values: [4, 5] }, { name: 'chl', on: [0, 1], notes: chl, values: [1, 2, 3, 4, 5, 6] }],
    }), /^(no-grid|unknown-place)$/, /\S/],
    ['declares thousands of variables', classic({ dimensions: [['x', 1]], variables: Array.from({ length: 3000 }, (_, i) => ({ name: `v${i}`, on: [0], values: [i] })) }), /^too-large$/, /more than 2000 variables/],
    ['declares billions of variables', Buffer.concat([Buffer.from('CDF\x01', 'latin1'), int(0), int(0), int(0), int(0), int(0), int(11), int(0xfffffff0)]), /^(too-large|damaged)$/, /variables|damaged/],
    ['has a name longer than itself', Buffer.concat([Buffer.from('CDF\x01', 'latin1'), int(0), int(10), int(1), int(0x7ffffff0), Buffer.alloc(60, 65)]), /^damaged$/, /header/],
  ])('%s: it is refused with code, sentence and facts', async (_, content, code, sentence) => {
    const refused = await refusalOf(content)
    expect(refused.code).toMatch(code)
    expect(refused.message).toMatch(sentence)
    expect(refused.message).toMatch(/^[A-Za-z].*\.$/)
    expect(JSON.parse(JSON.stringify(refused.facts))).toBeTypeOf('object')
  })

  it('may carry markup in its names: it is text, and stays what it was', async () => {
    const name = '<script>alert(1)</script>'
    const path = join(folder, 'markup.nc')
    const variables = [...axes([1, 2, 3], [4, 5]), { name, on: [0, 1], notes: [...chl, ['long_name', '"><img src=x onerror=alert(2)>']] as [string, string][], values: [1, 2, 3, 4, 5, 6] }]
    await writeFile(path, classic({ dimensions: [['lat', 3], ['lon', 2]], variables, notes: [['title', '<b>bold</b>']] }))
    expect(await look(path)).toMatchObject({ report: { variables: [{ name, longName: '"><img src=x onerror=alert(2)>' }] } })
  })
})

describe('an HDF5 file that means harm', () => {
  it.each([
    ['h5-chunk-deflate-bomb.h5', 'damaged', 'The file is damaged: chlor_a cannot be read back whole.', { what: 'chlor_a' }],
    ['h5-huge-chunk.h5', 'too-large', 'chlor_a is stored in blocks of 1600000000 bytes, too large to unpack.', { chunkBytes: 1_600_000_000 }],
    ['h5-absurd-dimensions.h5', 'too-large', 'The grid of chlor_a declares 2000000 by 2000000 cells; Offing reads up to 400 million.', { rows: 2_000_000, columns: 2_000_000 }],
    ['h5-groups-in-circles.h5', 'no-grid', 'The file holds no variable on a latitude and longitude grid.', {}],
  ])('%s is refused', async (name, code, message, facts) => {
    expect(await refusalAt(`${reference}refused/${name}`)).toMatchObject({ code, message, facts })
  })

  it('with deep, ragged, empty and pointing attributes is read for its numbers', async () => {
    expect(await look(`${reference}refused/h5-deep-attributes.h5`)).toMatchObject({ report: { variables: [{ name: 'chlor_a', cells: 168 }] } })
  })

  it('whose declared end lies behind its bytes is refused as cut', async () => {
    const bytes = await readFile(`${reference}grids/h5-lzf.h5`)
    expect(await refusalOf(bytes.subarray(0, -100), 'cut.h5')).toMatchObject({ code: 'truncated', facts: { neededBytes: bytes.length, fileSize: bytes.length - 100 } })
  })
})

describe('a small file that places millions of cells one by one', () => {
  /** Smooth places of `size` by `size` cells: deflated, a few hundred kilobytes. */
  async function curved(size: number): Promise<string> {
    const path = join(folder, `curved-${size}.nc`)
    const library = await hdf5Library()
    const file = new library.File(path, 'w')
    for (const axis of ['y', 'x']) file.create_dataset({ name: axis, data: Float32Array.from({ length: size }, (_, i) => i), shape: [size], dtype: '<f4' }).make_scale(axis)
    const places = (rowStep: number, columnStep: number, first: number) => {
      const values = new Float32Array(size * size)
      for (let i = 0; i < values.length; i++) values[i] = first + (Math.floor(i / size) * rowStep + (i % size) * columnStep) / size
      return values
    }
    const chunks = [Math.min(size, 500), Math.min(size, 500)]
    const put = (name: string, data: Float32Array, units: string) => {
      const dataset = file.create_dataset({ name, data, shape: [size, size], dtype: '<f4', chunks, compression: 1 })
      dataset.create_attribute('units', units)
      for (const [at, axis] of ['y', 'x'].entries()) dataset.attach_scale(at, axis)
      if (name === 'chlor_a') dataset.create_attribute('coordinates', 'lat lon')
    }
    put('lat', places(10, 0.5, 40), 'degrees_north')
    put('lon', places(0.5, 10, -20), 'degrees_east')
    put('chlor_a', new Float32Array(size * size).fill(1), 'mg m-3')
    file.close()
    return path
  }

  it('is read within 600 MB up to nearly 12 million', async () => {
    const size = Math.floor(Math.sqrt(maxCurvedCells))
    expect(await look(await curved(size), 600)).toMatchObject({ report: { variables: [{ name: 'chlor_a', grid: { kind: 'curvilinear', rows: size } }] } })
  })

  it('is refused above before their places are read', async () => {
    const refused = (await look(await curved(3500), 100)) as LayerRefused
    expect(refused).toMatchObject({ code: 'too-large', message: 'lat places 3500 by 3500 cells one by one; Offing reads up to 12 million.', facts: { rows: 3500, columns: 3500 } })
  })
})

describe('a TIFF file that means harm', () => {
  /** A little-endian TIFF of one directory, from tag to its numbers (16 bits, or 32 where they do not fit). */
  function tiff(tags: Record<number, number[]>, next = 0): Buffer {
    const entries = Object.entries(tags).map(([id, values]) => ({ id: Number(id), values }))
    const at = 8
    const data: Buffer[] = []
    let free = at + 2 + entries.length * 12 + 4
    const table = entries.map(({ id, values }) => {
      const entry = Buffer.alloc(12)
      entry.writeUInt16LE(id, 0)
      entry.writeUInt16LE(4, 2)
      entry.writeUInt32LE(values.length, 4)
      const bytes = Buffer.from(Uint32Array.from(values).buffer)
      if (bytes.length <= 4) bytes.copy(entry, 8)
      else {
        entry.writeUInt32LE(free, 8)
        free += bytes.length
        data.push(bytes)
      }
      return entry
    })
    const head = Buffer.from([0x49, 0x49, 42, 0, at, 0, 0, 0, entries.length, 0])
    const tail = Buffer.alloc(4)
    tail.writeUInt32LE(next)
    return Buffer.concat([head, ...table, tail, ...data])
  }
  const image = { 256: [10], 257: [10], 258: [8], 259: [1], 262: [1], 273: [8], 277: [1], 278: [10], 279: [100] }

  it.each([
    ['whose directories form a circle', tiff(image, 8), 'damaged', /form a circle/],
    ['whose directory lies beyond its end', Buffer.from([0x49, 0x49, 42, 0, 0xff, 0xff, 0xff, 0x7f]), 'truncated', /directory/],
    ['whose strips lie beyond its end', tiff({ ...image, 273: [4_000_000_000] }), 'truncated', /data/],
    ['that declares more cells than it can hold', tiff({ ...image, 256: [60_000], 257: [60_000], 278: [60_000] }), /too-large|damaged|truncated/, /\S/],
    ['that is a picture in colours', tiff({ ...image, 258: [8, 8, 8], 262: [2], 277: [3], 279: [100] }), /no-quantity|damaged/, /colours|block/],
    ['of thousands of bands', tiff({ ...image, 277: [60_000] }), /too-large|damaged/, /bands|block/],
    ['packed in a way nobody knows', tiff({ ...image, 259: [34712] }), 'unsupported-encoding', /34712/],
    ['without a directory', Buffer.from([0x49, 0x49, 42, 0, 0, 0, 0, 0]), 'damaged', /no image/],
  ])('%s is refused', async (_, content, code, sentence) => {
    const refused = await refusalOf(Buffer.concat([content, Buffer.alloc(200)]), 'sent.tif')
    expect(refused.code).toMatch(code)
    expect(refused.message).toMatch(sentence)
  })

  it('that is a colour picture with a place is refused as a picture', async () => {
    expect(await refusalAt(`${reference}refused/rgb.tif`)).toMatchObject({
      code: 'no-quantity', message: 'This TIFF file is a picture (its numbers are colours), not measurements.', facts: { photometric: 2 },
    })
  })

  it('whose strip unpacks to far more than it should is refused', async () => {
    const path = join(folder, 'bomb.tif')
    await writeGeotiff(path, { rows: 20, columns: 20, west: 0, north: 10, lonStep: 0.1, latStep: 0.1, values: new Float64Array(400).fill(3), deflate: true, description: 'chl', unit: 'mg m-3' })
    const bytes = await readFile(path)
    const bomb = deflateSync(Buffer.alloc(60_000_000))
    const at = bytes.readUInt32LE(4)
    for (let i = 0; i < bytes.readUInt16LE(at); i++) {
      const entry = at + 2 + i * 12
      if (bytes.readUInt16LE(entry) === 273) bytes.writeUInt32LE(bytes.length, entry + 8)
      if (bytes.readUInt16LE(entry) === 279) bytes.writeUInt32LE(bomb.length, entry + 8)
    }
    expect(await refusalOf(Buffer.concat([bytes, bomb]), 'bomb.tif')).toMatchObject({ code: 'damaged' })
  })
})

describe('a file packed whole that means harm', () => {
  it('is refused when it lies about how much it holds, before it fills the disk', async () => {
    const lying = gzipSync(Buffer.from('CDF\x01'))
    lying.writeUInt32LE(0xfffffff0, lying.length - 4)
    expect(await refusalOf(lying, 'bomb.nc.gz')).toMatchObject({ code: expect.stringMatching(/too-large|damaged/), facts: { fileName: 'bomb.nc.gz', declared: 0xfffffff0 } })
  })

  it('is refused by what it holds when that is nothing readable', async () => {
    expect(await refusalOf(gzipSync(Buffer.alloc(40_000_000)), 'zeros.nc.gz')).toMatchObject({ code: 'unknown-format' })
  })
})

describe('a picture sent as a measurement', () => {
  it.each([
    ['PNG', Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex'), 'a PNG picture'],
    ['JPEG', Buffer.from('ffd8ffe000104a46494600010100', 'hex'), 'a JPEG picture'],
  ])('%s is named for what it is', async (_, content, what) => {
    expect(await refusalOf(content, 'map.nc')).toMatchObject({ code: 'unknown-format', message: expect.stringContaining(what) })
  })
})
