import type { MultiPolygon, Polygon } from 'geojson'
import { cellAreasKm2 } from '../../shared/science/cell-areas'
import { cellShares } from '../../shared/science/cell-shares'
import type { Grid } from '../../shared/science/grid'
import { distanceToLandKm } from '../geography/coast'
import { isLand } from '../geography/land'
import { outsideGrid } from '../geography/outside-grid'
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
  const areaKm2 = cellAreasKm2(grid, index, unproject)
  const water = Uint8Array.from(index, (cell) => (isLand(...cellCentre(grid, cell)) ? 0 : 1))
  const buffered = shoreBufferKm > 0 && water.includes(1)
  const isOffShore = (longitude: number, latitude: number) => !buffered || distanceToLandKm(longitude, latitude, shoreBufferKm) === Infinity
  const offShore = Uint8Array.from(index, (cell, i) => (water[i] === 1 && isOffShore(...cellCentre(grid, cell)) ? 1 : 0))
  const outsideWaterKm2 = outsideGrid(geometry, grid, {
    areaKm2: share.reduce((sum, part, i) => sum + part * areaKm2[i]!, 0),
    waterKm2: share.reduce((sum, part, i) => sum + part * areaKm2[i]! * offShore[i]!, 0),
    isOpen: (longitude, latitude) => !isLand(longitude, latitude) && isOffShore(longitude, latitude),
  })
  if (!buffered) return { index, share, areaKm2, water, outsideWaterKm2 }
  const kept = Array.from(index, (_, i) => i).filter((i) => offShore[i] === 1)
  return {
    index: Uint32Array.from(kept, (i) => index[i]!),
    share: Float64Array.from(kept, (i) => share[i]!),
    areaKm2: Float64Array.from(kept, (i) => areaKm2[i]!),
    water: new Uint8Array(kept.length).fill(1),
    outsideWaterKm2,
  }
}
