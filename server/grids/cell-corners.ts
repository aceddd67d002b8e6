import type { Grid } from '../../shared/science/grid'
import { quadCell } from '../../shared/science/quad-cell'
import { cellCentre } from './cell-centre'
import { unprojectFrom } from './read/project'

export type Corner = [lon: number, lat: number]

/** The four corners of a cell in order round it, longitudes counted in the turn of its middle; null for a cell without a place. */
export function cellCorners(grid: Grid, cell: number): { centre: Corner; corners: Corner[] } | null {
  const centre = cellCentre(grid, cell)
  const corners = cornersOf(grid, Math.floor(cell / grid.columns), cell % grid.columns, cell)
  if (!corners || ![...centre, ...corners.flat()].every(Number.isFinite)) return null
  return { centre, corners: corners.map(([lon, lat]) => [lon - 360 * Math.round((lon - centre[0]) / 360), lat]) }
}

function cornersOf(grid: Grid, row: number, column: number, cell: number): Corner[] | null {
  if (grid.kind === 'axes') {
    const [west, east] = [grid.lonEdges[column]!, grid.lonEdges[column + 1]!]
    const [first, last] = [grid.latEdges[row]!, grid.latEdges[row + 1]!]
    return [[west, first], [east, first], [east, last], [west, last]]
  }
  if (grid.kind === 'curvilinear') {
    const quad = quadCell(grid, cell)
    return quad && quad.lons.map((lon, i): Corner => [lon, quad.lats[i]!])
  }
  const [t0, t1, t2, t3, t4, t5] = grid.transform
  const toDegrees = unprojectFrom(grid.crs)
  const around: Corner[] = [[column, row], [column + 1, row], [column + 1, row + 1], [column, row + 1]]
  return around.map(([c, r]) => toDegrees(t0 + t1 * c + t2 * r, t3 + t4 * c + t5 * r))
}
