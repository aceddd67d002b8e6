import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import fc from 'fast-check'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { describeGrid } from '../../../server/grids/describe-grid'
import { decodeGrid, encodeGrid, gridFingerprint } from '../../../server/grids/grid-text'
import { inspectGrid } from '../../../server/grids/inspect'
import { edgesFromBounds, edgesFromCentres, unwrapLongitudes } from '../../../server/grids/read/cf-edges'
import { openClassic } from '../../../server/grids/read/netcdf-classic'
import { openGridSource } from '../../../server/grids/read/open'
import { projectTo, unprojectFrom } from '../../../server/grids/read/project'
import { writeGeotiff } from '../../../server/grids/write/geotiff'
import { type GridFile, packValues } from '../../../server/grids/write/grid-file'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { writeNetcdfClassic } from '../../../server/grids/write/netcdf-classic'

let folder: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-grids-'))
})
afterAll(() => rm(folder, { recursive: true }))

const value = fc.oneof(
  { weight: 1, arbitrary: fc.constant(NaN) },
  { weight: 5, arbitrary: fc.integer({ min: 0, max: 30_000 }).map((n) => n / 100) },
)
const gridFile = fc
  .record({
    rows: fc.integer({ min: 2, max: 7 }), columns: fc.integer({ min: 2, max: 7 }), steps: fc.integer({ min: 1, max: 4 }), composite: fc.boolean(),
    south: fc.integer({ min: -80, max: 70 }), west: fc.integer({ min: -180, max: 179 }), step: fc.constantFrom(0.05, 0.25, 1),
    descending: fc.boolean(), deflate: fc.constantFrom(undefined, 1, 6), dtype: fc.constantFrom('i2' as const, 'f4' as const),
  })
  .chain((shape) => {
    const cells = shape.rows * shape.columns * shape.steps
    return fc.array(value, { minLength: cells, maxLength: cells }).map((values): GridFile => {
      const up = Array.from({ length: shape.rows }, (_, i) => shape.south + i * shape.step)
      return {
        latitudes: shape.descending ? up.toReversed() : up,
        longitudes: Array.from({ length: shape.columns }, (_, i) => shape.west + i * shape.step),
        times: Array.from({ length: shape.steps }, (_, i) => Date.UTC(2024, 0, 1 + i)),
        deflate: shape.deflate,
        ...(shape.composite ? { timeBounds: Array.from({ length: shape.steps }, (_, i) => [Date.UTC(2024, 0, 1 + i), Date.UTC(2024, 0, 9 + i)] as const) } : {}),
        variables: [
          {
            name: 'chlor_a', dtype: shape.dtype, data: Float64Array.from(values),
            ...(shape.dtype === 'i2' ? { scale: 0.01, offset: 0 } : {}), attributes: { units: 'mg m-3' },
          },
        ],
      }
    })
  })

describe('any grid that is written', () => {
  it.each([['NetCDF-4', writeNetcdf4], ['classic NetCDF', writeNetcdfClassic]])('is the same when read back from %s', async (_, write) => {
    await fc.assert(
      fc.asyncProperty(gridFile, async (file) => {
        const path = join(folder, 'any.nc')
        await write(path, file)
        const source = await openGridSource(path, 'any.nc')
        const variable = source.variables[0]!
        const [rows, columns] = [file.latitudes.length, file.longitudes.length]
        expect(variable.times.map(({ observedAt, hasClock }) => [observedAt, hasClock])).toEqual(file.times.map((t) => [t, false]))
        expect(variable.times.map(({ endsAt }) => endsAt)).toEqual(file.times.map((t) => (file.timeBounds ? t + 8 * 86_400_000 : null)))
        const { grid } = variable
        const south = Math.min(...Array.from(file.latitudes))
        expect(grid.kind === 'axes' && Math.min(...grid.latEdges)).toBeCloseTo(south - Math.abs(file.latitudes[1]! - file.latitudes[0]!) / 2, 9)
        for (const step of file.times.keys()) {
          const read = await source.readWindow('chlor_a', step, { row: 0, column: 0, rows, columns })
          const wanted = file.variables[0]!.data.subarray(step * rows * columns, (step + 1) * rows * columns)
          read.forEach((cell, i) => {
            if (Number.isNaN(wanted[i])) expect(cell).toBeNaN()
            else expect(Math.abs(cell - wanted[i]!)).toBeLessThan(1e-7 * Math.max(1, wanted[i]!))
          })
        }
        source.close()
      }),
      { numRuns: 40, seed: 7 },
    )
  })

  const raster = fc
    .record({
      rows: fc.integer({ min: 1, max: 40 }), columns: fc.integer({ min: 1, max: 40 }), south: fc.integer({ min: -80, max: 60 }),
      west: fc.integer({ min: -180, max: 179 }), latStep: fc.constantFrom(0.05, 0.25, 0.5), lonStep: fc.constantFrom(0.1, 0.25, 1),
      tile: fc.constantFrom(undefined, 16, 32), deflate: fc.boolean(), noData: fc.constantFrom(undefined, -999, 0),
    })
    .chain((shape) => {
      const cells = shape.rows * shape.columns
      // Eighths are exact in 32 bits; 0 is left to the files that call it missing.
      const eighths = fc.oneof({ weight: 1, arbitrary: fc.constant(NaN) }, { weight: 5, arbitrary: fc.integer({ min: 1, max: 4000 }).map((n) => n / 8) })
      return fc.array(eighths, { minLength: cells, maxLength: cells }).map((values) => ({ ...shape, values: Float64Array.from(values) }))
    })

  it('is the same when read back from GeoTIFF, in tiles and in strips, with and without deflate', async () => {
    await fc.assert(
      fc.asyncProperty(raster, async ({ south, tile, noData, ...rest }) => {
        const path = join(folder, 'any.tif')
        const north = south + rest.rows * rest.latStep
        await writeGeotiff(path, {
          ...rest, north, description: 'chlor_a', unit: 'mg m-3', ...(tile ? { tile } : {}), ...(noData === undefined ? {} : { noData }),
        })
        const source = await openGridSource(path, 'any.tif')
        const { grid } = source.variables[0]!
        const read = await source.readWindow('chlor_a', 0, { row: 0, column: 0, rows: rest.rows, columns: rest.columns })
        expect(read).toEqual(rest.values)
        expect(grid.kind === 'axes' && grid.latEdges[0]).toBe(north)
        expect(grid.kind === 'axes' && grid.lonEdges[rest.columns]).toBeCloseTo(rest.west + rest.columns * rest.lonStep, 9)
        source.close()
      }),
      { numRuns: 40, seed: 11 },
    )
  })

  it('refuses a value that its packed form cannot hold, rather than store another', () => {
    const pack = (number: number) => packValues({ name: 'v', dtype: 'i2', data: Float64Array.of(number), scale: 0.01 })
    expect(() => pack(400)).toThrow(RangeError)
    expect(Array.from(pack(-1.5))).toEqual([-150])
  })
})

describe('cell edges', () => {
  it('are midpoints, the outermost mirrored', () => {
    expect(Array.from(edgesFromCentres(Float64Array.of(1, 2, 4)))).toEqual([0.5, 1.5, 3, 5])
    expect(Array.from(edgesFromCentres(Float64Array.of(4, 2, 1)))).toEqual([5, 3, 1.5, 0.5])
  })

  it('come from bounds whichever way each pair is written', () => {
    const centres = Float64Array.of(3, 2, 1)
    const wanted = [3.6, 2.4, 1.5, 0.5]
    expect(Array.from(edgesFromBounds(Float64Array.of(3.6, 2.4, 2.4, 1.5, 1.5, 0.5), centres)!)).toEqual(wanted)
    expect(Array.from(edgesFromBounds(Float64Array.of(2.4, 3.6, 1.5, 2.4, 0.5, 1.5), centres)!)).toEqual(wanted)
  })

  it('do not come from bounds with gaps, or that miss their centre', () => {
    expect(edgesFromBounds(Float64Array.of(0, 1, 2, 3), Float64Array.of(0.5, 2.5))).toBeNull()
    expect(edgesFromBounds(Float64Array.of(0, 1, 1, 2), Float64Array.of(0.5, 2.5))).toBeNull()
  })

  it('run on across 180 and 360 degrees', () => {
    expect(Array.from(unwrapLongitudes(Float64Array.of(170, 180, -170, -160)))).toEqual([170, 180, 190, 200])
    expect(Array.from(unwrapLongitudes(Float64Array.of(340, 350, 0, 10)))).toEqual([340, 350, 360, 370])
    expect(Array.from(unwrapLongitudes(Float64Array.of(-170, 180, 170)))).toEqual([-170, -180, -190])
  })

  it('are cut at the poles', async () => {
    const path = join(folder, 'poles.nc')
    await writeNetcdfClassic(path, {
      latitudes: [90, 0, -90], longitudes: [0, 90, 180, 270, 360], times: [0],
      variables: [{ name: 'chlor_a', dtype: 'f4', data: new Float64Array(15), attributes: { units: 'mg m-3' } }],
    })
    const source = await openGridSource(path, 'poles.nc')
    const { grid } = source.variables[0]!
    expect(grid.kind === 'axes' && Array.from(grid.latEdges)).toEqual([90, 45, -45, -90])
    expect(source.warnings).toEqual(['The last column of lon repeats the first (a full circle plus one); it counts once.'])
    source.close()
  })
})

describe('a grid as text', () => {
  const axes = { kind: 'axes' as const, rows: 2, columns: 1, latEdges: Float64Array.of(0.1, 0.1 + 0.2, 1 / 3), lonEdges: Float64Array.of(-1e-17, 7) }
  const plane = { kind: 'transform' as const, rows: 3, columns: 4, transform: [1 / 3, 1, 0, 5, 0, -1] as [number, number, number, number, number, number], crs: '+proj=utm +zone=32 +datum=WGS84 +units=m +no_defs' }

  it('comes back in full precision', () => {
    expect(decodeGrid(encodeGrid(axes))).toEqual(axes)
    expect(decodeGrid(encodeGrid(plane))).toEqual(plane)
  })

  it('has a fingerprint that changes with the last bit of an edge', () => {
    const moved = { ...axes, latEdges: Float64Array.of(0.1, 0.3, 1 / 3) }
    expect(gridFingerprint(axes)).toMatch(/^[0-9a-f]{64}$/)
    expect(gridFingerprint(moved)).not.toBe(gridFingerprint(axes))
    expect(gridFingerprint(decodeGrid(encodeGrid(axes)))).toBe(gridFingerprint(axes))
  })

  it('is described by its box and its steps', () => {
    const even = { ...axes, latEdges: Float64Array.of(60, 59.5, 59), lonEdges: Float64Array.of(4, 5) }
    expect(describeGrid(even)).toMatchObject({ west: 4, south: 59, east: 5, north: 60, latStep: 0.5, lonStep: 1, crs: null })
  })
})

describe('projections', () => {
  /** Computed values of the project's geodesy reference: UTM zone 32 and zone 29 on WGS84. */
  it.each([
    [10.5, 59.0, 32, 586173.846, 6541018.998], [-8, 43.5, 29, 580844.55, 4816827.042], [3, 45, 31, 500000, 4982950.4],
  ])('place %s, %s in UTM zone %s', (lon, lat, zone, x, y) => {
    const crs = `+proj=utm +zone=${zone} +datum=WGS84 +units=m +no_defs`
    const [east, north] = projectTo(crs)(lon, lat)
    expect(Math.abs(east - x)).toBeLessThan(0.011)
    expect(Math.abs(north - y)).toBeLessThan(0.011)
    const [back, backLat] = unprojectFrom(crs)(east, north)
    expect(back).toBeCloseTo(lon, 8)
    expect(backLat).toBeCloseTo(lat, 8)
  })

  it('answer NaN where they have no place', () => {
    expect(projectTo('+proj=ortho +lat_0=0 +lon_0=0 +datum=WGS84')(180, 0)).toEqual([NaN, NaN])
  })
})

describe('a classic file with a single record variable', () => {
  it('has records that are not padded to four bytes', async () => {
    const int = (n: number) => Buffer.from(Uint32Array.of(n).buffer).reverse()
    const word = (text: string) => Buffer.concat([int(text.length), Buffer.from(text.padEnd(Math.ceil(text.length / 4) * 4, '\0'))])
    const header = (begin: number) =>
      Buffer.concat([
        Buffer.from('CDF\x01'), int(2), int(10), int(2), word('t'), int(0), word('x'), int(3), int(0), int(0),
        int(11), int(1), word('s'), int(2), int(0), int(1), int(0), int(0), int(3), int(8), int(begin),
      ])
    const data = Buffer.from([0, 1, 0, 2, 0, 3, 0, 4, 0, 5, 0, 6])
    const path = join(folder, 'one.nc')
    await writeFile(path, Buffer.concat([header(header(0).length), data]))
    const file = openClassic(path, header(0).length + data.length)
    const variable = file.variables[0]!
    expect(Array.from(file.read(variable, [0, 0], [2, 3]))).toEqual([1, 2, 3, 4, 5, 6])
    expect(Array.from(file.read(variable, [1, 1], [1, 2]))).toEqual([5, 6])
    file.close()
  })
})

describe('the report of a file', () => {
  it('is plain JSON that says what was understood', async () => {
    const path = join(folder, 'report.nc')
    await writeNetcdf4(path, {
      latitudes: [60, 60.5], longitudes: [4, 4.5, 5], times: [Date.UTC(2024, 4, 1), Date.UTC(2024, 4, 9)],
      timeBounds: [[Date.UTC(2024, 4, 1), Date.UTC(2024, 4, 9)], [Date.UTC(2024, 4, 9), Date.UTC(2024, 4, 17)]],
      variables: [
        {
          name: 'chl', dtype: 'i2', scale: 1e-9, offset: 0, attributes: { units: 'kg m-3', long_name: 'Chlorophyll' },
          data: Float64Array.of(1e-6, 2e-6, 3e-6, 4e-6, NaN, NaN, 1e-6, 1e-6, 1e-6, 1e-6, 1e-6, 1e-6),
        },
      ],
    })
    const report = await inspectGrid(path, 'report.nc')
    expect(JSON.parse(JSON.stringify(report))).toEqual(report)
    expect(report).toMatchObject({
      format: 'netcdf4',
      warnings: [],
      variables: [
        {
          name: 'chl', longName: 'Chlorophyll', unit: 'mg m-3', fileUnit: 'kg m-3', quantity: 'chlorophyll', wavelengthNm: null,
          conversion: 'scale 1e-9, offset 0; kg m-3 to mg m-3',
          grid: { kind: 'axes', rows: 2, columns: 3, west: 3.75, south: 59.75, east: 5.25, north: 60.75, latStep: 0.5, lonStep: 0.5 },
          times: { count: 2, first: '2024-05-01T00:00:00.000Z', last: '2024-05-09T00:00:00.000Z', hasClock: false, from: 'time axis', composites: 2 },
          cells: 6, valid: 4,
        },
      ],
    })
    const [variable] = report.variables
    expect(variable!.min).toBeCloseTo(1, 9)
    expect(variable!.median).toBeCloseTo(2, 9)
    expect(variable!.max).toBeCloseTo(4, 9)
  })
})
