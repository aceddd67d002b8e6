import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { GridSource } from '../../../server/grids/grid-source'
import { openGridSource } from '../../../server/grids/read/open'
import { writeGeotiff } from '../../../server/grids/write/geotiff'
import type { GridFile } from '../../../server/grids/write/grid-file'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { writeNetcdfClassic } from '../../../server/grids/write/netcdf-classic'

const runs = process.env['CI'] ? 200 : 60
let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-round-'))
})
afterAll(() => rm(folder, { recursive: true }))

const missing = { weight: 2, arbitrary: fc.constant(NaN) }
/** All that 32 bits hold: the largest, the smallest, those below the normal ones, both zeros. */
const extreme = fc.oneof(
  missing,
  { weight: 6, arbitrary: fc.float({ noNaN: true, noDefaultInfinity: true }) },
  { weight: 2, arbitrary: fc.constantFrom(0, -0, 1.401298464324817e-45, 1.1754943508222875e-38, 3.4028234663852886e38, -3.4028234663852886e38, 1e-30, 16777217) },
)

const shape = fc.record({
  rows: fc.integer({ min: 2, max: 40 }), columns: fc.integer({ min: 2, max: 40 }), steps: fc.integer({ min: 1, max: 3 }),
  south: fc.integer({ min: -85, max: 48 }), west: fc.constantFrom(-180, -170, -12, 0, 21, 179, 340), step: fc.constantFrom(1 / 24, 0.1, 0.25, 1),
  // Cells of uneven height are as good as even ones.
  uneven: fc.boolean(), northFirst: fc.boolean(), eastFirst: fc.boolean(), clock: fc.boolean(), deflate: fc.constantFrom(undefined, 1, 9),
})
type Shape = typeof shape extends fc.Arbitrary<infer S> ? S : never

const cellsOf = ({ rows, columns, steps }: Shape) => rows * columns * steps

function fileOf(at: Shape, variable: Omit<GridFile['variables'][number], 'name' | 'attributes'>): GridFile {
  const up = Array.from({ length: at.rows }, (_, i) => at.south + (i + (at.uneven ? (i * i) / (4 * at.rows) : 0)) * Math.min(at.step, 0.8))
  const along = Array.from({ length: at.columns }, (_, i) => at.west + i * at.step)
  const begin = Date.UTC(2024, 1, 27) + (at.clock ? 45_296_000 : 0)
  return {
    latitudes: at.northFirst ? up.toReversed() : up,
    longitudes: at.eastFirst ? along.toReversed() : along,
    times: Array.from({ length: at.steps }, (_, i) => begin + i * 86_400_000),
    ...(at.deflate ? { deflate: at.deflate } : {}),
    variables: [{ name: 'chlor_a', attributes: { units: 'mg m-3' }, ...variable }],
  }
}

async function readBack(name: string, write: (path: string) => Promise<void>, check: (source: GridSource) => Promise<void>): Promise<void> {
  const path = join(folder, name)
  await write(path)
  const source = await openGridSource(path, name)
  try {
    await check(source)
  } finally {
    source.close()
  }
}

/** Centres of the cells read, each as far from the one written as rounding allows, whole turns of longitude aside. */
function samePlaces(edges: ArrayLike<number>, centres: ArrayLike<number>, even: boolean, round: boolean): void {
  expect(edges.length).toBe(centres.length + 1)
  for (let i = 0; i < centres.length; i++) {
    const [low, high] = [Math.min(edges[i]!, edges[i + 1]!), Math.max(edges[i]!, edges[i + 1]!)]
    const turn = round ? 360 * Math.round(((low + high) / 2 - centres[i]!) / 360) : 0
    if (even) expect((low + high) / 2 - turn).toBeCloseTo(centres[i]!, 9)
    else expect(centres[i]! >= low - turn && centres[i]! <= high - turn).toBe(true)
  }
}

async function sameTimesAndPlaces(source: GridSource, file: GridFile, { uneven }: Shape): Promise<void> {
  const { grid, times } = source.variables[0]!
  expect(times.map(({ observedAt }) => observedAt)).toEqual(file.times)
  if (grid.kind !== 'axes') throw new Error(`a grid of ${grid.kind}`)
  samePlaces(grid.latEdges, file.latitudes, !uneven, false)
  samePlaces(grid.lonEdges, file.longitudes, true, true)
}

async function valuesOf(source: GridSource): Promise<number[]> {
  const { name, grid, times } = source.variables[0]!
  const steps: number[] = []
  for (const step of times.keys()) steps.push(...(await source.readWindow(name, step, { row: 0, column: 0, rows: grid.rows, columns: grid.columns })))
  return steps
}

/** -0 and 0 are one number here. */
const plain = (values: Iterable<number>) => Array.from(values, (value) => value + 0)

describe.each([
  ['NetCDF-4', 'any.nc', writeNetcdf4],
  ['classic NetCDF', 'any-classic.nc', writeNetcdfClassic],
] as const)('any grid written as %s', (_, name, write) => {
  it('of floating-point numbers is the same when read back, to the last bit', async () => {
    const grids = shape.chain((at) => fc.tuple(fc.constant(at), fc.array(extreme, { minLength: cellsOf(at), maxLength: cellsOf(at), size: 'max' }), fc.constantFrom(undefined, -999, -1e30)))
    await fc.assert(
      fc.asyncProperty(grids, async ([at, values, fill]) => {
        const data = Float64Array.from(values, (value) => (value === fill ? NaN : Math.fround(value)))
        const file = fileOf(at, { dtype: 'f4', data, ...(fill === undefined ? {} : { fill }) })
        await readBack(name, (path) => write(path, file), async (source) => {
          await sameTimesAndPlaces(source, file, at)
          expect(plain(await valuesOf(source))).toEqual(plain(data))
        })
      }),
      { numRuns: runs, seed: 20261201 },
    )
  }, 300_000)

  it('packed in 16 bits is the same when read back, to rounding', async () => {
    const packed = fc.oneof(missing, { weight: 6, arbitrary: fc.integer({ min: -32_766, max: 32_767 }) }, { weight: 1, arbitrary: fc.constantFrom(-32_766, 32_767, 0) })
    const packing = fc.record({ scale: fc.constantFrom(1, 0.002, 1e-6, -0.5, 37.5), offset: fc.constantFrom(0, 20, -1e-3), fill: fc.constantFrom(undefined, -32_768, 0, 32_767) })
    const grids = shape.chain((at) => fc.tuple(fc.constant(at), packing, fc.array(packed, { minLength: cellsOf(at), maxLength: cellsOf(at), size: 'max' })))
    await fc.assert(
      fc.asyncProperty(grids, async ([at, { scale, offset, fill }, stored]) => {
        const data = Float64Array.from(stored, (number) => (number === fill ? NaN : number * scale + offset))
        const file = fileOf(at, { dtype: 'i2', data, scale, offset, ...(fill === undefined ? {} : { fill }) })
        await readBack(name, (path) => write(path, file), async (source) => {
          await sameTimesAndPlaces(source, file, at)
          const read = await valuesOf(source)
          expect(read.map(Number.isNaN)).toEqual(Array.from(data, Number.isNaN))
          const furthest = read.reduce((most, value, i) => Math.max(most, Number.isNaN(value) ? 0 : Math.abs(value - data[i]!)), 0)
          expect(furthest).toBeLessThanOrEqual(Math.abs(scale) * 1e-6)
        })
      }),
      { numRuns: runs, seed: 20261202 },
    )
  }, 300_000)

  it('with a single row or column is refused, as nobody says how large its cells are', async () => {
    for (const [latitudes, longitudes] of [[[50], [1, 2, 3]], [[50, 51], [1]], [[50], [1]]] as const) {
      const data = new Float64Array(latitudes.length * longitudes.length).fill(1)
      const file: GridFile = { latitudes, longitudes, times: [0], variables: [{ name: 'chlor_a', dtype: 'f4', data, attributes: { units: 'mg m-3' } }] }
      await expect(readBack(name, (path) => write(path, file), () => Promise.resolve())).rejects.toMatchObject({ code: expect.stringMatching(/unknown-place|no-grid/) })
    }
  })
})

describe('any raster written as GeoTIFF', () => {
  it('is the same when read back, to the last bit, in tiles and strips of any size', async () => {
    const rasters = fc
      .record({
        rows: fc.integer({ min: 1, max: 40 }), columns: fc.integer({ min: 1, max: 40 }), south: fc.integer({ min: -85, max: 40 }),
        west: fc.constantFrom(-180, -12, 0, 179), latStep: fc.constantFrom(1 / 24, 0.25, 1), lonStep: fc.constantFrom(0.1, 0.5, 1),
        tile: fc.constantFrom(undefined, 16, 32, 64), deflate: fc.boolean(), noData: fc.constantFrom(undefined, -999, -1e30, 0),
      })
      .chain((at) => fc.tuple(fc.constant(at), fc.array(extreme, { minLength: at.rows * at.columns, maxLength: at.rows * at.columns, size: 'max' })))
    await fc.assert(
      fc.asyncProperty(rasters, async ([{ tile, noData, south, ...at }, numbers]) => {
        const values = Float64Array.from(numbers, (value) => (value === noData ? NaN : Math.fround(value)))
        const raster = { ...at, north: south + at.rows * at.latStep, values, description: 'chlor_a', unit: 'mg m-3', ...(tile ? { tile } : {}), ...(noData === undefined ? {} : { noData }) }
        await readBack('any.tif', (path) => writeGeotiff(path, raster), async (source) => {
          const { grid } = source.variables[0]!
          if (grid.kind !== 'axes') throw new Error(`a grid of ${grid.kind}`)
          samePlaces(grid.latEdges, Array.from({ length: at.rows }, (_, i) => raster.north - (i + 0.5) * at.latStep), true, false)
          samePlaces(grid.lonEdges, Array.from({ length: at.columns }, (_, i) => at.west + (i + 0.5) * at.lonStep), true, true)
          expect(plain(await valuesOf(source))).toEqual(plain(values))
        })
      }),
      { numRuns: runs, seed: 20261203 },
    )
  }, 300_000)
})
