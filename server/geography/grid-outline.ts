import type { Grid } from '../../shared/science/grid'
import { emptyBits, setBit } from '../../shared/science/water-mask'
import { cellCentre } from '../grids/cell-centre'
import { isLand, landMask } from './land'

/** A bit a cell: 1 where its centre is water in the bundled land outline. A cell without a place is no water. */
export function outlineWater(grid: Grid): Uint8Array {
  const cells = grid.rows * grid.columns
  const bits = emptyBits(cells)
  if (grid.kind === 'axes') {
    const land = landMask(middles(grid.latEdges), middles(grid.lonEdges))
    for (let cell = 0; cell < cells; cell++) if (land[cell] === 0) setBit(bits, cell)
    return bits
  }
  for (let cell = 0; cell < cells; cell++) {
    const [longitude, latitude] = cellCentre(grid, cell)
    if (!Number.isNaN(longitude) && !isLand(longitude, latitude)) setBit(bits, cell)
  }
  return bits
}

function middles(edges: Float64Array): Float64Array {
  return Float64Array.from({ length: edges.length - 1 }, (_, i) => (edges[i]! + edges[i + 1]!) / 2)
}
