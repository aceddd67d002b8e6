import type { Grid } from './grid'

/** The smallest rectangle round the cells of a region. Over the seam of a full circle it goes on, so columns may pass the grid's last. */
export interface CellBox {
  top: number
  left: number
  rows: number
  columns: number
  /** It goes once round the globe: its last column stands beside its first. */
  closed: boolean
  /** For each cell of the rectangle, row-major, its position in the list of cells; -1 for one that is not in it. */
  at: Int32Array
}

/**
 * How many columns of a grid make a full circle, so that the last of them stands beside the first; null where they make
 * none. A repeated column does not count. Projected grids have no seam.
 */
export function columnsRound(grid: Grid): number | null {
  if (grid.kind === 'axes') return axesRound(grid.lonEdges, grid.columns)
  if (grid.kind === 'transform') return null
  const across = grid.columns + 1
  let met = false
  for (let row = 0; row <= grid.rows; row++) {
    const away = grid.cornerLons[row * across + grid.columns]! - grid.cornerLons[row * across]!
    const up = grid.cornerLats[row * across + grid.columns]! - grid.cornerLats[row * across]!
    if (!Number.isFinite(away + up)) continue
    if (Math.abs(away - 360 * Math.round(away / 360)) > 1e-6 || Math.abs(up) > 1e-6) return null
    met = true
  }
  return met && grid.columns > 2 ? grid.columns : null
}

function axesRound(edges: Float64Array, columns: number): number | null {
  const way = edges[columns]! > edges[0]! ? 1 : -1
  let count = columns
  while (count > 1 && way * ((edges[count - 1]! + edges[count]!) / 2 - edges[0]!) >= 360 - 1e-9) count--
  const span = Math.abs(edges[count]! - edges[0]!)
  return count > 2 && Math.abs(span - 360) < (0.01 * span) / count ? count : null
}

/** `index`: row-major places in a grid of so many columns, each once, in any order. Empty: a rectangle without cells. */
export function cellBox(index: Uint32Array, gridColumns: number, round: number | null): CellBox {
  if (index.length === 0) return { top: 0, left: 0, rows: 0, columns: 0, closed: false, at: new Int32Array(0) }
  const used = new Uint8Array(gridColumns)
  let [top, bottom] = [Infinity, -1]
  for (const cell of index) {
    const row = Math.floor(cell / gridColumns)
    used[cell - row * gridColumns] = 1
    if (row < top) top = row
    if (row > bottom) bottom = row
  }
  const { left, columns } = round === null ? plainSpan(used) : spanRound(used, round)
  const rows = bottom - top + 1
  const at = new Int32Array(rows * columns).fill(-1)
  for (let i = 0; i < index.length; i++) {
    const row = Math.floor(index[i]! / gridColumns)
    const column = index[i]! - row * gridColumns - left
    at[(row - top) * columns + (column < 0 ? column + (round ?? 0) : column)] = i
  }
  return { top, left, rows, columns, closed: columns === round, at }
}

function plainSpan(used: Uint8Array): { left: number; columns: number } {
  const left = used.indexOf(1)
  return { left, columns: used.lastIndexOf(1) - left + 1 }
}

/** Begins behind the widest run of columns without a cell. */
function spanRound(used: Uint8Array, round: number): { left: number; columns: number } {
  let [widest, left, run] = [0, 0, 0]
  for (let step = 0; step < 2 * round; step++) {
    run = used[step % round] ? 0 : Math.min(run + 1, round)
    if (run > widest) {
      widest = run
      left = (step + 1) % round
    }
  }
  return { left, columns: round - widest }
}
