import type { Polygon } from 'geojson'
import { describe, expect, it } from 'vitest'
import { cellCentre } from '../../../server/grids/cell-centre'
import { describeGrid } from '../../../server/grids/describe-grid'
import { decodeGrid, encodeGrid, gridFingerprint } from '../../../server/grids/grid-text'
import { cfSource } from '../../../server/grids/read/cf-source'
import { cornersFromBounds } from '../../../server/grids/read/corner-bounds'
import { cornersFromCentres } from '../../../server/grids/read/corner-places'
import { cellFinder } from '../../../server/pictures/cell-finder'
import { cellAreasKm2 } from '../../../shared/science/cell-areas'
import { cellShares } from '../../../shared/science/cell-shares'
import type { AxesGrid, CurvilinearGrid } from '../../../shared/science/grid'
import { quadCell } from '../../../shared/science/quad-cell'
import { rawFile, rawVariable } from './raw-file'

/** Corners by a rule, so that a grid may be straight, turned, or lie across the antimeridian or a pole. */
function gridOf(rows: number, columns: number, place: (row: number, column: number) => [lon: number, lat: number]): CurvilinearGrid {
  const places = Array.from({ length: (rows + 1) * (columns + 1) }, (_, i) => place(Math.floor(i / (columns + 1)), i % (columns + 1)))
  return {
    kind: 'curvilinear', rows, columns,
    cornerLons: Float64Array.from(places, ([lon]) => lon), cornerLats: Float64Array.from(places, ([, lat]) => lat),
  }
}

const ring = (points: [number, number][]): Polygon => ({ type: 'Polygon', coordinates: [[...points, points[0]!]] })
const turned = (lon: number, lat: number, degrees = 25) => (row: number, column: number): [number, number] => {
  const [x, y] = [column * 0.3, row * 0.2]
  const [c, s] = [Math.cos((degrees * Math.PI) / 180), Math.sin((degrees * Math.PI) / 180)]
  return [lon + x * c - y * s, lat + x * s + y * c]
}

describe('a curvilinear grid', () => {
  it('whose cells are straight gives the shares and areas of the same axes', () => {
    const axes: AxesGrid = {
      kind: 'axes', rows: 20, columns: 40,
      latEdges: Float64Array.from({ length: 21 }, (_, i) => 50 + i / 4), lonEdges: Float64Array.from({ length: 41 }, (_, i) => 2 + i / 4),
    }
    const same = gridOf(20, 40, (row, column) => [2 + column / 4, 50 + row / 4])
    const hollow = ring([[2.31, 50.4], [8.77, 50.22], [9.4, 53.9], [6.1, 51.35], [2.9, 54.3]])
    hollow.coordinates.push([[4, 50.6], [5, 50.6], [5, 50.9], [4, 50.6]])
    const [a, b] = [cellShares(hollow, axes), cellShares(hollow, same)]
    expect(Array.from(b.index)).toEqual(Array.from(a.index))
    b.share.forEach((share, i) => expect(share).toBeCloseTo(a.share[i]!, 11))
    const areas = cellAreasKm2(axes, a.index)
    cellAreasKm2(same, b.index).forEach((area, i) => expect(Math.abs(area / areas[i]! - 1)).toBeLessThan(1e-9))
  })

  it('covers a region inside it exactly once, turned or not, whichever way its corners run', () => {
    const region = ring([[11.2, 51.9], [13, 51.5], [14.2, 53.2], [12.3, 54]])
    const flat = (points: Polygon) => points.coordinates[0]!.reduce((sum, [x, y], i, all) => {
      const [nx, ny] = all[(i + 1) % all.length]!
      return sum + (x! * ny! - nx! * y!) / 2
    }, 0)
    for (const place of [turned(8, 49), (row: number, column: number) => turned(8, 49)(40 - row, column)]) {
      const grid = gridOf(40, 60, place)
      const { index, share } = cellShares(region, grid)
      const total = share.reduce((sum, value) => sum + value * 0.3 * 0.2, 0)
      expect(index.length).toBeGreaterThan(50)
      expect(total).toBeCloseTo(Math.abs(flat(region)), 9)
    }
  })

  it('is found across the antimeridian from either side', () => {
    const grid = gridOf(30, 40, (row, column) => {
      const [lon, lat] = turned(176, -20)(row, column)
      return [lon > 180 ? lon - 360 : lon, lat]
    })
    const east = cellShares(ring([[-179.5, -17], [-179, -17], [-179, -16.5], [-179.5, -16.5]]), grid)
    const west = cellShares(ring([[180.5, -17], [181, -17], [181, -16.5], [180.5, -16.5]]), grid)
    expect(east.index.length).toBeGreaterThan(3)
    expect(Array.from(west.index)).toEqual(Array.from(east.index))
    west.share.forEach((share, i) => expect(share).toBeCloseTo(east.share[i]!, 10))
    expect(cellAreasKm2(grid, east.index).every((area) => area > 500 && area < 800)).toBe(true)
    const box = describeGrid(grid)
    expect(box.east - box.west).toBeLessThan(20)
    expect(box.west).toBeCloseTo(turned(176, -20)(30, 0)[0], 9)
  })

  it('has no share in cells without a place, folded over, or round a pole', () => {
    const grid = gridOf(2, 2, (row, column) => [column, row])
    grid.cornerLats[0] = NaN
    expect(quadCell(grid, 0)).toBeNull()
    expect(Array.from(cellShares(ring([[-1, -1], [3, -1], [3, 3], [-1, 3]]), grid).index)).toEqual([1, 2, 3])
    expect(cellAreasKm2(grid, Uint32Array.of(0))[0]).toBeNaN()
    const folded = gridOf(1, 1, (row, column) => [row === 1 ? 1 - column : column, row])
    expect(quadCell(folded, 0)).toBeNull()
    const polarLons = [[0, 90], [-90, 180]]
    const polar = gridOf(1, 1, (row, column) => [polarLons[row]![column]!, 85])
    expect(quadCell(polar, 0)).toBeNull()
  })

  it('measures a hollow cell as what it is', () => {
    const corners: [number, number][][] = [[[0, 0], [4, 0]], [[0, 4], [1, 1]]]
    const grid = gridOf(1, 1, (row, column) => corners[row]![column]!)
    const quad = quadCell(grid, 0)!
    expect([quad.lons, quad.lats]).toEqual([[0, 4, 1, 0], [0, 0, 1, 4]])
    const { share } = cellShares(ring([[0, 0], [1, 0], [1, 1], [0, 1]]), grid)
    expect(share[0]).toBeCloseTo(1 / 4, 12)
  })

  it('comes back from text, bit for bit, and small', () => {
    const round = (value: number) => Math.round(value * 1e9) / 1e9
    const grid = gridOf(60, 80, (row, column) => turned(170, 40)(row, column).map(round) as [number, number])
    grid.cornerLons[77] = NaN
    grid.cornerLats[77] = NaN
    const text = encodeGrid(grid)
    expect(decodeGrid(text)).toEqual(grid)
    expect(gridFingerprint(decodeGrid(text))).toBe(gridFingerprint(grid))
    expect(text.length).toBeLessThan(60 * 80 * 8)
  })

  it('answers which cell holds a place, its own middle above all', () => {
    const grid = gridOf(30, 40, (row, column) => {
      const [lon, lat] = turned(176, -20)(row, column)
      return [lon > 180 ? lon - 360 : lon, lat]
    })
    const find = cellFinder(grid)
    for (const cell of [0, 39, 555, 1199]) {
      const [lon, lat] = cellCentre(grid, cell)
      expect(find(lon, lat)).toEqual({ row: Math.floor(cell / 40), column: cell % 40 })
      expect(find(lon + 360, lat)).toEqual({ row: Math.floor(cell / 40), column: cell % 40 })
    }
    expect(find(0, 0)).toBeNull()
  })
})

describe('corners of cells', () => {
  it('lie half-way between centres, the outermost mirrored, across the antimeridian too', () => {
    const lats = Float64Array.of(1, 1, 1, 3, 3, 3)
    const lons = Float64Array.of(178, 179.5, -179, 178, 179.5, -179)
    const corners = cornersFromCentres(lats, lons, 2, 3)
    expect(Array.from(corners.lats)).toEqual([0, 0, 0, 0, 2, 2, 2, 2, 4, 4, 4, 4])
    const wrapped = Array.from(corners.lons.slice(0, 4), (lon) => lon - 360 * Math.round((lon - 179) / 360))
    expect(wrapped).toEqual([177.25, 178.75, 180.25, 181.75])
  })

  it('make up for one missing centre, and stay unknown without two', () => {
    const lats = Float64Array.of(1, 1, 1, 2, NaN, 2, 3, 3, 3)
    const lons = Float64Array.of(1, 2, 3, 1, NaN, 3, 1, 2, 3)
    const corners = cornersFromCentres(lats, lons, 3, 3)
    expect([corners.lons[5], corners.lats[5]]).toEqual([1.5, 1.5])
    const two = cornersFromCentres(Float64Array.of(1, NaN, NaN, 2), Float64Array.of(1, NaN, NaN, 2), 2, 2)
    expect(two.lats[4]).toBeNaN()
  })

  it('come from bounds that begin at any corner and go either way, and not from bounds with gaps', () => {
    const vertices = [[0, 0], [0, 1], [1, 1], [1, 0]] as const
    for (const [first, direction] of [[0, 1], [2, 1], [1, -1], [3, -1]] as const) {
      const order = [0, 1, 2, 3].map((i) => (((first + direction * i) % 4) + 4) % 4)
      const cells = [0, 1, 2, 3, 4, 5].map((cell) => [Math.floor(cell / 3), cell % 3] as const)
      const lats = Float64Array.from(cells.flatMap(([row]) => order.map((i) => row + vertices[i]![0])))
      const lons = Float64Array.from(cells.flatMap(([row, column]) => order.map((i) => column + vertices[i]![1] + 0.1 * (row + vertices[i]![0]))))
      const corners = cornersFromBounds(lats, lons, 2, 3)!
      expect(Array.from(corners.lats)).toEqual([0, 0, 0, 0, 1, 1, 1, 1, 2, 2, 2, 2])
      expect(corners.lons[11]).toBeCloseTo(3.2, 12)
      expect(cornersFromBounds(lats.map((lat, i) => lat + (i > 11 ? 0.1 : 0)), lons, 2, 3)).toBeNull()
    }
  })
})

describe('a NetCDF file that places its cells one by one', () => {
  const attributes = { lat: { units: 'degrees_north' }, lon: { units: 'degrees_east' } }
  const places = (rows: number, columns: number, place: (row: number, column: number) => [number, number]) => {
    const all = Array.from({ length: rows * columns }, (_, i) => place(Math.floor(i / columns), i % columns))
    return { lon: all.map(([lon]) => lon), lat: all.map(([, lat]) => lat) }
  }
  const open = (rows: number, columns: number, data: { lon: number[]; lat: number[] }, chlorophyll: Record<string, string> = {}) => {
    const dimensions: [string, number][] = [['y', rows], ['x', columns]]
    return cfSource(
      rawFile(
        [
          rawVariable('lat', dimensions, attributes.lat), rawVariable('lon', dimensions, attributes.lon),
          rawVariable('chlor_a', dimensions, { units: 'mg m-3', ...chlorophyll }),
        ],
        { ...data, chlor_a: data.lat.map((_, i) => i) },
      ),
      'swath.nc',
    )
  }

  it('is a curvilinear grid', async () => {
    const source = open(4, 5, places(4, 5, turned(8, 49)), { coordinates: 'lat lon' })
    expect(source.variables.map(({ name, grid }) => [name, grid.kind])).toEqual([['chlor_a', 'curvilinear']])
    const values = await source.readWindow('chlor_a', 0, { row: 0, column: 0, rows: 4, columns: 5 })
    expect(values[7]).toBe(7)
    const [lon, lat] = cellCentre(source.variables[0]!.grid, 7)
    expect(lon).toBeCloseTo(turned(8, 49)(1, 2)[0], 8)
    expect(lat).toBeCloseTo(turned(8, 49)(1, 2)[1], 8)
  })

  it('is a grid of axes where rows and columns only repeat them', () => {
    const { grid } = open(3, 4, places(3, 4, (row, column) => [column === 3 ? -179 : 176 + column + (column > 1 ? 1 : 0), 50 - row])).variables[0]!
    expect(grid.kind === 'axes' && Array.from(grid.latEdges)).toEqual([50.5, 49.5, 48.5, 47.5])
    expect(grid.kind === 'axes' && Array.from(grid.lonEdges)).toEqual([175.5, 176.5, 178, 180, 182])
  })

  it('counts repeated last columns once, and says so', () => {
    // A turn of 12 columns and the first two again; rows slant, so that it is no grid of axes.
    const source = open(4, 14, places(4, 14, (row, column) => [((column % 12) * 30 + row * 3) % 360, 10 + row * 5 + (column % 12) / 10]))
    expect(source.warnings.join()).toContain('The last 2 columns repeat the first of lon; they count once.')
    const grid = source.variables[0]!.grid as CurvilinearGrid
    expect([quadCell(grid, 11), quadCell(grid, 12), quadCell(grid, 13)].map((quad) => quad === null)).toEqual([false, true, true])
  })

  it('is refused when its latitudes leave the globe', () => {
    expect(() => open(3, 3, places(3, 3, (row, column) => [column, 80 + row * 8]))).toThrow('beyond the poles')
  })
})
