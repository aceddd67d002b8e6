import { execFile } from 'node:child_process'
import fs from 'node:fs'
import { mkdtemp, open, rm, stat } from 'node:fs/promises'
import { syncBuiltinESMExports } from 'node:module'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { promisify } from 'node:util'
import { deflateSync } from 'node:zlib'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { hdf5Library } from '../../../server/grids/hdf5-library'
import { openGridSource } from '../../../server/grids/read/open'
import { bundleReader } from './bundle-reader'

const [rows, columns] = [4320, 8640]
const mostMb = 600

let folder: string
let bundle: string
const paths: Record<string, string> = {}
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-large-'))
  bundle = await bundleReader()
  for (const [name, write] of Object.entries({ 'classic NetCDF': writeClassic, 'NetCDF-4': writeHdf5, GeoTIFF: writeTiff })) {
    paths[name] = join(folder, name)
    await write(paths[name])
  }
}, 300_000)
afterAll(async () => {
  await rm(folder, { recursive: true })
  await rm(bundle, { force: true })
})

/** The number stored in a cell: enough of a pattern that a misplaced block shows. */
const stored = (row: number, column: number): number => ((row >> 4) * 31 + (column >> 4) * 7) % 30_000

/** A classic file of two-byte numbers, written row by row. */
async function writeClassic(path: string): Promise<void> {
  const int = (n: number) => Buffer.from(Uint32Array.of(n).buffer).reverse()
  const text = (word: string) => Buffer.concat([int(word.length), Buffer.from(word.padEnd(Math.ceil(word.length / 4) * 4, '\0'))])
  const units = (unit: string) => Buffer.concat([int(12), int(1), text('units'), int(2), text(unit)])
  const header = (begins: number[]) =>
    Buffer.concat([
      Buffer.from('CDF\x02'), int(0), int(10), int(2), text('lat'), int(rows), text('lon'), int(columns), int(0), int(0), int(11), int(3),
      ...[['lat', [0], 'degrees_north', 6], ['lon', [1], 'degrees_east', 6], ['chlor_a', [0, 1], 'mg m-3', 3]].map((item, i) => {
        const [name, ids, unit, type] = item as [string, number[], string, number]
        return Buffer.concat([text(name), int(ids.length), ...ids.map(int), units(unit), int(type), int(0), int(0), int(begins[i]!)])
      }),
    ])
  const at = header([0, 0, 0]).length
  const begins = [at, at + rows * 8, at + (rows + columns) * 8]
  const axis = (count: number, first: number) => {
    const bytes = Buffer.alloc(count * 8)
    for (let i = 0; i < count; i++) bytes.writeDoubleBE(first + (i + 0.5) / 24, i * 8)
    return bytes
  }
  const file = await open(path, 'w')
  await file.write(Buffer.concat([header(begins), axis(rows, -90), axis(columns, -180)]))
  const row = Buffer.alloc(columns * 2)
  for (let r = 0; r < rows; r++) {
    for (let c = 0; c < columns; c++) row.writeInt16BE(stored(r, c), c * 2)
    await file.write(row)
  }
  await file.close()
}

async function writeHdf5(path: string): Promise<void> {
  const { File } = await hdf5Library()
  const file = new File(path, 'w')
  for (const [name, count, first, unit] of [['lat', rows, -90, 'degrees_north'], ['lon', columns, -180, 'degrees_east']] as const) {
    const set = file.create_dataset({ name, data: Float64Array.from({ length: count }, (_, i) => first + (i + 0.5) / 24), shape: [count] })
    set.make_scale(name)
    set.create_attribute('units', unit)
  }
  const data = new Int16Array(rows * columns)
  for (let i = 0; i < data.length; i++) data[i] = stored(Math.floor(i / columns), i % columns)
  const set = file.create_dataset({ name: 'chlor_a', data, shape: [rows, columns], chunks: [270, 540], compression: 1 })
  set.create_attribute('units', 'mg m-3')
  for (const [index, name] of ['lat', 'lon'].entries()) set.attach_scale(index, `/${name}`)
  file.close()
}

/** Deflated tiles of 240 by 240, in a north-up raster of degrees. */
async function writeTiff(path: string): Promise<void> {
  const side = 240
  const file = await open(path, 'w')
  await file.write(Buffer.alloc(8))
  const [offsets, sizes]: [number[], number[]] = [[], []]
  let at = 8
  for (let top = 0; top < rows; top += side) {
    for (let left = 0; left < columns; left += side) {
      const tile = new Int16Array(side * side)
      for (let i = 0; i < tile.length; i++) tile[i] = stored(top + Math.floor(i / side), left + (i % side))
      const packed = deflateSync(Buffer.from(tile.buffer), { level: 1 })
      await file.write(packed)
      offsets.push(at)
      sizes.push(packed.length)
      at += packed.length
    }
  }
  const longs = (values: number[]) => Buffer.from(Uint32Array.from(values).buffer)
  const shorts = (values: number[]) => Buffer.from(Uint16Array.from(values).buffer)
  const doubles = (values: number[]) => Buffer.from(Float64Array.from(values).buffer)
  const tags: [id: number, type: number, count: number, content: Buffer][] = [
    [256, 4, 1, longs([columns])], [257, 4, 1, longs([rows])], [258, 3, 1, shorts([16, 0])], [259, 3, 1, shorts([8, 0])],
    [262, 3, 1, shorts([1, 0])], [277, 3, 1, shorts([1, 0])], [322, 4, 1, longs([side])], [323, 4, 1, longs([side])],
    [324, 4, offsets.length, longs(offsets)], [325, 4, sizes.length, longs(sizes)], [339, 3, 1, shorts([2, 0])],
    [33550, 12, 3, doubles([1 / 24, 1 / 24, 0])], [33922, 12, 6, doubles([0, 0, 0, -180, 90, 0])],
    [34735, 3, 12, shorts([1, 1, 0, 2, 1024, 0, 1, 2, 2048, 0, 1, 4326])],
  ]
  let extra = at
  const entries = tags.map(([id, type, count, content]) => {
    const entry = Buffer.alloc(12)
    entry.writeUInt16LE(id, 0)
    entry.writeUInt16LE(type, 2)
    entry.writeUInt32LE(count, 4)
    if (content.length <= 4) content.copy(entry, 8)
    else {
      entry.writeUInt32LE(extra, 8)
      extra += content.length
    }
    return entry
  })
  await file.write(Buffer.concat(tags.flatMap(([, , , content]) => (content.length > 4 ? [content] : []))))
  await file.write(Buffer.concat([shorts([tags.length]), ...entries, longs([0])]))
  const head = Buffer.from('II*\0\0\0\0\0')
  head.writeUInt32LE(extra, 4)
  await file.write(head, 0, 8, 0)
  await file.close()
}

const formats = ['classic NetCDF', 'NetCDF-4', 'GeoTIFF']

describe('a global field of 4320 by 8640 cells', () => {
  it.each(formats)('is read whole from %s within 600 MB', async (format) => {
    const { stdout } = await promisify(execFile)(process.execPath, [bundle, paths[format]!])
    const { cells, last, peakMb } = JSON.parse(stdout) as { cells: number; last: number; peakMb: number }
    expect([cells, last]).toEqual([rows * columns, stored(rows - 1, columns - 1)])
    expect(peakMb).toBeLessThan(mostMb)
    console.info(`${format}: at most ${Math.round(peakMb)} MB`)
  }, 120_000)

  it.each(formats)('gives windows for 20 regions from %s without reading the field', async (format) => {
    const { size } = await stat(paths[format]!)
    const { readSync } = fs
    let bytes = 0
    fs.readSync = ((...all: Parameters<typeof readSync>) => {
      const count = readSync(...all)
      bytes += count
      return count
    }) as typeof readSync
    syncBuiltinESMExports()
    try {
      const source = await openGridSource(paths[format]!, format)
      for (let region = 0; region < 20; region++) {
        const window = { row: 200 + region * 190, column: 100 + region * 400, rows: 40, columns: 50 }
        const values = await source.readWindow(source.variables[0]!.name, 0, window)
        values.forEach((value, i) => {
          if (value !== stored(window.row + Math.floor(i / 50), window.column + (i % 50))) throw new Error(`region ${region}, cell ${i}: ${value}`)
        })
      }
      source.close()
    } finally {
      fs.readSync = readSync
      syncBuiltinESMExports()
    }
    expect(bytes).toBeGreaterThan(10_000)
    expect(bytes).toBeLessThan(size / 4)
    console.info(`${format}: ${Math.round(bytes / 1024)} of ${Math.round(size / 1024)} kB read for 20 windows`)
  })
})
