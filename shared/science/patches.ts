import type { CellBox } from './cell-box'
import { isPart, isWater, isWhole, type RegionOutline } from './region-outline'

/** Cells at or above a level that hang together. */
export interface Patch {
  /** Share times area of its cells. */
  areaKm2: number
  cells: number
  greatest: number
  /** Position in the lists of the cell with the greatest value, the first of equals. */
  greatestAt: number
  /** It holds a cell that the outline cuts, or one beside a cell that does not belong to the region: the water may go on. */
  touchesEdge: boolean
  /** It lies beside water that was not seen. */
  touchesUnseen: boolean
}

export interface Patches {
  /** By area, the largest first; of equal ones the one with the greater value, then the one that comes first. */
  patches: Patch[]
  /** For each cell its place in `patches`, -1 where it is in none. */
  labels: Int32Array
  /** What was smaller than the minimum. */
  dropped: { patches: number; cells: number; areaKm2: number }
}

/**
 * Connected patches of a region: cells with a value at or above `level`, joined over edges and corners (8 neighbours;
 * over the seam where the box is closed; not across a pole). `values` in the order of the box's positions and of the
 * outline; NaN and infinities are missing. Every valid cell counts, as in the figures, so areas add up to the area above
 * the level. Missing land (not water of the mask) is a shore and makes no patch open. RangeError for lists of different
 * lengths or a level that is no number. Method: Rosenfeld and Pfaltz 1966, by flooding.
 */
export function findPatches(values: Float64Array, { weightKm2, kind }: RegionOutline, box: CellBox, level: number, minimumCells = 1): Patches {
  if (values.length !== kind.length) throw new RangeError('Values and outline of a region have one length.')
  if (!Number.isFinite(level)) throw new RangeError(`A level is a number, not ${level}.`)
  const labels = new Int32Array(values.length).fill(-1)
  const stack = new Int32Array(values.length)
  const { rows, columns, closed, at } = box
  const found: Patch[] = []
  const isAbove = (i: number) => (kind[i]! & isPart) !== 0 && Number.isFinite(values[i]) && values[i]! >= level
  for (let seed = 0; seed < at.length; seed++) {
    const first = at[seed]!
    if (first < 0 || labels[first] !== -1 || !isAbove(first)) continue
    const patch: Patch = { areaKm2: 0, cells: 0, greatest: -Infinity, greatestAt: first, touchesEdge: false, touchesUnseen: false }
    labels[first] = found.length
    stack[0] = seed
    for (let depth = 1; depth > 0; ) {
      const cell = stack[--depth]!
      const i = at[cell]!
      patch.areaKm2 += weightKm2[i]!
      patch.cells++
      if (values[i]! > patch.greatest || (values[i] === patch.greatest && i < patch.greatestAt)) {
        patch.greatest = values[i]!
        patch.greatestAt = i
      }
      if (!(kind[i]! & isWhole)) patch.touchesEdge = true
      const row = Math.floor(cell / columns)
      for (let down = -1; down <= 1; down++) {
        for (let across = -1; across <= 1; across++) {
          const beside = row + down
          let column = cell - row * columns + across
          if (closed) column = (column + columns) % columns
          const inside = beside >= 0 && beside < rows && column >= 0 && column < columns
          const next = inside ? at[beside * columns + column]! : -1
          if (next < 0 || !(kind[next]! & isPart)) patch.touchesEdge = true
          else if (isAbove(next)) {
            if (labels[next] !== -1) continue
            labels[next] = found.length
            stack[depth++] = beside * columns + column
          } else if (!Number.isFinite(values[next]) && kind[next]! & isWater) patch.touchesUnseen = true
        }
      }
    }
    found.push(patch)
  }
  return inOrder(found, labels, minimumCells)
}

function inOrder(found: readonly Patch[], labels: Int32Array, minimumCells: number): Patches {
  const kept = [...found.keys()].filter((at) => found[at]!.cells >= minimumCells)
  kept.sort((a, b) => found[b]!.areaKm2 - found[a]!.areaKm2 || found[b]!.greatest - found[a]!.greatest || found[a]!.greatestAt - found[b]!.greatestAt)
  const places = new Int32Array(found.length).fill(-1)
  for (const [place, at] of kept.entries()) places[at] = place
  for (let i = 0; i < labels.length; i++) if (labels[i] !== -1) labels[i] = places[labels[i]!]!
  const dropped = { patches: 0, cells: 0, areaKm2: 0 }
  for (const [at, patch] of found.entries()) {
    if (places[at] !== -1) continue
    dropped.patches++
    dropped.cells += patch.cells
    dropped.areaKm2 += patch.areaKm2
  }
  return { patches: kept.map((at) => found[at]!), labels, dropped }
}
