import { randomUUID } from 'node:crypto'
import { closeSync, mkdirSync, openSync, readSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { dirname } from 'node:path'
import { crc32 } from 'node:zlib'
import { decodeFront, encodePack, frontLength, tileBox, unpackTile, type PackHeader, type PackShape, type PackedTile, type TileCells, type TileEntry } from './tile-pack'

/** A pack that is open for reading. */
export interface OpenPack {
  header: PackHeader
  has(tile: number): boolean
  /** As stored, to be carried into another pack. */
  packed(tile: number): PackedTile
  /** Throws when the bytes do not check. */
  cells(tile: number): TileCells
  close(): void
}

const firstBytes = 4096

/** Opens a pack of a grid of this shape; null when there is none, or when it is not whole. */
export function openPack(path: string, shape: PackShape): OpenPack | null {
  const fd = openOrNull(path)
  if (fd === null) return null
  const front = readFront(fd, shape)
  if (!front) {
    closeSync(fd)
    return null
  }
  const bytesOf = ({ offset, length, check }: TileEntry) => {
    const bytes = read(fd, offset, length)
    if (bytes.length !== length || crc32(bytes) !== check) throw new RangeError('A tile does not check.')
    return bytes
  }
  return {
    header: front.header,
    has: (tile) => front.entries(tile).flags !== 0,
    packed: (tile) => {
      const entry = front.entries(tile)
      return { flags: entry.flags, bytes: bytesOf(entry) }
    },
    cells: (tile) => {
      const entry = front.entries(tile)
      const { rows, columns } = tileBox(shape, tile)
      return unpackTile(entry.flags, bytesOf(entry), rows * columns)
    },
    close: () => closeSync(fd),
  }
}

/**
 * Puts a pack in its place at once: readers see the one before or this one. Written without waiting for other threads, which
 * takes a third of the time of asking them to.
 */
export function writePack(path: string, header: PackHeader, tiles: ReadonlyMap<number, PackedTile>): void {
  const temporary = `${path}.${randomUUID()}`
  const bytes = encodePack(header, tiles)
  try {
    writeWhereFolderIs(temporary, bytes)
    renameSync(temporary, path)
  } catch (error) {
    rmSync(temporary, { force: true })
    throw error
  }
}

/** The folder is made when it turns out to be missing: looking first costs more than the writing. */
function writeWhereFolderIs(path: string, bytes: Uint8Array): void {
  try {
    writeFileSync(path, bytes)
  } catch (error) {
    if (!(error instanceof Error && 'code' in error && error.code === 'ENOENT')) throw error
    mkdirSync(dirname(path), { recursive: true })
    writeFileSync(path, bytes)
  }
}

function openOrNull(path: string): number | null {
  try {
    return openSync(path, 'r')
  } catch {
    return null
  }
}

function readFront(fd: number, shape: PackShape) {
  const first = read(fd, 0, firstBytes)
  const length = frontLength(first, shape)
  if (length === null) return null
  const front = length <= first.length ? first.subarray(0, length) : read(fd, 0, length)
  return front.length < length ? null : decodeFront(front, shape)
}

function read(fd: number, offset: number, length: number): Buffer {
  // In memory of its own, so that numbers in it can be looked at in place.
  const bytes = Buffer.allocUnsafeSlow(length)
  let got = 0
  while (got < length) {
    const more = readSync(fd, bytes, got, length - got, offset + got)
    if (more === 0) break
    got += more
  }
  return bytes.subarray(0, got)
}
