import proj4 from 'proj4'
import { describe, expect, it } from 'vitest'
import { cellAreasKm2 } from '../../../shared/science/cell-areas'
import type { TransformGrid } from '../../../shared/science/grid'
import { polygonAreaKm2, ringAreaKm2 } from '../../../shared/science/ring-area'
import { areaBetweenParallelsKm2, cellAreaKm2 } from '../../../shared/science/wgs84'
import { box, grid } from './small-grid'

function transformGrid(size: number, transform: TransformGrid['transform'], crs: string): TransformGrid {
  return { kind: 'transform', rows: size, columns: size, transform, crs }
}

describe('areas of cells', () => {
  it('lie between their parallels, from either direction', () => {
    const { grid: small } = grid`1 2 / 3 4`
    expect(cellAreasKm2(small, Uint32Array.of(0, 3))).toEqual(
      Float64Array.of(areaBetweenParallelsKm2(1, 2, 1), areaBetweenParallelsKm2(1, 0, 1)),
    )
  })

  it('a cell off the grid is refused, and so is a latitude past the pole', () => {
    const { grid: small } = grid`1 2 / 3 4`
    expect(() => cellAreaKm2(small, 2, 0)).toThrow(/has no cell 2, 0/)
    expect(() => areaBetweenParallelsKm2(89, 91, 1)).toThrow(/between -90 and 90/)
  })

  it('a cell given by a transform in degrees measures what the same cell measures on axes', () => {
    const crs = '+proj=longlat'
    const degrees = transformGrid(1, [5, 0.01, 0, 60.01, 0, -0.01], crs)
    const [area] = cellAreasKm2(degrees, Uint32Array.of(0), (x, y) => [x, y])
    expect(area! / areaBetweenParallelsKm2(60, 60.01, 0.01)).toBeCloseTo(1, 8)
  })

  it('a UTM cell measures what its outline, followed finely, measures', () => {
    const crs = '+proj=utm +zone=32 +datum=WGS84'
    const utm = transformGrid(1, [700000, 4000, 0, 6600000, 0, -4000], crs)
    const inverse = (x: number, y: number) => proj4(crs).inverse([x, y]) as [number, number]
    const side = Array.from({ length: 1000 }, (_, i) => i * 4)
    const outline = [
      ...side.map((s) => inverse(700000 + s, 6600000)),
      ...side.map((s) => inverse(704000, 6600000 - s)),
      ...side.map((s) => inverse(704000 - s, 6596000)),
      ...side.map((s) => inverse(700000, 6596000 + s)),
    ]
    const [area] = cellAreasKm2(utm, Uint32Array.of(0), inverse)
    expect(area! / ringAreaKm2(outline)).toBeCloseTo(1, 8)
  })

  it('four polar cells that meet in the pole make the cap their outline encloses', () => {
    const crs = '+proj=stere +lat_0=90 +lat_ts=70 +lon_0=0 +datum=WGS84'
    const half = 25000
    const polar = transformGrid(2, [-half, half, 0, half, 0, -half], crs)
    const inverse = (x: number, y: number) => proj4(crs).inverse([x, y]) as [number, number]
    const across = Array.from({ length: 2000 }, (_, i) => -half + (i * half) / 1000)
    const outline = [
      ...across.map((s) => inverse(s, -half)),
      ...across.map((s) => inverse(half, s)),
      ...across.map((s) => inverse(-s, half)),
      ...across.map((s) => inverse(-half, -s)),
    ].sort(([a], [b]) => a - b)
    const [first, last] = [outline[0]!, outline.at(-1)!]
    const [west, east] = [last[0] - 360, first[0] + 360]
    const round = [[west, last[1]], ...outline, [east, first[1]], [east, 90], [west, 90]]
    const overlap = ringAreaKm2([[west, last[1]], first, [first[0], 90], [west, 90]])
    const areas = cellAreasKm2(polar, Uint32Array.of(0, 1, 2, 3), inverse)
    for (const area of areas) expect(area / (ringAreaKm2(round) - overlap)).toBeCloseTo(0.25, 6)
  })
})

describe('areas of polygons', () => {
  it('a box along parallels is exact, with its hole taken out', () => {
    const [outer, hole] = [box(-7, 41, 0, 45), box(-5, 42, -4, 43)]
    const expected = areaBetweenParallelsKm2(41, 45, 7) - areaBetweenParallelsKm2(42, 43, 1)
    const polygon = { type: 'Polygon' as const, coordinates: [outer.coordinates[0]!, hole.coordinates[0]!] }
    expect(polygonAreaKm2(polygon) / expected).toBeCloseTo(1, 12)
  })

  it('parts add up, and the way a ring winds or where it starts does not matter', () => {
    const [a, b] = [box(0, 50, 1, 51).coordinates, box(3, 50, 4, 51).coordinates]
    const both = polygonAreaKm2({ type: 'MultiPolygon', coordinates: [a, b] })
    expect(both).toBeCloseTo(2 * areaBetweenParallelsKm2(50, 51, 1), 6)
    const triangle = [[3, 50], [8, 61], [1, 57]]
    expect(ringAreaKm2([...triangle].reverse())).toBeCloseTo(ringAreaKm2(triangle), 6)
    expect(ringAreaKm2([[8, 61], [1, 57], [3, 50], [8, 61]])).toBeCloseTo(ringAreaKm2(triangle), 6)
  })

  it('a triangle under the diagonal and one over it make the box', () => {
    const under = ringAreaKm2([[0, 50], [9, 50], [9, 63]])
    const over = ringAreaKm2([[0, 50], [9, 63], [0, 63]])
    expect((under + over) / areaBetweenParallelsKm2(50, 63, 9)).toBeCloseTo(1, 12)
  })

  it('a ring of a metre keeps its digits, and two points have no area', () => {
    const ring = box(10, 60, 10.00001, 60.00001).coordinates[0]!
    expect(ringAreaKm2(ring) / areaBetweenParallelsKm2(60, 60.00001, 0.00001)).toBeCloseTo(1, 5)
    expect(ringAreaKm2([[0, 0], [1, 1]])).toBe(0)
  })
})
