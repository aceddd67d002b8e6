import { decodeGrid } from '../grids/grid-text'
import type { Tasks } from './tasks'
import { weighGrid } from './weigh-grid'

/** The cells of a region on a grid: once per grid and geometry. */
export function weighCells({ geometry, shoreBufferKm = 0, grid }: Tasks['weighCells']['input']): Tasks['weighCells']['output'] {
  return weighGrid(geometry, decodeGrid(grid), shoreBufferKm)
}
