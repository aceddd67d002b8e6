import type { GridWindow } from '../../shared/science/grid'
import { tileBox, tilesAcross, tileSide } from '../grids/decoded/tile-pack'
import { readMasked, type MaskedValues } from './read-masked'
import { decodedTiles, type LayerTiles } from './read-tiles'
import type { LayerPlace } from './tasks'

/** A layer in a window, with what was hidden of it: from its decoded tiles where all of them are at hand, else from the original. */
export async function readWindow(layer: LayerPlace, window: GridWindow): Promise<MaskedValues> {
  const tiles = decodedTiles(layer, tilesOf(layer, window))
  return tiles ? assembled(tiles, window) : readMasked(layer, window)
}

function tilesOf(layer: Pick<LayerPlace, 'rows' | 'columns'>, { row, column, rows, columns }: GridWindow): number[] {
  const across = tilesAcross(layer)
  const tiles: number[] = []
  for (let y = Math.floor(row / tileSide); y * tileSide < row + rows; y++) {
    for (let x = Math.floor(column / tileSide); x * tileSide < column + columns; x++) tiles.push(y * across + x)
  }
  return tiles
}

function assembled({ shape, tiles, reasons }: LayerTiles, window: GridWindow): MaskedValues {
  const values = new Float64Array(window.rows * window.columns)
  const hidden: MaskedValues['hidden'] = new Map()
  for (const [tile, cells] of tiles) {
    const box = tileBox(shape, tile)
    const left = Math.max(box.column, window.column)
    const right = Math.min(box.column + box.columns, window.column + window.columns)
    const bottom = Math.min(box.row + box.rows, window.row + window.rows)
    for (let row = Math.max(box.row, window.row); row < bottom; row++) {
      const from = (row - box.row) * box.columns + left - box.column
      const to = (row - window.row) * window.columns + left - window.column
      values.set(cells.values.subarray(from, from + right - left), to)
      if (cells.reasons) addReasons(hidden, reasons, cells.reasons.subarray(from, from + right - left), to, values.length)
    }
  }
  return { values, hidden }
}

function addReasons(hidden: MaskedValues['hidden'], reasons: readonly string[], bits: Uint32Array, to: number, length: number): void {
  const any = bits.reduce((all, one) => all | one, 0)
  for (const [at, reason] of reasons.entries()) {
    if (!((any >>> at) & 1)) continue
    const cells = hidden.get(reason) ?? new Uint8Array(length)
    hidden.set(reason, cells)
    for (let i = 0; i < bits.length; i++) cells[to + i]! |= (bits[i]! >>> at) & 1
  }
}
