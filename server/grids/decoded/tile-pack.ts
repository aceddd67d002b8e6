import { constants, crc32, deflateSync, inflateSync } from 'node:zlib'
import { shuffled, unshuffled } from './shuffle'

/**
 * Decoded values of one layer, cut into square tiles that are packed one by one, so that a region, a map tile or a
 * single cell is read without the rest. A pack is a copy: whatever does not check is thrown away and made anew from
 * the original.
 */
export const tileSide = 64

/** Grids up to here are decoded whole when they are first read; of larger ones only what somebody watches. */
export const wholeGridCells = 4 * 1024 * 1024

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

/** What stands in the index: 0 for an absent tile (never decoded). */
const present = 1
const wide = 2
const withReasons = 4
const magic = 'OFFTILE2'
const indexEntry = 16
const headBytes = 8
/** A header names at most 32 reasons: a longer one is damage, and no memory is asked for it. */
const mostHeaderBytes = 64 * 1024
const empty = new Uint8Array(0)

export interface PackHeader extends PackShape {
  reasons: string[]
}

export interface TileEntry {
  flags: number
  offset: number
  length: number
  /** CRC-32 of the bytes. */
  check: number
}

export interface PackedTile {
  flags: number
  bytes: Uint8Array
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

/**
 * Values keep their every bit. Missing cells cost a bit each; the rest are plain float32 where all of them are float32,
 * which compressing would make a seventh smaller and four times slower to read. Float64 (unpacked integers) is deflated.
 */
export function packTile({ values, reasons }: TileCells): PackedTile {
  const mask = new Uint8Array(Math.ceil(values.length / 8))
  const narrow = seenValues(values, mask, new Float32Array(values.length))
  const seen = narrow ?? seenValues(values, mask, new Float64Array(values.length))!
  if (!reasons && seen.length === 0) return { flags: present, bytes: empty }
  const numbers = narrow ? bytesOf(narrow) : deflated(bytesOf(seen), 8)
  const head = Uint32Array.of(numbers.length, seen.length)
  const why = reasons ? deflated(bytesOf(reasons), 4) : empty
  return {
    flags: present | (narrow ? 0 : wide) | (reasons ? withReasons : 0),
    bytes: Buffer.concat([bytesOf(head), numbers, mask, why]),
  }
}

/** The seen values close together, and a bit in the mask for each; null where `room` cannot hold one exactly. */
function seenValues<T extends Float32Array | Float64Array>(values: Float64Array, mask: Uint8Array, room: T): T | null {
  let count = 0
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!
    if (Number.isNaN(value)) continue
    room[count] = value
    if (room[count] !== value) return null
    count++
    mask[i >> 3]! |= 1 << (i & 7)
  }
  return room.subarray(0, count) as T
}

/** RangeError (or zlib's own error) for bytes that are not this tile. */
export function unpackTile(flags: number, bytes: Uint8Array, cells: number): TileCells {
  const values = new Float64Array(cells).fill(NaN)
  if (bytes.length === 0) return { values, reasons: null }
  const own = bytes.byteOffset % 8 === 0 ? bytes : Uint8Array.from(bytes)
  const head = new Uint32Array(own.buffer, own.byteOffset, 2)
  const [length, count] = [head[0]!, head[1]!]
  const numbers = own.subarray(headBytes, headBytes + length)
  const mask = own.subarray(headBytes + length, headBytes + length + Math.ceil(cells / 8))
  const seen = flags & wide ? new Float64Array(inflated(numbers, count * 8, 8).buffer) : new Float32Array(numbers.buffer, numbers.byteOffset, count)
  if (numbers.length !== length || mask.length * 8 < cells || (!(flags & wide) && length !== count * 4)) throw new RangeError('These bytes are no tile of this size.')
  spread(seen, mask, values)
  if (!(flags & withReasons)) return { values, reasons: null }
  return { values, reasons: new Uint32Array(inflated(own.subarray(headBytes + length + mask.length), cells * 4, 4).buffer) }
}

/** Puts the seen values where the mask has a bit, eight cells at a time where all or none were seen. */
function spread(seen: Float32Array | Float64Array, mask: Uint8Array, values: Float64Array): void {
  for (let byte = 0, at = 0; byte < mask.length; byte++) {
    const bits = mask[byte]!
    if (bits === 0) continue
    const first = byte * 8
    if (bits === 255) for (let i = 0; i < 8; i++) values[first + i] = seen[at++]!
    else for (let i = 0; i < 8; i++) if (bits & (1 << i)) values[first + i] = seen[at++]!
  }
}

function bytesOf({ buffer, byteOffset, byteLength }: Uint32Array | Float32Array | Float64Array): Uint8Array {
  return new Uint8Array(buffer, byteOffset, byteLength)
}

/** Runs of equal bytes are all that decoded fields compress by; looking for more takes three times as long. */
function deflated(bytes: Uint8Array, width: number): Uint8Array {
  return deflateSync(shuffled(bytes, width), { level: 1, strategy: constants.Z_RLE })
}

function inflated(bytes: Uint8Array, length: number, width: number): Uint8Array {
  const plain = inflateSync(bytes, { chunkSize: Math.max(64, length) })
  if (plain.length !== length) throw new RangeError('These bytes are no tile of this size.')
  return unshuffled(plain, width)
}

/** The whole file. Absent tiles are those not in the map. */
export function encodePack(header: PackHeader, tiles: ReadonlyMap<number, PackedTile>): Buffer {
  // The index stands at a multiple of four bytes.
  const json = JSON.stringify(header)
  const text = Buffer.from(json + ' '.repeat((4 - (Buffer.byteLength(json) % 4)) % 4))
  const index = Buffer.alloc(tileCount(header) * indexEntry)
  const start = magic.length + 4 + text.length + index.length + 4
  let offset = start
  for (const [tile, { flags, bytes }] of tiles) {
    index.writeUInt32LE(flags, tile * indexEntry)
    index.writeUInt32LE(offset, tile * indexEntry + 4)
    index.writeUInt32LE(bytes.length, tile * indexEntry + 8)
    index.writeUInt32LE(crc32(bytes), tile * indexEntry + 12)
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
  const textLength = first.readUInt32LE(magic.length)
  return textLength > mostHeaderBytes ? null : magic.length + 4 + textLength + tileCount(shape) * indexEntry + 4
}

/** The front of a pack read back; null when it does not check or is of another grid. */
export function decodeFront(front: Buffer, shape: PackShape): { header: PackHeader; entries: (tile: number) => TileEntry } | null {
  const end = front.length - 4
  if (crc32(front.subarray(0, end)) !== front.readUInt32LE(end)) return null
  const textLength = front.readUInt32LE(magic.length)
  if (textLength % 4 !== 0) return null
  const header = JSON.parse(front.toString('utf8', magic.length + 4, magic.length + 4 + textLength)) as PackHeader
  if (header.rows !== shape.rows || header.columns !== shape.columns) return null
  const index = new Uint32Array(front.buffer, front.byteOffset + magic.length + 4 + textLength, tileCount(shape) * 4)
  return {
    header,
    entries: (tile) => ({ flags: index[tile * 4]!, offset: index[tile * 4 + 1]!, length: index[tile * 4 + 2]!, check: index[tile * 4 + 3]! }),
  }
}
