import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { CellGroups } from '../../../server/grids/found-cells'
import { inspectGrid } from '../../../server/grids/inspect'
import { valueHistogram } from '../../../server/grids/value-histogram'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import type { GridFile } from '../../../server/grids/write/grid-file'

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-first-step-'))
})
afterAll(() => rm(folder, { recursive: true }))

/** Two rows of five cells, one step. */
async function written(variables: GridFile['variables'], globalAttributes: Record<string, string> = {}) {
  const path = join(folder, 'grid.nc')
  await writeNetcdf4(path, { latitudes: [50, 51], longitudes: [-12, -11, -10, -9, -8], times: [Date.UTC(2026, 5, 10)], variables, globalAttributes })
  return inspectGrid(path, 'grid.nc')
}

const sines = Array.from({ length: 1000 }, (_, i) => Math.sin(i))

describe('the histogram of values', () => {
  // numpy 1.24.2, tests/reference/make/value-histogram.py
  it('of logarithms counts in twentieths of a decade as numpy.histogram does', () => {
    const found = valueHistogram(Float64Array.from(sines, (sine) => 10 ** (1.5 * sine)).sort(), 'log10')!
    expect(found).toMatchObject({ scale: 'log10', step: 0.05, firstBin: -30, below: 0, above: 0 })
    expect(found.counts).toEqual([82, 34, 26, 24, 19, 21, 17, 13, 18, 14, 12, 16, 12, 13, 11, 14, 12, 10, 12, 12, 11, 10, 11, 12, 12, 7, 11, 12, 12, 10, 9, 12, 12, 11, 8, 11, 12, 12, 10, 12, 12, 11, 10, 11, 16, 11, 13, 12, 14, 13, 15, 18, 12, 18, 19, 19, 24, 27, 33, 83])
    const [p10, median, p90] = [0.037448290205917244, 0.9998958905117438, 26.70262959053671]
    expect(found.p10).toBeCloseTo(p10!, 12)
    expect(found.median).toBeCloseTo(median!, 12)
    expect(found.p90).toBeCloseTo(p90!, 10)
  })

  it('of plain values counts in even bins as numpy.histogram does', () => {
    const found = valueHistogram(Float64Array.from(sines, (sine) => 3 * sine + 0.5).sort(), 'linear')!
    expect(found).toMatchObject({ scale: 'linear', step: 0.1, firstBin: -25, below: 0, above: 0 })
    expect(found.counts).toEqual([82, 34, 26, 24, 19, 21, 17, 13, 18, 14, 12, 16, 12, 13, 11, 14, 12, 10, 12, 12, 11, 10, 11, 12, 12, 7, 11, 12, 12, 10, 9, 12, 12, 11, 8, 11, 12, 12, 10, 12, 12, 11, 10, 11, 16, 11, 13, 12, 14, 13, 15, 18, 12, 18, 19, 19, 24, 27, 33, 83])
  })

  it('puts a value on an edge into the bin above it', () => {
    expect(valueHistogram(Float64Array.of(0.1, 1, 10), 'log10')).toMatchObject({ firstBin: -20, counts: [1, ...Array<number>(19).fill(0), 1, ...Array<number>(19).fill(0), 1] })
    expect(valueHistogram(Float64Array.of(0.1, 0.2, 0.3), 'linear')).toMatchObject({ step: 0.005, firstBin: 20 })
  })

  it('of logarithms keeps zero, negative and enormous values apart', () => {
    expect(valueHistogram(Float64Array.of(-1, 0, 0.0001, 1, 5000), 'log10')).toMatchObject({ below: 3, above: 1, firstBin: 0, counts: [1] })
  })

  it('of plain values leaves what lies far out undrawn, and says how many', () => {
    const values = Float64Array.from([...sines, 900, -700]).sort()
    expect(valueHistogram(values, 'linear')).toMatchObject({ above: expect.any(Number), step: 0.05 })
    const { counts, below, above } = valueHistogram(values, 'linear')!
    expect(above).toBeGreaterThanOrEqual(1)
    expect(below).toBeGreaterThanOrEqual(1)
    expect(below + above).toBeLessThan(12)
    expect(counts.reduce((sum, count) => sum + count, 0) + below + above).toBe(1002)
  })

  it('of one value everywhere has one bin, and of none there is no histogram', () => {
    expect(valueHistogram(Float64Array.of(7, 7, 7), 'linear')!.counts).toEqual([3])
    expect(valueHistogram(Float64Array.of(0, 0), 'linear')!.counts).toEqual([2])
    expect(valueHistogram(new Float64Array(0), 'log10')).toBeNull()
  })
})

describe('cells by what speaks against them', () => {
  it('are grouped by all the flags they carry and by what the file holds', async () => {
    const report = await written([
      {
        name: 'chlor_a', dtype: 'f4', data: Float64Array.of(1, 2, NaN, NaN, 5, 6, 70, 8, NaN, 10),
        attributes: { units: 'mg m-3', valid_max: 50, ancillary_variables: 'quality' },
      },
      { name: 'quality', dtype: 'u1', data: Float64Array.of(0, 1, 1, 3, 0, 2, 0, 0, 0, 3), attributes: { flag_masks: '1b, 2b', flag_meanings: 'CLOUD GLINT' } },
    ])
    const { found, flags, valid, cells } = report.variables[0]!
    expect({ cells, valid }).toEqual({ cells: 10, valid: 6 })
    expect(flags).toEqual([{ meaning: 'CLOUD', cells: 4 }, { meaning: 'GLINT', cells: 3 }])
    expect(found.reasons).toEqual(['CLOUD', 'GLINT'])
    expect(found.groups).toHaveLength(4)
    expect(found.groups).toEqual(
      expect.arrayContaining([
        { carry: [], value: 3, missing: 1, outside: 1 },
        { carry: [0], value: 1, missing: 1, outside: 0 },
        { carry: [1], value: 1, missing: 0, outside: 0 },
        { carry: [0, 1], value: 1, missing: 1, outside: 0 },
      ]),
    )
  })

  it('that were filled in are one reason, whatever marks them', async () => {
    const report = await written([
      { name: 'chlor_a', dtype: 'f4', data: new Float64Array(10).fill(2), attributes: { units: 'mg m-3', ancillary_variables: 'quality' } },
      { name: 'quality', dtype: 'u1', data: Float64Array.of(0, 1, 1, 3, 0, 2, 0, 0, 0, 3), attributes: { flag_masks: '1b, 2b', flag_meanings: 'CLOUD gap_filled' } },
    ])
    expect(report.variables[0]).toMatchObject({ gapFilled: 'marked', found: { reasons: ['CLOUD', 'gap_filled', 'filled in, not seen'] } })
  })

  it('of the rarest mixtures of many flags are only counted', () => {
    const groups = new CellGroups()
    const cells = 5000
    const meanings = Array.from({ length: 12 }, (_, bit) => ({ name: `F${bit}`, mask: 2 ** bit }))
    groups.add(new Uint8Array(cells), [{ cells: { raw: Uint32Array.from({ length: cells }, (_, i) => i % 4096), high: null, missing: null }, meanings, filled: false }])
    const found = groups.found()
    expect(found.groups).toHaveLength(200)
    expect(found.groups.reduce((sum, group) => sum + group.value, found.unlisted.value)).toBe(cells)
    expect(groups.countOf('F0')).toBe(2500)
  })

  it('tell bit 63 of long flags from bit 31', () => {
    const groups = new CellGroups()
    const flags = { raw: Uint32Array.of(2 ** 31, 0, 0), high: Uint32Array.of(0, 2 ** 31, 0), missing: null }
    groups.add(new Uint8Array(3), [{ cells: flags, meanings: [{ name: 'LOW', mask: 2 ** 31 }, { name: 'HIGH', mask: 2 ** 63 }], filled: false }])
    expect(groups.found().groups.map(({ carry }) => carry)).toEqual([[0], [1], []])
  })
})

describe('axes as found', () => {
  const axesOf = async (name: string) => (await inspectGrid(`tests/reference/grids/${name}`, name)).variables[0]!.axes
  const degreesNorth = { role: 'latitude', coordinate: 'lat', unit: 'degrees_north' }
  const degreesEast = { role: 'longitude', coordinate: 'lon', unit: 'degrees_east' }
  // First, last and spacing as xarray of Debian 12 reads these files, undecoded; rasterio 1.3.5 for the GeoTIFFs.
  it('come in the file’s order with first, last, spacing and direction', async () => {
    expect(await axesOf('nc4-21-to-379.nc')).toMatchObject([
      { dimension: 'time', role: 'time', size: 1, first: 19844, last: 19844, spacing: null, direction: null, unit: 'days since 1970-01-01' },
      { ...degreesNorth, size: 18, first: 85, last: -85, spacing: 10, direction: 'descending' },
      { ...degreesEast, size: 36, first: 25, last: 375, spacing: 10, direction: 'ascending' },
    ])
    expect(await axesOf('nc4-lat-lon-time.nc')).toMatchObject([
      { ...degreesNorth, size: 16, first: 58.125, last: 61.875, spacing: 0.25 },
      { ...degreesEast, size: 20, first: 2.125, last: 6.875, spacing: 0.25 },
      { role: 'time', size: 3, first: 19844, last: 19846, spacing: 1, direction: 'ascending' },
    ])
    expect((await axesOf('nc4-lon-descending.nc'))[2]).toMatchObject({ ...degreesEast, first: 6.8, last: 2.25, spacing: 0.35, direction: 'descending' })
    expect((await axesOf('nc4-depth.nc'))[1]).toMatchObject({ dimension: 'depth', role: 'level', size: 1, first: 0, unit: 'm' })
  })

  it('of a GeoTIFF are the middles of its rows and columns, in degrees or in the plane of its projection', async () => {
    expect(await axesOf('tiff-float32-nan.tif')).toMatchObject([
      { dimension: 'row', role: 'latitude', size: 16, first: 61.875, last: 58.125, spacing: 0.25, direction: 'descending' },
      { dimension: 'column', role: 'longitude', size: 20, first: 2.125, last: 6.875, spacing: 0.25, direction: 'ascending' },
    ])
    expect(await axesOf('tiff-utm32.tif')).toMatchObject([
      { role: 'projected', size: 60, first: 6856000, last: 6384000, spacing: 8000, unit: 'm' },
      { role: 'projected', size: 50, first: 94000, last: 486000, spacing: 8000 },
    ])
  })

  it('without coordinates of their own say so', async () => {
    const axes = await axesOf('nc4-curvilinear.nc')
    expect(axes.filter((axis) => axis.role === 'other')).toHaveLength(2)
  })
})

describe('attributes as found', () => {
  it('are text as they stand, markup too; long ones are cut with their length said', async () => {
    const report = await written(
      [{ name: 'chlor_a', dtype: 'f4', data: new Float64Array(10).fill(1), attributes: { units: 'mg m-3', comment: '<b>bold</b>' } }],
      { history: 'x'.repeat(1234), title: 'Sea' },
    )
    const { items } = report.attributes
    expect(items.find(({ name }) => name === 'title')).toEqual({ name: 'title', value: 'Sea', length: null })
    expect(items.find(({ name }) => name === 'history')).toEqual({ name: 'history', value: 'x'.repeat(500), length: 1234 })
    expect(report.variables[0]!.attributes.items).toContainEqual({ name: 'comment', value: '<b>bold</b>', length: null })
  })

  it('beyond a bounded number are only counted', async () => {
    const many = Object.fromEntries(Array.from({ length: 130 }, (_, i) => [`note_${i}`, 'y']))
    const report = await written([{ name: 'chlor_a', dtype: 'f4', data: new Float64Array(10).fill(1), attributes: { units: 'mg m-3' } }], many)
    expect(report.attributes.items).toHaveLength(100)
    expect(report.attributes.leftOut).toBeGreaterThanOrEqual(30)
  })
})
