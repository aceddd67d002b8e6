import { cellAreasKm2 } from '../../shared/science/cell-areas'
import { cellShares } from '../../shared/science/cell-shares'
import { isLand } from '../geography/land'
import { cellCentre } from '../grids/cell-centre'
import { decodeGrid } from '../grids/grid-text'
import { projectTo, unprojectFrom } from '../grids/read/project'
import type { Tasks } from './tasks'

/** Which cells of a grid a region touches, with what share, area and land outline: once per grid and geometry. */
export function weighCells({ geometry, grid: text }: Tasks['weighCells']['input']): Tasks['weighCells']['output'] {
  const grid = decodeGrid(text)
  const project = grid.kind === 'transform' ? projectTo(grid.crs) : undefined
  const unproject = grid.kind === 'transform' ? unprojectFrom(grid.crs) : undefined
  const { index, share } = cellShares(geometry, grid, project)
  const areaKm2 = cellAreasKm2(grid, index, unproject)
  const water = Uint8Array.from(index, (cell) => (isLand(...cellCentre(grid, cell)) ? 0 : 1))
  return { index, share, areaKm2, water }
}
