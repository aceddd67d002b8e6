import fs from 'node:fs'
import { mkdtemp, open, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { deflateSync, gzipSync } from 'node:zlib'
import { Dataset } from 'h5wasm/node'
import { afterAll, beforeAll, beforeEach, describe, expect, it, vi } from 'vitest'
import { hdf5Library } from '../../../server/grids/hdf5-library'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { gunzipBeside } from '../../../server/grids/read/gunzip'
import { openClassic } from '../../../server/grids/read/netcdf-classic'
import { openGridSource } from '../../../server/grids/read/open'
import { samplesOf } from '../../../server/grids/read/tiff-samples'
import { unpackBlock } from '../../../server/grids/read/tiff-unpack'

const reference = new URL('../../reference/grids/', import.meta.url).pathname
let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-formats-'))
})
beforeEach(async () => {
  for (const name of await readdir(folder)) await rm(join(folder, name))
})
afterAll(() => rm(folder, { recursive: true }))

async function keep(name: string, content: Buffer): Promise<string> {
  const path = join(folder, name)
  await writeFile(path, content)
  return path
}

async function firstCells(path: string): Promise<number[]> {
  const source = await openGridSource(path, 'sent')
  const { name } = source.variables[0]!
  const values = await source.readWindow(name, 0, { row: 1, column: 1, rows: 4, columns: 5 })
  source.close()
  return Array.from(values)
}

async function codeOf(work: Promise<unknown>): Promise<string> {
  const error = await work.then(
    () => null,
    (reason: unknown) => reason,
  )
  expect(error).toBeInstanceOf(LayerRefused)
  return (error as LayerRefused).code
}

describe('a file packed whole by gzip', () => {
  it.each(['classic-float.nc', 'nc4-packed-int16.nc', 'tiff-float32-nan.tif'])('%s reads as it does unpacked', async (name) => {
    const path = await keep(`${name}.gz`, gzipSync(await readFile(reference + name)))
    expect(await firstCells(path)).toEqual(await firstCells(reference + name))
  })

  it('leaves nothing beside it, even while it is open', async () => {
    const path = await keep('a.gz', gzipSync(await readFile(`${reference}nc4-packed-int16.nc`)))
    const source = await openGridSource(path, 'a.nc.gz')
    expect(await readdir(folder)).toEqual(['a.gz'])
    source.close()
  })

  it('may be made of several members', async () => {
    const whole = await readFile(`${reference}classic-float.nc`)
    const path = await keep('two.gz', Buffer.concat([gzipSync(whole.subarray(0, 900)), gzipSync(whole.subarray(900))]))
    expect(await firstCells(path)).toEqual(await firstCells(`${reference}classic-float.nc`))
  })

  it('is refused when it is cut, when its bytes were changed, and when it was packed twice', async () => {
    const packed = gzipSync(await readFile(`${reference}classic-float.nc`))
    expect(await codeOf(openGridSource(await keep('cut.gz', packed.subarray(0, packed.length - 30)), 'a'))).toMatch(/truncated|damaged/)
    expect(await codeOf(openGridSource(await keep('short.gz', packed.subarray(0, 10)), 'a'))).toBe('truncated')
    const changed = Buffer.from(packed)
    changed[changed.length - 7]! ^= 0x10
    expect(await codeOf(openGridSource(await keep('changed.gz', changed), 'a'))).toBe('damaged')
    expect(await codeOf(openGridSource(await keep('twice.gz', gzipSync(packed)), 'a'))).toBe('unsupported-encoding')
    expect((await readdir(folder)).sort()).toEqual(['changed.gz', 'cut.gz', 'short.gz', 'twice.gz'])
  })

  it('is refused by its declared size, and by its real size where the declared one lies', async () => {
    const bomb = gzipSync(Buffer.alloc(3_000_000))
    expect(await codeOf(gunzipBeside(await keep('bomb.gz', bomb), 'bomb', 1_000_000))).toBe('too-large')
    const lying = Buffer.from(bomb)
    lying.writeUInt32LE(1000, lying.length - 4)
    expect(await codeOf(gunzipBeside(await keep('lying.gz', lying), 'lying', 1_000_000))).toBe('too-large')
    expect((await readdir(folder)).sort()).toEqual(['bomb.gz', 'lying.gz'])
  })
})

const int = (n: number) => Buffer.from(Uint32Array.of(n).buffer).reverse()
const long = (n: bigint) => Buffer.from(BigUint64Array.of(n).buffer).reverse()
const word = (text: string) => Buffer.concat([int(text.length), Buffer.from(text.padEnd(Math.ceil(text.length / 4) * 4, '\0'))])

/** A classic header with a growing dimension t, a dimension x of 3 and variables of type short on (t, x). */
function header(version: 1 | 2, records: number, begins: bigint[]): Buffer {
  return Buffer.concat([
    Buffer.from([0x43, 0x44, 0x46, version]), int(records), int(10), int(2), word('t'), int(0), word('x'), int(3), int(0), int(0),
    int(11), int(begins.length),
    ...begins.map((begin, i) =>
      Buffer.concat([
        word(`v${i}`), int(2), int(0), int(1), int(0), int(0), int(3), int(8), version === 1 ? int(Number(begin)) : long(begin),
      ]),
    ),
  ])
}

const shorts = (...numbers: number[]) => Buffer.concat(numbers.map((n) => Buffer.from([n >> 8, n & 255])))

describe('a classic NetCDF file', () => {
  it('whose records were never counted has as many as arrived', async () => {
    const at = BigInt(header(1, 0, [0n, 0n]).length)
    const record = (n: number) => Buffer.concat([shorts(n, n + 1, n + 2), Buffer.alloc(2), shorts(n + 10, n + 11, n + 12), Buffer.alloc(2)])
    const bytes = Buffer.concat([header(1, 0xffffffff, [at, at + 8n]), record(100), record(200), record(300).subarray(0, 14)])
    const file = openClassic(await keep('s.nc', bytes), bytes.length)
    const [first, second] = file.variables
    expect(first!.dimensions[0]).toEqual({ name: 't', size: 3 })
    expect(Array.from(file.read(second!, [0, 0], [3, 3]))).toEqual([110, 111, 112, 210, 211, 212, 310, 311, 312])
    file.close()
  })

  it('is read beyond 4 GB', async () => {
    const far = 5n * 1024n ** 3n
    const path = await keep('far.nc', header(2, 1, [far]))
    const target = await open(path, 'r+')
    await target.write(shorts(7, 8, 9), 0, 6, Number(far))
    await target.close()
    const file = openClassic(path, Number(far) + 6)
    expect(Array.from(file.read(file.variables[0]!, [0, 0], [1, 3]))).toEqual([7, 8, 9])
    file.close()
  })

  it('with two growing dimensions, or an unknown type, is refused', async () => {
    const two = header(1, 1, [200n])
    two.writeUInt32BE(0, two.indexOf('x') + 4)
    expect(await codeOf((async () => openClassic(await keep('two.nc', two), two.length))())).toBe('damaged')
    const typed = header(1, 1, [200n])
    typed.writeUInt32BE(7, typed.length - 12)
    expect(await codeOf((async () => openClassic(await keep('type.nc', typed), typed.length))())).toBe('damaged')
  })
})

describe('blocks of a TIFF file', () => {
  const layout = { width: 4, height: 2, perCell: 1, bits: 32, format: 3, predictor: 3, littleEndian: false }
  const numbers = [1.5, -2.25, 3e-7, 4e12, 0, 1, NaN, 7]

  /** Written by the technical note: planes of bytes, most significant first, then differences along the row. */
  function withFloatPredictor(): Buffer {
    const rows = [numbers.slice(0, 4), numbers.slice(4)].map((row) => {
      const big = Buffer.alloc(16)
      row.forEach((value, i) => big.writeFloatBE(value, i * 4))
      const planes = Buffer.from(Array.from({ length: 16 }, (_, i) => big[(i % 4) * 4 + Math.floor(i / 4)]!))
      return Buffer.from(planes.map((byte, i) => byte - (i > 0 ? planes[i - 1]! : 0)))
    })
    return Buffer.concat(rows)
  }

  it.each([true, false])('undo predictor 3, whose planes do not follow the byte order (little-endian: %s)', (littleEndian) => {
    const samples = samplesOf(withFloatPredictor(), { ...layout, littleEndian })
    expect(Array.from(samples)).toEqual(Array.from(Float32Array.from(numbers)))
  })

  it('undo predictor 2 modulo the size of the number', () => {
    const bytes = shorts(65000, 1000, 65535, 1, 5, 5, 5, 5)
    const samples = samplesOf(bytes, { ...layout, bits: 16, format: 1, predictor: 2 })
    expect(Array.from(samples)).toEqual([65000, 464, 463, 464, 5, 10, 15, 20])
  })

  it('hold numbers of one bit, four bits and half precision', () => {
    expect(Array.from(samplesOf(Buffer.from([0b10100000, 0b01010000]), { ...layout, bits: 1, format: 1, predictor: 1 }))).toEqual([1, 0, 1, 0, 0, 1, 0, 1])
    expect(Array.from(samplesOf(Buffer.from([0x12, 0x34, 0xab, 0xcd]), { ...layout, bits: 4, format: 1, predictor: 1 }))).toEqual([1, 2, 3, 4, 10, 11, 12, 13])
    const half = samplesOf(shorts(0x3c00, 0xc000, 0x7c00, 0x0001, 0, 0x3555, 0xfbff, 0x7e00), { ...layout, bits: 16, predictor: 1 })
    expect(Array.from(half)).toEqual([1, -2, Infinity, 2 ** -24, 0, 0.333251953125, -65504, NaN])
  })

  it('never become longer than their size', () => {
    expect(() => unpackBlock(deflateSync(Buffer.alloc(100_000)), 8, 1000)).toThrow()
    expect(() => unpackBlock(Buffer.from([0x81, 1, 0x81, 2]), 32773, 200)).toThrow('longer')
    expect(unpackBlock(Buffer.from([0xfe, 9, 1, 4, 5]), 32773, 200)).toEqual(Uint8Array.of(9, 9, 9, 4, 5))
  })
})

describe('an HDF5 file', () => {
  it('that cannot be opened is refused without a page on the error output', async () => {
    const whole = await readFile(`${reference}nc4-group.nc`)
    const path = await keep('broken.nc', Buffer.concat([whole.subarray(0, 48), Buffer.alloc(whole.length, 7)]))
    const written = vi.spyOn(fs, 'writeSync')
    expect(await codeOf(openGridSource(path, 'broken.nc'))).toBe('damaged')
    expect(written.mock.calls.filter(([descriptor]) => descriptor === 2)).toEqual([])
    written.mockRestore()
  })

  it.each([
    { how: 'by the reader of our own', userBlock: 0, librarySlices: 0 },
    { how: 'by the library, behind a user block', userBlock: 512, librarySlices: 2 },
  ])('whose chunks hold many steps unpacks each chunk once, $how', async ({ userBlock, librarySlices }) => {
    const path = join(folder, `steps-${userBlock}.nc`)
    const { File } = await hdf5Library()
    const file = new File(path, 'w')
    const axis = (name: string, values: number[], units: string) => {
      const set = file.create_dataset({ name, data: Float64Array.from(values), shape: [values.length] })
      set.make_scale(name)
      set.create_attribute('units', units)
    }
    axis('time', [0, 1, 2, 3, 4, 5], 'days since 2024-01-01')
    axis('lat', [1, 2, 3], 'degrees_north')
    axis('lon', [1, 2, 3, 4], 'degrees_east')
    const data = Float32Array.from({ length: 72 }, (_, i) => i)
    const set = file.create_dataset({ name: 'chlor_a', data, shape: [6, 3, 4], chunks: [4, 2, 2], compression: 4 })
    set.create_attribute('units', 'mg m-3')
    for (const [index, name] of ['time', 'lat', 'lon'].entries()) set.attach_scale(index, `/${name}`)
    file.close()
    await writeFile(path, Buffer.concat([Buffer.alloc(userBlock), await readFile(path)]))

    const source = await openGridSource(path, 'steps.nc')
    const slices = vi.spyOn(Dataset.prototype, 'slice')
    for (let step = 0; step < 6; step++) {
      const values = await source.readWindow('chlor_a', step, { row: 1, column: 1, rows: 2, columns: 3 })
      expect(Array.from(values)).toEqual([5, 6, 7, 9, 10, 11].map((i) => step * 12 + i))
    }
    expect(slices).toHaveBeenCalledTimes(librarySlices)
    slices.mockRestore()
    source.close()
  })
})
