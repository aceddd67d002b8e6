import type { AxesGrid, Grid } from '../../shared/science/grid'
import { quadFinder } from './quad-finder'

export interface CellPlace {
  row: number
  column: number
}

/** Answers which cell of a grid holds a place, or null outside it. Longitudes may be given in any turn. */
export function cellFinder(grid: Grid, project?: (lon: number, lat: number) => [number, number]): (lon: number, lat: number) => CellPlace | null {
  if (grid.kind === 'axes') return axesFinder(grid)
  if (grid.kind === 'curvilinear') return quadFinder(grid)
  const [t0, t1, t2, t3, t4, t5] = grid.transform
  const determinant = t1 * t5 - t2 * t4
  return (lon, lat) => {
    const [x, y] = project!(lon, lat)
    const column = Math.floor((t5 * (x - t0) - t2 * (y - t3)) / determinant)
    const row = Math.floor((t1 * (y - t3) - t4 * (x - t0)) / determinant)
    return row >= 0 && row < grid.rows && column >= 0 && column < grid.columns ? { row, column } : null
  }
}

function axesFinder(grid: AxesGrid) {
  const west = Math.min(grid.lonEdges[0]!, grid.lonEdges[grid.columns]!)
  return (lon: number, lat: number): CellPlace | null => {
    const row = between(grid.latEdges, lat)
    const column = between(grid.lonEdges, lon - 360 * Math.floor((lon - west) / 360))
    return row === null || column === null ? null : { row, column }
  }
}

/** The interval of monotonic edges that holds a value. */
function between(edges: Float64Array, value: number): number | null {
  const last = edges.length - 1
  const rising = edges[last]! > edges[0]!
  let [low, high] = [0, last]
  const outside = rising ? value < edges[0]! || value > edges[last]! : value > edges[0]! || value < edges[last]!
  if (outside || Number.isNaN(value)) return null
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (rising ? value >= edges[middle]! : value <= edges[middle]!) low = middle
    else high = middle
  }
  return low
}
