import { constants, crc32, deflateSync, inflateSync } from 'node:zlib'
import { shuffled, unshuffled } from './shuffle'

/**
 * Decoded values of one layer, cut into square tiles that are compressed one by one, so that a region, a map tile or a
 * single cell is read without the rest. A pack is a copy: whatever does not check is thrown away and made anew from
 * the original.
 */
export const tileSide = 64

export interface PackShape {
  rows: number
  columns: number
}

/** The cells of one tile, row-major, cut off at the grid's edge. */
export interface TileCells {
  /** NaN is missing. */
  values: Float64Array
  /** For each cell the reasons it was hidden for, one bit each by the pack's list; null when nothing was hidden. */
  reasons: Uint32Array | null
}

/** What stands in the index: 0 an absent tile (never decoded), else 1 with these added. */
const wide = 2
const withReasons = 4
const magic = 'OFFTILE1'
const indexEntry = 12

export interface PackHeader extends PackShape {
  reasons: string[]
}

export interface TileEntry {
  flags: number
  offset: number
  length: number
}

export interface PackedTile {
  flags: number
  bytes: Buffer
}

export const tilesAcross = (shape: PackShape) => Math.ceil(shape.columns / tileSide)
export const tileCount = (shape: PackShape) => tilesAcross(shape) * Math.ceil(shape.rows / tileSide)

/** First row and column of a tile, and how many of each it has. */
export function tileBox(shape: PackShape, tile: number): { row: number; column: number; rows: number; columns: number } {
  const across = tilesAcross(shape)
  const row = Math.floor(tile / across) * tileSide
  const column = (tile % across) * tileSide
  return { row, column, rows: Math.min(tileSide, shape.rows - row), columns: Math.min(tileSide, shape.columns - column) }
}

/** Values keep their every bit: as float32 where all of them are float32, else as float64. */
export function packTile({ values, reasons }: TileCells): PackedTile {
  if (!reasons && values.every(Number.isNaN)) return { flags: 1, bytes: Buffer.alloc(0) }
  const narrow = values.every((value) => Math.fround(value) === value || Number.isNaN(value))
  const numbers = narrow ? Float32Array.from(values) : values
  const planes = [shuffled(new Uint8Array(numbers.buffer, numbers.byteOffset, numbers.byteLength), numbers.BYTES_PER_ELEMENT)]
  if (reasons) planes.push(shuffled(new Uint8Array(reasons.buffer, reasons.byteOffset, reasons.byteLength), 4))
  // Runs of equal bytes are all that decoded fields compress by; looking for more takes three times as long.
  const bytes = deflateSync(Buffer.concat(planes), { level: 1, strategy: constants.Z_RLE })
  return { flags: 1 | (narrow ? 0 : wide) | (reasons ? withReasons : 0), bytes }
}

/** RangeError (or zlib's own error) for bytes that are not this tile. */
export function unpackTile(flags: number, bytes: Uint8Array, cells: number): TileCells {
  if (bytes.length === 0) return { values: new Float64Array(cells).fill(NaN), reasons: null }
  const width = flags & wide ? 8 : 4
  const planes = inflateSync(bytes)
  const numbers = cells * width
  if (planes.length !== numbers + (flags & withReasons ? cells * 4 : 0)) throw new RangeError('These bytes are no tile of this size.')
  const plain = unshuffled(planes.subarray(0, numbers), width)
  const values = width === 8 ? new Float64Array(plain.buffer) : Float64Array.from(new Float32Array(plain.buffer))
  const reasons = flags & withReasons ? new Uint32Array(unshuffled(planes.subarray(numbers), 4).buffer) : null
  return { values, reasons }
}

/** The whole file. Absent tiles are those not in the map. */
export function encodePack(header: PackHeader, tiles: ReadonlyMap<number, PackedTile>): Buffer {
  const text = Buffer.from(JSON.stringify(header))
  const index = Buffer.alloc(tileCount(header) * indexEntry)
  const start = magic.length + 4 + text.length + index.length + 4
  let offset = start
  for (const [tile, { flags, bytes }] of tiles) {
    index.writeUInt32LE(flags, tile * indexEntry)
    index.writeUInt32LE(offset, tile * indexEntry + 4)
    index.writeUInt32LE(bytes.length, tile * indexEntry + 8)
    offset += bytes.length
  }
  const length = Buffer.alloc(4)
  length.writeUInt32LE(text.length)
  const front = Buffer.concat([Buffer.from(magic), length, text, index])
  const check = Buffer.alloc(4)
  check.writeUInt32LE(crc32(front))
  return Buffer.concat([front, check, ...[...tiles.values()].map((tile) => tile.bytes)])
}

/** How many bytes the front of a pack has, from its first twelve; null when they are no pack's. */
export function frontLength(first: Buffer, shape: PackShape): number | null {
  if (first.length < magic.length + 4 || first.toString('latin1', 0, magic.length) !== magic) return null
  return magic.length + 4 + first.readUInt32LE(magic.length) + tileCount(shape) * indexEntry + 4
}

/** The front of a pack read back; null when it does not check or is of another grid. */
export function decodeFront(front: Buffer, shape: PackShape): { header: PackHeader; entries: (tile: number) => TileEntry } | null {
  const end = front.length - 4
  if (crc32(front.subarray(0, end)) !== front.readUInt32LE(end)) return null
  const textLength = front.readUInt32LE(magic.length)
  const header = JSON.parse(front.toString('utf8', magic.length + 4, magic.length + 4 + textLength)) as PackHeader
  if (header.rows !== shape.rows || header.columns !== shape.columns) return null
  const index = magic.length + 4 + textLength
  return {
    header,
    entries: (tile) => ({
      flags: front.readUInt32LE(index + tile * indexEntry),
      offset: front.readUInt32LE(index + tile * indexEntry + 4),
      length: front.readUInt32LE(index + tile * indexEntry + 8),
    }),
  }
}
