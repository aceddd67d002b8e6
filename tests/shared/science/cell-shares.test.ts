import fc from 'fast-check'
import type { MultiPolygon, Polygon } from 'geojson'
import { union } from 'polyclip-ts'
import proj4 from 'proj4'
import { describe, expect, it } from 'vitest'
import { cellAreasKm2 } from '../../../shared/science/cell-areas'
import { cellShares, windowOf, type CellShares } from '../../../shared/science/cell-shares'
import type { AxesGrid, TransformGrid } from '../../../shared/science/grid'
import { polygonAreaKm2 } from '../../../shared/science/ring-area'
import { box, grid } from './small-grid'

const { grid: small } = grid`1 2 3 / 4 5 6`
const pairs = ({ index, share }: CellShares) => [...index].map((cell, i) => [cell, share[i]])
const sum = (values: ArrayLike<number>) => Array.from(values).reduce((a, b) => a + b, 0)

function axes(lat: number[], lon: number[]): AxesGrid {
  const [latEdges, lonEdges] = [Float64Array.from(lat), Float64Array.from(lon)]
  return { kind: 'axes', rows: lat.length - 1, columns: lon.length - 1, latEdges, lonEdges }
}

const range = (from: number, to: number, step: number) =>
  Array.from({ length: Math.round((to - from) / step) + 1 }, (_, i) => from + i * step)

/** Random shares of a box: a fan of triangles round a point, so that together they are the box. */
const fan = fc
  .tuple(
    fc.array(fc.double({ min: 0, max: 4, noNaN: true }), { minLength: 1, maxLength: 12 }),
    fc.double({ min: 0.05, max: 0.95, noNaN: true }),
    fc.double({ min: 0.05, max: 0.95, noNaN: true }),
  )
  .map(([around, across, up]): Polygon[] => {
    const [west, south, east, north] = [0.3, 0.2, 5.7, 3.6]
    const at = (t: number) => {
      const [side, part] = [Math.floor(t) % 4, t % 1]
      const [width, height] = [east - west, north - south]
      if (side === 0) return [west + width * part, south]
      if (side === 1) return [east, south + height * part]
      return side === 2 ? [east - width * part, north] : [west, north - height * part]
    }
    const stops = [...new Set([0, 1, 2, 3, ...around.map((t) => t % 4)])].sort((a, b) => a - b)
    const centre = [west + (east - west) * across, south + (north - south) * up]
    return stops.map((t, i) => {
      const ring = [centre, at(t), at(stops[(i + 1) % stops.length]!), centre]
      return { type: 'Polygon', coordinates: [ring] }
    })
  })

describe('shares of cells', () => {
  it('a box on cell edges takes whole cells and no others', () => {
    expect(pairs(cellShares(box(1, 0, 3, 1), small))).toEqual([[4, 1], [5, 1]])
  })

  it('a box over corners takes a quarter of each of four cells', () => {
    expect(pairs(cellShares(box(0.5, 0.5, 1.5, 1.5), small))).toEqual([[0, 0.25], [1, 0.25], [3, 0.25], [4, 0.25]])
  })

  it('a hole is taken out, whichever way the rings wind', () => {
    const outer = box(0, 0, 2, 2).coordinates[0]!
    const hole = box(0.5, 0.5, 1.5, 1).coordinates[0]!
    for (const rings of [[outer, hole], [outer, [...hole].reverse()], [[...outer].reverse(), hole]]) {
      const found = cellShares({ type: 'Polygon', coordinates: rings }, small)
      expect(pairs(found)).toEqual([[0, 1], [1, 1], [3, 0.75], [4, 0.75]])
    }
  })

  it('a polygon smaller than a cell keeps its share of it', () => {
    const { index, share } = cellShares(box(1.5, 0.5, 1.5001, 0.5001), small)
    expect([...index]).toEqual([4])
    expect(share[0]).toBeCloseTo(1e-8, 18)
  })

  it('a polygon beside the grid, or without area, has no cells', () => {
    expect(cellShares(box(7, 0, 8, 1), small).index).toHaveLength(0)
    expect(cellShares(box(0, 5, 1, 6), small).index).toHaveLength(0)
    expect(cellShares(box(1, 0, 1, 2), small).index).toHaveLength(0)
  })

  it('the same water is found on grids that count longitude in other ways', () => {
    const water: MultiPolygon = {
      type: 'MultiPolygon',
      coordinates: [box(178, 0, 180, 2).coordinates, box(-180, 0, -179, 2).coordinates],
    }
    for (const lon of [range(170, 190, 1), range(0, 360, 1), range(21, 379, 1), range(-190, -170, 1)]) {
      const found = cellShares(water, axes([0, 1, 2], lon))
      expect([...found.share]).toEqual([1, 1, 1, 1, 1, 1])
    }
    expect([...cellShares(box(178, 0, 181, 2), axes([0, 1, 2], range(-180, 180, 1))).share]).toHaveLength(6)
  })

  it('a repeated column counts once', () => {
    const world = axes([0, 10], range(-5, 375, 10))
    const found = cellShares(box(-180, 0, 180, 10), world)
    expect(found.index).toHaveLength(36)
    expect(sum(found.share)).toBe(36)
    expect([...cellShares(box(-3, 0, 3, 10), world).index]).toEqual([0])
  })

  it('a cell crossed by a region that ends and begins in it, round the world, gets both pieces', () => {
    const found = cellShares(box(2, 0, 361, 10), axes([0, 10], range(-5, 355, 10)))
    expect(found.share[0]).toBeCloseTo(0.9, 12)
    expect(sum(found.share)).toBeCloseTo(35.9, 12)
  })

  it('pieces of a box have shares that add up to those of the box', () => {
    const uneven = axes([4, 3.1, 3, 1.2, 0.5, 0.2, -1], [0, 0.3, 0.31, 1, 2.5, 2.75, 4, 5.7, 7])
    const expected = cellShares(box(0.3, 0.2, 5.7, 3.6), uneven)
    fc.assert(
      fc.property(fan, (pieces) => {
        const sums = new Map<number, number>()
        for (const piece of pieces) {
          const { index, share } = cellShares(piece, uneven)
          for (const [i, cell] of index.entries()) sums.set(cell, (sums.get(cell) ?? 0) + share[i]!)
        }
        for (const [i, cell] of expected.index.entries()) expect(sums.get(cell)).toBeCloseTo(expected.share[i]!, 9)
        expect(sum([...sums.values()])).toBeCloseTo(sum(expected.share), 9)
      }),
      { numRuns: 200, seed: 7 },
    )
  })

  it('overlapping pieces joined by union have the shares of the joined outline', () => {
    const [a, b] = [box(0.2, 0.3, 1.7, 1.4), box(1.1, 0.9, 2.6, 1.9)]
    const coordinates = union(a.coordinates as never, b.coordinates as never)
    const { share } = cellShares({ type: 'MultiPolygon', coordinates }, small)
    expect(sum(share)).toBeCloseTo(1.5 * 1.1 + 1.5 * 1 - 0.6 * 0.5, 12)
  })
})

describe('shares on a projected grid', () => {
  const crs = '+proj=utm +zone=32 +datum=WGS84'
  const transform: TransformGrid['transform'] = [560000, 1000, 0, 6600000, 0, -1000]
  const utm: TransformGrid = { kind: 'transform', rows: 60, columns: 60, transform, crs }
  const projection = proj4(crs)
  const project = (lon: number, lat: number) => projection.forward([lon, lat]) as [number, number]
  const unproject = (x: number, y: number) => projection.inverse([x, y]) as [number, number]

  it('cells times shares make the true area of a polygon whose edges bend in the plane', () => {
    const water = box(10.2, 59.1, 10.9, 59.45)
    const { index, share } = cellShares(water, utm, project)
    const areas = cellAreasKm2(utm, index, unproject)
    const total = sum(areas.map((area, i) => area * share[i]!))
    expect(Math.abs(total / polygonAreaKm2(water) - 1)).toBeLessThan(1e-7)
  })

  it('a region the projection cannot place has no cells, and one that tears is refused', () => {
    const nowhere = () => [NaN, NaN] as [number, number]
    expect(cellShares(box(0, 0, 1, 1), utm, nowhere).index).toHaveLength(0)
    const flat = (lon: number, lat: number): [number, number] => [(lon > 0.5 ? lon - 360 : lon) * 1e5, lat * 1e5]
    expect(() => cellShares(box(0, 0, 1, 1), utm, flat)).toThrow(/edge of the projection/)
    expect(() => cellShares(box(0, 0, 1, 1), utm)).toThrow(/needs its projection/)
  })
})

describe('the window of listed cells', () => {
  it('is the smallest rectangle that holds them', () => {
    expect(windowOf(Uint32Array.of(12, 23, 31), 10)).toEqual({ row: 1, column: 1, rows: 3, columns: 3 })
    expect(windowOf(new Uint32Array(0), 10)).toBeNull()
  })
})
