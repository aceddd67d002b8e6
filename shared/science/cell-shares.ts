import type { MultiPolygon, Polygon, Position } from 'geojson'
import { scanCoverage, type PlaneRing } from './coverage-scan'
import type { AxesGrid, CurvilinearGrid, Grid, GridWindow, TransformGrid } from './grid'
import { planeRing, type Placed } from './plane-ring'
import { scanQuads } from './quad-shares'

export type Project = (lon: number, lat: number) => [x: number, y: number]

/** Cells with a share above 0, ascending by `index` (row * columns + column); share is overlap over cell, 0..1. */
export interface CellShares {
  index: Uint32Array
  share: Float64Array
}

function partsOf(geometry: Polygon | MultiPolygon): Position[][][] {
  return geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates
}

/** The axis ascending; a descending one is mirrored, which is exact, and points are mirrored with it. */
function ascending(edges: Float64Array): { edges: Float64Array; mirror: 1 | -1 } {
  const mirror = edges[0]! <= edges[edges.length - 1]! ? 1 : -1
  return { edges: edges.map((edge) => edge * mirror), mirror }
}

/** Columns of the first full circle: what comes after repeats cells that were already counted. */
function withoutRepeats(edges: Float64Array): Float64Array {
  let columns = edges.length - 1
  while (columns > 1 && (edges[columns - 1]! + edges[columns]!) / 2 >= edges[0]! + 360 - 1e-9) columns--
  return edges.subarray(0, columns + 1)
}

function ringsOnAxes(
  geometry: Polygon | MultiPolygon,
  lon: Float64Array,
  mirrorX: number,
  mirrorY: number,
): PlaneRing[] {
  const [west, east] = [lon[0]!, lon[lon.length - 1]!]
  const rings: PlaneRing[] = []
  for (const part of partsOf(geometry)) {
    for (const [i, ring] of part.entries()) {
      const x = Float64Array.from(ring, ([ringLon = NaN]) => ringLon * mirrorX)
      const y = Float64Array.from(ring, ([, ringLat = NaN]) => ringLat * mirrorY)
      const least = x.reduce((a, b) => Math.min(a, b), Infinity)
      const most = x.reduce((a, b) => Math.max(a, b), -Infinity)
      // The same water may meet the grid more than once: a region round 0 degrees at both ends of 0..360.
      for (let turn = Math.ceil((west - most) / 360); turn <= Math.floor((east - least) / 360); turn++) {
        rings.push({ x: turn === 0 ? x : x.map((value) => value + 360 * turn), y, hole: i > 0 })
      }
    }
  }
  return rings
}

function onAxes(geometry: Polygon | MultiPolygon, grid: AxesGrid, emit: Emit): void {
  const lon = ascending(grid.lonEdges)
  const lat = ascending(grid.latEdges)
  const columns = withoutRepeats(lon.edges)
  scanCoverage(ringsOnAxes(geometry, columns, lon.mirror, lat.mirror), columns, lat.edges, emit)
}

function onTransform(geometry: Polygon | MultiPolygon, grid: TransformGrid, project: Project, emit: Emit): void {
  const [t0, t1, t2, t3, t4, t5] = grid.transform
  const determinant = t1 * t5 - t2 * t4
  if (determinant === 0) throw new RangeError('The transform of this grid flattens its cells to a line.')
  const place = (lon: number, lat: number): Placed => {
    const [x, y] = project(lon, lat)
    return [(t5 * (x - t0) - t2 * (y - t3)) / determinant, (t1 * (y - t3) - t4 * (x - t0)) / determinant]
  }
  const rings = partsOf(geometry).flatMap((part) =>
    part.flatMap((ring, i) => {
      const placed = planeRing(ring, place)
      return placed === null ? [] : [{ ...placed, hole: i > 0 }]
    }),
  )
  const steps = (count: number) => Float64Array.from({ length: count + 1 }, (_, i) => i)
  scanCoverage(rings, steps(grid.columns), steps(grid.rows), emit)
}

function onQuads(geometry: Polygon | MultiPolygon, grid: CurvilinearGrid, emit: Emit): void {
  const rings = partsOf(geometry).flatMap((part) =>
    part.map((ring, i) => ({
      x: Float64Array.from(ring, ([lon = NaN]) => lon),
      y: Float64Array.from(ring, ([, lat = NaN]) => lat),
      hole: i > 0,
    })),
  )
  scanQuads(rings, grid, emit)
}

type Emit = (row: number, column: number, share: number) => void

/**
 * For every cell that meets a polygon, the share of the cell inside it: exact overlap over cell area, in the
 * longitude/latitude plane for an axes or curvilinear grid, in the grid's own plane for a transform grid.
 *
 * Longitudes in degrees; polygon and grid may count them differently (-180..180, 0..360, 170..190): the polygon is
 * shifted by full turns to wherever it meets the grid. Columns past a full circle are left out, so a repeated column
 * counts once. Rings need not be closed and may wind either way. `project` maps longitude and latitude to the plane of
 * a transform grid's crs. Errors: RangeError for a transform grid without `project`, or a torn outline.
 */
export function cellShares(geometry: Polygon | MultiPolygon, grid: Grid, project?: Project): CellShares {
  const index: number[] = []
  const share: number[] = []
  const emit: Emit = (row, column, value) => {
    index.push(row * grid.columns + column)
    share.push(value)
  }
  if (grid.kind === 'axes') onAxes(geometry, grid, emit)
  else if (grid.kind === 'curvilinear') onQuads(geometry, grid, emit)
  else if (project) onTransform(geometry, grid, project, emit)
  else throw new RangeError('A grid with a transform needs its projection to find shares of cells.')
  return grid.kind === 'curvilinear' ? ascendingCells(index, share) : { index: Uint32Array.from(index), share: Float64Array.from(share) }
}

/** Curvilinear grids are gone through block by block, so their cells are put in order. */
function ascendingCells(index: number[], share: number[]): CellShares {
  const order = index.map((_, i) => i).sort((a, b) => index[a]! - index[b]!)
  return { index: Uint32Array.from(order, (i) => index[i]!), share: Float64Array.from(order, (i) => share[i]!) }
}

/** The smallest rectangle of cells that holds all listed cells; null when none is listed. */
export function windowOf(index: Uint32Array, columns: number): GridWindow | null {
  if (index.length === 0) return null
  let [top, bottom, left, right] = [Infinity, -1, Infinity, -1]
  for (const cell of index) {
    const row = Math.floor(cell / columns)
    const column = cell % columns
    top = Math.min(top, row)
    bottom = Math.max(bottom, row)
    left = Math.min(left, column)
    right = Math.max(right, column)
  }
  return { row: top, column: left, rows: bottom - top + 1, columns: right - left + 1 }
}
