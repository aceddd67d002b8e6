import type { MultiPolygon, Polygon } from 'geojson'
import { cellAreasKm2 } from '../../shared/science/cell-areas'
import { cellShares } from '../../shared/science/cell-shares'
import type { Grid } from '../../shared/science/grid'
import { distanceToLandKm } from '../geography/coast'
import { isLand } from '../geography/land'
import { cellCentre } from '../grids/cell-centre'
import { projectTo, unprojectFrom } from '../grids/read/project'
import type { RegionCellWeights } from './tasks'

export type GridWeights = Omit<RegionCellWeights, 'rows' | 'columns'>

/**
 * Which cells of a grid a region touches, with what share, area and land outline. With a shore buffer, cells whose
 * centre lies on land or within that distance of it are left out altogether: they belong to no figure. Where the
 * outline shows no water here at all (a lake, a narrow inlet) it knows no shore either, and the buffer takes nothing.
 */
export function weighGrid(geometry: Polygon | MultiPolygon, grid: Grid, shoreBufferKm: number): GridWeights {
  const project = grid.kind === 'transform' ? projectTo(grid.crs) : undefined
  const unproject = grid.kind === 'transform' ? unprojectFrom(grid.crs) : undefined
  const { index, share } = cellShares(geometry, grid, project)
  const water = Uint8Array.from(index, (cell) => (isLand(...cellCentre(grid, cell)) ? 0 : 1))
  const all = { index, share, areaKm2: cellAreasKm2(grid, index, unproject), water }
  if (shoreBufferKm === 0 || !water.includes(1)) return all
  const offShore = (cell: number, i: number) => water[i] === 1 && distanceToLandKm(...cellCentre(grid, cell), shoreBufferKm) === Infinity
  const kept = Array.from(index, (cell, i) => (offShore(cell, i) ? i : -1)).filter((i) => i >= 0)
  return {
    index: Uint32Array.from(kept, (i) => index[i]!),
    share: Float64Array.from(kept, (i) => share[i]!),
    areaKm2: Float64Array.from(kept, (i) => all.areaKm2[i]!),
    water: new Uint8Array(kept.length).fill(1),
  }
}
