import { describe, expect, it } from 'vitest'
import { cellCorners } from '../../../server/grids/cell-corners'
import { outlineLines } from '../../../server/grids/outline-lines'
import { cellBox, columnsRound } from '../../../shared/science/cell-box'
import type { AxesGrid, CurvilinearGrid, Grid, TransformGrid } from '../../../shared/science/grid'
import { patchOutlines } from '../../../shared/science/patch-outlines'

function axes(rows: number, columns: number, north: number, west: number, step: number): AxesGrid {
  return { kind: 'axes', rows, columns, latEdges: Float64Array.from({ length: rows + 1 }, (_, i) => north - i * step), lonEdges: Float64Array.from({ length: columns + 1 }, (_, i) => west + i * step) }
}

/** The outline of some cells of a grid as one patch. */
function outlineOf(grid: Grid, cells: number[], near: number) {
  const round = columnsRound(grid)
  const box = cellBox(Uint32Array.from(cells), grid.columns, round)
  const [rings = []] = patchOutlines(new Int32Array(cells.length), 1, box, grid.kind !== 'axes')
  return outlineLines(grid, rings, round, near)
}

describe('the outline of a patch on the globe', () => {
  it('runs on over the seam of a grid from 0 to 360, in the turn that is asked for', () => {
    const world = axes(18, 36, 90, 0, 10)
    const overSeam = [5 * 36 + 35, 5 * 36]
    expect(outlineOf(world, overSeam, -5)).toEqual([[[-10, 40], [10, 40], [10, 30], [-10, 30], [-10, 40]].map(([lon, lat]) => [lon, lat])])
    expect(outlineOf(world, overSeam, 355)[0]!.map(([lon]) => lon)).toEqual([350, 370, 370, 350, 350])
  })

  it('runs on over 180 degrees on a grid from -180 to 180', () => {
    const world = axes(18, 36, 90, -180, 10)
    expect(outlineOf(world, [36 * 9, 36 * 9 + 35], 178)[0]!.map(([lon]) => lon)).toEqual([170, 190, 190, 170, 170])
    expect(outlineOf(world, [36 * 9, 36 * 9 + 35], -178)[0]!.map(([lon]) => lon)).toEqual([-190, -170, -170, -190, -190])
  })

  it('of a single cell goes through the corners of that cell, on every kind of grid', () => {
    const polar: TransformGrid = { kind: 'transform', rows: 6, columns: 6, transform: [-300000, 100000, 0, 300000, 0, -100000], crs: '+proj=stere +lat_0=90 +lat_ts=70 +lon_0=-45 +datum=WGS84 +units=m' }
    const across = 4
    const swath: CurvilinearGrid = {
      kind: 'curvilinear', rows: 3, columns: 3,
      cornerLons: Float64Array.from({ length: 16 }, (_, i) => ((177 + (i % across) * 2 + Math.floor(i / across) * 0.3 + 180) % 360) - 180),
      cornerLats: Float64Array.from({ length: 16 }, (_, i) => 50 - Math.floor(i / across) + (i % across) * 0.1),
    }
    for (const [grid, cell] of [[polar, 0], [polar, 13], [polar, 35], [swath, 0], [swath, 4], [swath, 8], [axes(3, 3, 50, -10, 1), 4]] as const) {
      const place = cellCorners(grid, cell)!
      const [line] = outlineOf(grid, [cell], place.centre[0])
      const sorted = (corners: readonly (readonly [number, number])[]) => corners.map(([lon, lat]) => `${(((lon % 360) + 360) % 360).toFixed(5)} ${lat.toFixed(5)}`).sort()
      expect(line).toHaveLength(5)
      expect(line![4]).toEqual(line![0])
      expect(sorted(line!.slice(1))).toEqual(sorted(place.corners))
      for (const [i, [lon]] of line!.entries()) if (i > 0) expect(Math.abs(lon - line![i - 1]![0])).toBeLessThanOrEqual(180)
    }
  })

  it('leaves out corners that have no place', () => {
    const swath: CurvilinearGrid = { kind: 'curvilinear', rows: 1, columns: 1, cornerLons: Float64Array.of(0, 1, 0, NaN), cornerLats: Float64Array.of(1, 1, 0, 0) }
    expect(outlineOf(swath, [0], 0)[0]).toEqual([[0, 1], [1, 1], [0, 0], [0, 1]])
  })
})
