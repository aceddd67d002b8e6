import { columnsRound } from '../../shared/science/cell-box'
import type { Grid } from '../../shared/science/grid'
import { polygonAreaKm2 } from '../../shared/science/ring-area'
import { bitAt } from '../../shared/science/water-mask'
import { wholeWaterCells } from '../../shared/science/whole-water'
import { isLand } from '../geography/land'
import { cellCentre } from '../grids/cell-centre'
import { checkOutline } from './check-outline'
import type { GridCount, MeasuredGrid, OutlineTasks } from './outline-tasks'
import { weighGrid, type GridWeights } from './weigh-grid'

/** Above this many cells a count is only estimated, so that an answer comes while somebody draws. */
const mostCells = 100_000

/** Checks an outline and counts what each grid would hold of it. */
export function measureOutline({ sent, inland, shoreBufferKm, grids }: OutlineTasks['measureOutline']['input']): OutlineTasks['measureOutline']['output'] {
  const outcome = checkOutline({ sent, inland })
  if (!('outline' in outcome)) return outcome
  const { geometry, areaKm2 } = outcome.outline
  const counts = grids.map((one): GridCount => {
    const expected = (one.grid.rows * one.grid.columns * areaKm2) / boxAreaKm2(one)
    if (expected > mostCells) return { exact: false, cells: Math.round(expected), wholeCells: Math.round(expected), waterAreaKm2: null, nearLandShare: null }
    const { mask } = one
    const weights = weighGrid(geometry, one.grid, shoreBufferKm)
    if (mask) weights.water = Uint8Array.from(weights.index, (cell) => bitAt(mask, cell))
    return { exact: true, cells: weights.index.length, wholeCells: wholeWaterCells(weights), ...waterOf(one, weights) }
  })
  return { outline: outcome.outline, counts }
}

function boxAreaKm2({ west, south, east, north }: MeasuredGrid): number {
  return polygonAreaKm2({ type: 'Polygon', coordinates: [[[west, south], [east, south], [east, north], [west, north], [west, south]]] })
}

/** Water of the region, and the share of it in cells beside which (corners too) a cell is land by the mask. */
function waterOf({ grid, mask }: MeasuredGrid, { index, share, areaKm2, water }: GridWeights): Pick<GridCount, 'waterAreaKm2' | 'nearLandShare'> {
  const landOf = new Map<number, boolean>()
  const land = (cell: number) => {
    const known = landOf.get(cell)
    if (known !== undefined) return known
    const found = mask ? bitAt(mask, cell) === 0 : isLand(...cellCentre(grid, cell))
    landOf.set(cell, found)
    return found
  }
  for (const [i, cell] of index.entries()) if (water[i] === 1) landOf.set(cell, false)
  const round = columnsRound(grid)
  let [waterKm2, nearKm2] = [0, 0]
  for (const [i, cell] of index.entries()) {
    if (water[i] === 0) continue
    const part = share[i]! * areaKm2[i]!
    waterKm2 += part
    if (neighbours(grid, cell, round).some(land)) nearKm2 += part
  }
  return { waterAreaKm2: waterKm2, nearLandShare: waterKm2 > 0 ? nearKm2 / waterKm2 : null }
}

function neighbours({ rows, columns }: Grid, cell: number, round: number | null): number[] {
  const [row, column] = [Math.floor(cell / columns), cell % columns]
  const around: number[] = []
  for (let r = Math.max(0, row - 1); r <= Math.min(rows - 1, row + 1); r++) {
    for (const c of [column - 1, column, column + 1]) {
      const at = round === null ? c : (c + round) % round
      if (at >= 0 && at < columns && !(r === row && at === column)) around.push(r * columns + at)
    }
  }
  return around
}
