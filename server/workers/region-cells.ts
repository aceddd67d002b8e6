import { tileBox, tilesAcross, tileSide, type PackShape } from '../grids/decoded/tile-pack'
import type { MaskedValues } from './read-masked'
import type { LayerTiles } from './read-tiles'
import type { RegionCellWeights } from './tasks'

/** Where the cells of one region lie in the tiles of a grid: worked out once, used for every layer on that grid. */
export interface RegionPlan {
  tiles: number[]
  cells: number
  /** Neighbouring cells in one tile, four numbers each: tile, first cell in it, first cell of the region, how many. */
  runs: Int32Array
}

export function planOf({ index }: Pick<RegionCellWeights, 'index'>, shape: PackShape): RegionPlan {
  const across = tilesAcross(shape)
  const runs: number[] = []
  const tiles = new Set<number>()
  let last: { tile: number; next: number; at: number } | null = null
  for (let i = 0; i < index.length; i++) {
    const row = Math.floor(index[i]! / shape.columns)
    const column = index[i]! - row * shape.columns
    const tile = Math.floor(row / tileSide) * across + Math.floor(column / tileSide)
    const box = tileBox(shape, tile)
    const offset = (row - box.row) * box.columns + column - box.column
    // Cells of two rows may follow each other in the tile, which is a run too.
    if (last && last.tile === tile && last.next === offset) runs[last.at]!++
    else {
      runs.push(tile, offset, i, 1)
      tiles.add(tile)
    }
    last = { tile, next: offset + 1, at: runs.length - 1 }
  }
  return { tiles: [...tiles], cells: index.length, runs: Int32Array.from(runs) }
}

/** A region's cells of one layer, in the order of its weights. */
export function cellsOf({ cells, runs }: RegionPlan, { tiles, reasons }: LayerTiles): MaskedValues {
  const values = new Float64Array(cells)
  let bits: Uint32Array | null = null
  for (let at = 0; at < runs.length; at += 4) {
    const tile = tiles.get(runs[at]!)!
    const [from, to, count] = [runs[at + 1]!, runs[at + 2]!, runs[at + 3]!]
    for (let i = 0; i < count; i++) values[to + i] = tile.values[from + i]!
    if (!tile.reasons) continue
    bits ??= new Uint32Array(cells)
    for (let i = 0; i < count; i++) bits[to + i] = tile.reasons[from + i]!
  }
  return { values, hidden: bits ? byReason(bits, reasons) : new Map() }
}

function byReason(bits: Uint32Array, reasons: readonly string[]): MaskedValues['hidden'] {
  const any = bits.reduce((all, one) => all | one, 0)
  const hidden: MaskedValues['hidden'] = new Map()
  for (const [at, reason] of reasons.entries()) {
    if ((any >>> at) & 1) hidden.set(reason, Uint8Array.from(bits, (one) => (one >>> at) & 1))
  }
  return hidden
}
