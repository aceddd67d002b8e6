import type { CellBox } from './cell-box'

/** Corner of a cell: rows and columns count edges, so the corner 0, 0 lies before the first cell. Columns go on past the grid's last over its seam. */
export type GridCorner = readonly [row: number, column: number]

/**
 * Outlines of patches along the edges of their cells: for each label from 0 to `count - 1` its closed rings, holes
 * among them, the first corner repeated at the end; corners in a straight line are left out unless `everyCorner`.
 * Where two cells of a patch meet at a corner alone, the line goes on with the same cell, so rings touch and never cross.
 */
export function patchOutlines(labels: Int32Array, count: number, box: CellBox, everyCorner = false): GridCorner[][][] {
  const { rows, columns, closed, at } = box
  const labelAt = (row: number, column: number): number => {
    const place = closed ? (column + columns) % columns : column
    if (row < 0 || row >= rows || place < 0 || place >= columns) return -1
    const i = at[row * columns + place]!
    return i < 0 ? -1 : labels[i]!
  }
  const rings: GridCorner[][][] = Array.from({ length: count }, () => [])
  const walked = new Uint8Array(rows * columns)
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) {
      const label = labelAt(row, column)
      if (label < 0 || label >= count) continue
      for (let side = 0; side < 4; side++) {
        const [down, across] = beyond[side]!
        if (walked[row * columns + column]! & (1 << side) || labelAt(row + down, column + across) === label) continue
        rings[label]!.push(walk({ row, column, side, label }))
      }
    }
  }
  return rings

  /** Follows the edge with the patch on the right hand: along the top of a cell to the right, down its right side, and so on. */
  function walk(start: { row: number; column: number; side: number; label: number }): GridCorner[] {
    let { row, column, side } = start
    const ring: GridCorner[] = []
    let before = -1
    for (;;) {
      const place = closed ? ((column % columns) + columns) % columns : column
      const bit = 1 << side
      if (walked[row * columns + place]! & bit) break
      walked[row * columns + place]! |= bit
      if (everyCorner || side !== before) ring.push(cornerOf(row, column, side))
      before = side
      const [ahead, aside] = along[side]!
      const [out, over] = beyond[side]!
      if (labelAt(row + ahead, column + aside) !== start.label) side = (side + 1) % 4
      else if (labelAt(row + ahead + out, column + aside + over) !== start.label) {
        row += ahead
        column += aside
      } else {
        row += ahead + out
        column += aside + over
        side = (side + 3) % 4
      }
    }
    // The first corner may lie in the middle of a straight line.
    if (!everyCorner && before === start.side && ring.length > 4) ring.shift()
    // Round the globe a ring ends where it began, one turn on.
    ring.push([ring[0]![0], ring[0]![1] + column - start.column])
    return ring.map(([r, c]) => [r + box.top, c + box.left])
  }
}

/** Sides of a cell in turn: top, right, bottom, left. Which cell lies beyond each, and which comes next along it. */
const beyond = [[-1, 0], [0, 1], [1, 0], [0, -1]] as const
const along = [[0, 1], [1, 0], [0, -1], [-1, 0]] as const

/** The corner a side begins at. */
function cornerOf(row: number, column: number, side: number): GridCorner {
  return [row + (side === 2 || side === 3 ? 1 : 0), column + (side === 1 || side === 2 ? 1 : 0)]
}
