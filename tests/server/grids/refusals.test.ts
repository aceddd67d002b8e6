import { copyFile, mkdtemp, readFile, rm, truncate, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { GridSource } from '../../../server/grids/grid-source'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { openGridSource } from '../../../server/grids/read/open'
import type { GridFile } from '../../../server/grids/write/grid-file'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { writeNetcdfClassic } from '../../../server/grids/write/netcdf-classic'
import { writeGeotiff } from '../../../server/grids/write/geotiff'

const reference = new URL('../../reference/grids/', import.meta.url).pathname
let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-grids-'))
})
afterAll(() => rm(folder, { recursive: true }))

const grid = (count: number): GridFile => ({
  latitudes: Array.from({ length: 40 }, (_, i) => 50 + i / 10),
  longitudes: Array.from({ length: 50 }, (_, i) => 4 + i / 10),
  times: Array.from({ length: count }, (_, i) => Date.UTC(2024, 4, 1 + i)),
  deflate: 6,
  variables: [
    {
      name: 'chlor_a',
      dtype: 'f4',
      data: Float64Array.from({ length: count * 2000 }, (_, i) => 1 + Math.abs(Math.sin(i * i))),
      attributes: { units: 'mg m-3' },
    },
  ],
})

async function refusal(path: string, name = 'sent.nc'): Promise<LayerRefused> {
  let source: GridSource | null = null
  try {
    source = await openGridSource(path, name)
    for (const variable of source.variables) {
      const { rows, columns } = variable.grid
      for (const step of variable.times.keys()) {
        await source.readWindow(variable.name, step, { row: 0, column: 0, rows, columns })
      }
    }
  } catch (error) {
    expect(error).toBeInstanceOf(LayerRefused)
    return error as LayerRefused
  } finally {
    source?.close()
  }
  throw new Error(`${name} was read`)
}

async function refusalOf(content: string | Buffer, name?: string): Promise<LayerRefused> {
  const path = join(folder, 'file')
  await writeFile(path, content)
  return refusal(path, name)
}

describe('a file that is no grid', () => {
  it('is refused when it is empty', async () => {
    expect(await refusalOf('')).toMatchObject({ code: 'empty-file', message: 'This file is empty.' })
  })

  it('is refused when it is text named .nc', async () => {
    expect(await refusalOf('lat,lon,chl\n60,4,1.2\n', 'chl.nc')).toMatchObject({
      code: 'unknown-format',
      message: 'This is not a NetCDF or GeoTIFF file: it begins with text.',
      facts: { fileName: 'chl.nc' },
    })
  })

  it('is refused when it is a web page, whatever the case of its tags', async () => {
    const refused = await refusalOf('\n<!DOCTYPE html>\n<html><body>Sign in</body></html>')
    expect(refused).toMatchObject({ code: 'unknown-format' })
    expect(refused.message).toContain('is a web page')
  })

  it.each([
    [Buffer.from('\x89PNG\r\n\x1a\n', 'latin1'), 'a PNG picture'],
    [Buffer.from([0, 1, 2, 3, 250, 251]), 'bytes that belong to no format'],
  ])('is named for what it is: %s', async (content, what) => {
    expect((await refusalOf(content)).message).toContain(what)
  })

  it.each([
    [Buffer.from('CDF\x06\0\0\0\0', 'latin1'), 'version is unknown'],
  ])('is refused clearly in an encoding that is not read: %s', async (content, what) => {
    const refused = await refusalOf(content)
    expect(refused.code).toBe('unsupported-encoding')
    expect(refused.message).toContain(what)
  })
})

describe('a file that did not arrive whole', () => {
  it.each(['nc4-packed-int16.nc', 'classic-float.nc', 'tiff-float32-nan.tif', 'tiff-big-float64-zstd.tif',
    'tiff-float32-deflate-predictor3-tiled.tif', 'classic-64bit-odd.nc'])('%s is refused wherever it is cut', async (name) => {
    const path = join(folder, name)
    const whole = await readFile(reference + name)
    const codes = new Set<string>()
    for (const share of [0.002, 0.01, 0.05, 0.2, 0.4, 0.6, 0.8, 0.95, 0.999]) {
      await copyFile(reference + name, path)
      await truncate(path, Math.floor(whole.length * share))
      codes.add((await refusal(path, name)).code)
    }
    expect([...codes].filter((code) => !['truncated', 'unknown-format', 'empty-file'].includes(code))).toEqual([])
    expect(codes).toContain('truncated')
  })

  it('says how much is missing', async () => {
    const path = join(folder, 'cut.nc')
    await writeNetcdfClassic(path, grid(3))
    const size = (await readFile(path)).length
    await truncate(path, size - 100)
    const refused = await refusal(path)
    expect(refused).toMatchObject({ code: 'truncated', facts: { neededBytes: size, fileSize: size - 100 } })
    expect(refused.message).toContain('chlor_a should reach to byte')
  })
})

describe('a file whose bytes were damaged', () => {
  it('is refused when a deflate chunk of HDF5 no longer unpacks, instead of giving old memory as data', async () => {
    const path = join(folder, 'damaged.nc')
    await writeNetcdf4(path, grid(1))
    const bytes = await readFile(path)
    // A zlib stream of level 6 begins 78 5e (or 9c); the chunk is by far the longest.
    const start = Math.max(bytes.lastIndexOf(Buffer.from([0x78, 0x5e])), bytes.lastIndexOf(Buffer.from([0x78, 0x9c])))
    expect(start).toBeGreaterThan(0)
    bytes.fill(0xa5, start + 200, start + 400)
    await writeFile(path, bytes)
    const refused = await refusal(path)
    expect(refused.code).toBe('damaged')
    expect(refused.message).toBe('The file is damaged: chlor_a cannot be read back whole.')
  })

  it('is still read in the next file after a damaged one', async () => {
    const path = join(folder, 'good.nc')
    await writeNetcdf4(path, grid(1))
    const source = await openGridSource(path, 'good.nc')
    const values = await source.readWindow('chlor_a', 0, { row: 0, column: 1, rows: 1, columns: 1 })
    expect(values[0]).toBeCloseTo(1 + Math.sin(1), 6)
    source.close()
  })

  it('is refused when a deflate strip of TIFF no longer unpacks', async () => {
    const path = join(folder, 'damaged.tif')
    const values = Float64Array.from({ length: 2000 }, (_, i) => Math.abs(Math.sin(i * i)))
    const raster = { rows: 40, columns: 50, west: 4, north: 54, lonStep: 0.1, latStep: 0.1, values, deflate: true }
    await writeGeotiff(path, raster)
    const bytes = await readFile(path)
    bytes.fill(0xa5, bytes.length - 500, bytes.length - 300)
    await writeFile(path, bytes)
    expect((await refusal(path)).code).toBe('damaged')
  })
})

describe('a grid without a place', () => {
  it('is refused when a TIFF carries no georeference', async () => {
    const path = join(folder, 'bare.tif')
    const raster = { rows: 4, columns: 5, west: 4, north: 54, lonStep: 0.1, latStep: 0.1, values: new Float64Array(20) }
    await writeGeotiff(path, raster)
    const bytes = await readFile(path)
    // The three placing tags become private ones that nobody reads.
    for (const [tag, other] of [[33550, 65000], [33922, 65001], [34735, 65002]] as const) {
      const at = bytes.indexOf(Buffer.from(Uint16Array.of(tag).buffer))
      bytes.writeUInt16LE(other, at)
    }
    await writeFile(path, bytes)
    expect(await refusal(path, 'bare.tif')).toMatchObject({ code: 'unknown-place', facts: { fileName: 'bare.tif' } })
  })

  it('is refused when latitudes leave the globe', async () => {
    const path = join(folder, 'beyond.nc')
    await writeNetcdfClassic(path, { ...grid(1), latitudes: Array.from({ length: 40 }, (_, i) => 60 + i) })
    const refused = await refusal(path)
    expect(refused.code).toBe('unknown-place')
    expect(refused.message).toContain('lat holds 99, beyond the poles')
  })

  it('is refused when an axis turns back', async () => {
    const path = join(folder, 'turning.nc')
    const longitudes = Array.from({ length: 50 }, (_, i) => 4 + Math.abs(i - 25) / 10)
    await writeNetcdfClassic(path, { ...grid(1), longitudes })
    expect((await refusal(path)).message).toContain('lon does not run steadily in one direction')
  })
})
