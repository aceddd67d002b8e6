import type { ByteReader } from './hdf5-btree'

/** Where the chunks of a dataset are listed: shape of a chunk in cells, bytes of a cell, and the root of the list. */
export interface ChunkLayout {
  chunk: number[]
  cellBytes: number
  treeAddress: number
}

const dataLayout = 0x0008
const continuation = 0x0010
const mostMessages = 1000

/**
 * The chunk layout in the object header at `address` (HDF5 file format, versions 1 and 2 of the header, version 3 of the
 * layout, which is what NetCDF-4 writes). Null for every other layout: the library reads those.
 */
export function chunkLayout(read: ByteReader, address: number): ChunkLayout | null {
  for (const { type, body } of messages(read, address)) {
    if (type !== dataLayout) continue
    if (body[0] !== 3 || body[1] !== 2) return null
    const dimensions = body[2]!
    if (dimensions < 2 || dimensions > 9 || body.length < 11 + 4 * dimensions) return null
    const sizes = Array.from({ length: dimensions }, (_, i) => body.readUInt32LE(11 + 4 * i))
    return { chunk: sizes.slice(0, -1), cellBytes: sizes.at(-1)!, treeAddress: Number(body.readBigUInt64LE(3)) }
  }
  return null
}

/** The messages of an object header, whichever version it has. */
export function* messages(read: ByteReader, address: number): Generator<{ type: number; body: Buffer }> {
  const first = read(address, 16)
  yield* first.toString('latin1', 0, 4) === 'OHDR' ? newMessages(read, address) : oldMessages(read, address, first)
}

function* oldMessages(read: ByteReader, address: number, first: Buffer): Generator<{ type: number; body: Buffer }> {
  if (first[0] !== 1) return
  const blocks = [{ address: address + 16, length: first.readUInt32LE(8) }]
  for (let left = Math.min(first.readUInt16LE(2), mostMessages); blocks.length > 0; ) {
    const block = blocks.shift()!
    const bytes = read(block.address, block.length)
    for (let at = 0; at + 8 <= bytes.length && left > 0; left--) {
      const size = bytes.readUInt16LE(at + 2)
      const body = bytes.subarray(at + 8, at + 8 + size)
      const type = bytes.readUInt16LE(at)
      if (type === continuation && body.length >= 16) blocks.push(blockOf(body))
      else yield { type, body }
      at += 8 + size
    }
    if (left === 0) return
  }
}

function* newMessages(read: ByteReader, address: number): Generator<{ type: number; body: Buffer }> {
  const flags = read(address, 6)[5]!
  const sizeBytes = 1 << (flags & 3)
  const before = 6 + (flags & 0x20 ? 16 : 0) + (flags & 0x10 ? 4 : 0)
  const size = Number(read(address + before, 8).readUIntLE(0, Math.min(sizeBytes, 6)))
  const blocks = [{ address: address + before + sizeBytes, length: size }]
  const head = flags & 4 ? 6 : 4
  for (let left = mostMessages; blocks.length > 0 && left > 0; ) {
    const block = blocks.shift()!
    const bytes = read(block.address, block.length)
    for (let at = 0; at + head <= bytes.length && left > 0; left--) {
      const body = bytes.subarray(at + head, at + head + bytes.readUInt16LE(at + 1))
      if (bytes[at] === continuation && body.length >= 16) {
        // A later block begins with four letters and ends with a checksum.
        const { address: from, length } = blockOf(body)
        blocks.push({ address: from + 4, length: Math.max(0, length - 8) })
      } else yield { type: bytes[at]!, body }
      at += head + body.length
    }
  }
}

function blockOf(body: Buffer): { address: number; length: number } {
  return { address: Number(body.readBigUInt64LE(0)), length: Number(body.readBigUInt64LE(8)) }
}
