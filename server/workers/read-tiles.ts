import { rmSync } from 'node:fs'
import type { GridWindow } from '../../shared/science/grid'
import { openPack, writePack, type OpenPack } from '../grids/decoded/pack-file'
import { packTile, tileBox, tileCount, wholeGridCells, type PackShape, type PackedTile, type TileCells } from '../grids/decoded/tile-pack'
import { tileRectangles } from '../grids/decoded/tile-rectangles'
import { readMasked, type MaskedValues } from './read-masked'
import type { LayerPlace } from './tasks'

/** Tiles of one layer, with the list that the bits of their reasons stand for. */
export interface LayerTiles {
  shape: PackShape
  reasons: string[]
  tiles: Map<number, TileCells>
}

const mostReasons = 32

/**
 * The wanted tiles of a layer: from its pack where that has them, else from the original. With `keep` what was decoded
 * is added to the pack, so that the original is read once.
 */
export async function readTiles(layer: LayerPlace, wanted: readonly number[], keep: boolean): Promise<LayerTiles> {
  const shape = { rows: layer.rows, columns: layer.columns }
  const pack = layer.pack === null ? null : openPack(layer.pack, shape)
  try {
    const kept = pack && packedTiles(pack, wanted)
    const known: LayerTiles = { shape, reasons: pack?.header.reasons.slice() ?? [], tiles: kept ?? new Map() }
    const missing = wanted.filter((tile) => !known.tiles.has(tile))
    if (missing.length > 0) await decode(layer, known, missing, keep, pack)
    return known
  } catch (error) {
    if (!(error instanceof DamagedPack)) throw error
    rmSync(layer.pack!, { force: true })
  } finally {
    pack?.close()
  }
  return readTiles(layer, wanted, keep)
}

/** Decodes layers that nobody watches yet, so that a region drawn later finds them; very large ones wait for it. */
export async function decodeLayers({ layers }: { layers: readonly LayerPlace[] }): Promise<void> {
  for (const layer of layers) {
    const [cells, tiles] = [layer.rows * layer.columns, [...Array(tileCount(layer)).keys()]]
    if (cells <= wholeGridCells && layer.pack !== null && !decodedTiles(layer, tiles.slice(0, 1))) {
      await readTiles(layer, tiles, true)
    }
  }
}

/** The wanted tiles where all of them have been decoded before; else null, and nothing was read. */
export function decodedTiles(layer: LayerPlace, wanted: readonly number[]): LayerTiles | null {
  const shape = { rows: layer.rows, columns: layer.columns }
  const pack = layer.pack === null ? null : openPack(layer.pack, shape)
  if (!pack) return null
  try {
    return wanted.every((tile) => pack.has(tile)) ? { shape, reasons: pack.header.reasons, tiles: packedTiles(pack, wanted) } : null
  } catch (error) {
    if (!(error instanceof DamagedPack)) throw error
    rmSync(layer.pack!, { force: true })
    return null
  } finally {
    pack.close()
  }
}

class DamagedPack extends Error {}

function packedTiles(pack: OpenPack, wanted: readonly number[]): Map<number, TileCells> {
  try {
    return new Map(wanted.filter((tile) => pack.has(tile)).map((tile) => [tile, pack.cells(tile)]))
  } catch (cause) {
    throw new DamagedPack('A pack does not check.', { cause })
  }
}

async function decode(layer: LayerPlace, known: LayerTiles, missing: readonly number[], keep: boolean, pack: OpenPack | null): Promise<void> {
  const { shape } = known
  const keeping = keep && layer.pack !== null
  const all = keeping && shape.rows * shape.columns <= wholeGridCells
  const toRead = all ? [...Array(tileCount(shape)).keys()].filter((tile) => !pack?.has(tile)) : missing
  const added = new Map<number, PackedTile>()
  for (const { window, tiles } of tileRectangles(shape, toRead)) {
    const read = await readMasked(layer, window)
    for (const tile of tiles) {
      const cells = cutTile(read, window, tileBox(shape, tile), known.reasons)
      if (keeping) added.set(tile, packTile(cells))
      known.tiles.set(tile, cells)
    }
  }
  if (keeping) keepTiles(layer.pack!, known, added, pack)
}

function keepTiles(path: string, { shape, reasons }: LayerTiles, added: Map<number, PackedTile>, pack: OpenPack | null): void {
  const tiles = new Map<number, PackedTile>()
  for (let tile = 0; tile < tileCount(shape); tile++) {
    const packed = added.get(tile) ?? (pack?.has(tile) ? pack.packed(tile) : undefined)
    if (packed) tiles.set(tile, packed)
  }
  writePack(path, { ...shape, reasons }, tiles)
}

function cutTile({ values, hidden }: MaskedValues, window: GridWindow, box: GridWindow, reasons: string[]): TileCells {
  const cells = box.rows * box.columns
  const cut: TileCells = { values: new Float64Array(cells), reasons: null }
  const first = (box.row - window.row) * window.columns + box.column - window.column
  for (let row = 0; row < box.rows; row++) {
    const from = first + row * window.columns
    cut.values.set(values.subarray(from, from + box.columns), row * box.columns)
  }
  for (const [reason, hiddenCells] of hidden) {
    const bit = bitOf(reason, reasons)
    for (let row = 0, to = 0; row < box.rows; row++) {
      const from = first + row * window.columns
      for (let column = 0; column < box.columns; column++, to++) {
        if (!hiddenCells[from + column]) continue
        cut.reasons ??= new Uint32Array(cells)
        cut.reasons[to]! |= bit
      }
    }
  }
  return cut
}

/** The bit of a reason; beyond 32 of them the last stands for the rest. */
function bitOf(reason: string, reasons: string[]): number {
  let at = reasons.indexOf(reason)
  if (at < 0 && reasons.length < mostReasons) at = reasons.push(reason) - 1
  return (1 << (at < 0 ? mostReasons - 1 : at)) >>> 0
}
