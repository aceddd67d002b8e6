import type { Grid } from '../../shared/science/grid'
import { quadCell } from '../../shared/science/quad-cell'
import { unprojectFrom } from './read/project'

/** Longitude (-180..180) and latitude of the middle of a cell; NaN for a cell without a place. */
export function cellCentre(grid: Grid, cell: number): [lon: number, lat: number] {
  const row = Math.floor(cell / grid.columns)
  const column = cell % grid.columns
  if (grid.kind === 'axes') {
    const lon = (grid.lonEdges[column]! + grid.lonEdges[column + 1]!) / 2
    return [lon - 360 * Math.floor((lon + 180) / 360), (grid.latEdges[row]! + grid.latEdges[row + 1]!) / 2]
  }
  if (grid.kind === 'curvilinear') {
    const quad = quadCell(grid, cell)
    if (!quad) return [NaN, NaN]
    const lon = (quad.lons[0] + quad.lons[1] + quad.lons[2] + quad.lons[3]) / 4
    const lat = (quad.lats[0] + quad.lats[1] + quad.lats[2] + quad.lats[3]) / 4
    return [lon - 360 * Math.floor((lon + 180) / 360), lat]
  }
  const [t0, t1, t2, t3, t4, t5] = grid.transform
  const [c, r] = [column + 0.5, row + 0.5]
  return unprojectFrom(grid.crs)(t0 + t1 * c + t2 * r, t3 + t4 * c + t5 * r)
}
