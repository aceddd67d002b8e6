/** Bytes of the file; throws where it has not so many. */
export type ByteReader = (offset: number, length: number) => Buffer

export interface StoredChunk {
  address: number
  bytes: number
}

const mostEntries = 500_000

interface Walk {
  dimensions: number
  found: Map<string, StoredChunk>
  /** Entries still looked at, so that nodes which point at each other end. */
  left: number
}

/**
 * All chunks of a version 1 B-tree, by their first cell (`0,300,600`). Null where something is unlike what it should
 * be, or a chunk was stored without one of its filters.
 */
export function chunkTree(read: ByteReader, address: number, dimensions: number): Map<string, StoredChunk> | null {
  const walk: Walk = { dimensions, found: new Map(), left: mostEntries }
  return visit(read, address, null, walk) ? walk.found : null
}

/** `level` is what the node above says; null for the root. */
function visit(read: ByteReader, address: number, level: number | null, walk: Walk): boolean {
  const head = read(address, 24)
  if (head.toString('latin1', 0, 4) !== 'TREE' || head[4] !== 1 || (level !== null && head[5] !== level)) return false
  const entries = head.readUInt16LE(6)
  walk.left -= entries + 1
  if (walk.left < 0) return false
  // A key: bytes, filter mask, the first cell along each dimension, and one more that is always 0.
  const keyBytes = 8 + 8 * (walk.dimensions + 1)
  const body = read(address + 24, entries * (keyBytes + 8))
  for (let i = 0; i < entries; i++) {
    const at = i * (keyBytes + 8)
    const child = Number(body.readBigUInt64LE(at + keyBytes))
    if (head[5]! > 0) {
      if (!visit(read, child, head[5]! - 1, walk)) return false
      continue
    }
    if (body.readUInt32LE(at + 4) !== 0) return false
    const first = Array.from({ length: walk.dimensions }, (_, d) => Number(body.readBigUInt64LE(at + 8 + 8 * d)))
    walk.found.set(first.join(), { address: child, bytes: body.readUInt32LE(at) })
  }
  return true
}
