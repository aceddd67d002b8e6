import { closeSync, openSync } from 'node:fs'
import { inflateSync } from 'node:zlib'
import type { Dataset, File } from 'h5wasm'
import { unshuffled } from '../decoded/shuffle'
import { LayerRefused } from '../layer-refused'
import { readExactly } from './bytes'
import { chunkTree, type ByteReader, type StoredChunk } from './hdf5-btree'
import { chunkLayout, type ChunkLayout } from './hdf5-layout'
import { typeBytes, type NumberType } from './raw-netcdf'

/** Reads blocks of chunked datasets without the library; null for what it does not know, which the library then reads. */
export interface ChunkReader {
  read(name: string, type: NumberType, dataset: Dataset, start: number[], count: number[]): Float64Array | null
  close(): void
}

interface Chunked extends ChunkLayout {
  chunks: Map<string, StoredChunk>
  shuffle: boolean
  deflate: boolean
}

const [deflateFilter, shuffleFilter] = [1, 2]

/** Chunks unpacked last, of all files this thread has open: 100 MB hold both rows of large chunks that a window lies across. */
const kept = new Map<string, Uint8Array>()
const mostKeptBytes = 100 * 1024 * 1024
let keptBytes = 0
let readers = 0

/**
 * NetCDF-4's usual storage (chunks under a version 1 B-tree, shuffle and deflate, little-endian), each chunk unpacked once
 * however many windows cut it; the library unpacks it for each. Whatever is unlike this, cannot be unpacked or was never
 * written is left to the library and its error messages.
 */
export function openChunkReader(path: string, library: { create_object_reference(file: bigint, name: string): Uint8Array }, file: File): ChunkReader {
  const descriptor = openSync(path, 'r')
  const read: ByteReader = (offset, length) => readExactly(descriptor, offset, length)
  const known = new Map<string, Chunked | null>()
  const reader = `${++readers}\0`

  const chunkedOf = (name: string, type: NumberType, dataset: Dataset): Chunked | null => {
    const before = known.get(name)
    if (before !== undefined) return before
    const found = orNull(() => describe(read, addressOf(library, file, dataset), type, dataset))
    known.set(name, found)
    return found
  }
  const chunkBytes = (name: string, first: string, chunked: Chunked): Uint8Array | null => {
    const key = `${reader}${name}\0${first}`
    const before = kept.get(key)
    if (before) return before
    const stored = chunked.chunks.get(first)
    const packed = stored ? orNull(() => read(stored.address, stored.bytes)) : null
    const bytes = packed && unpack(name, packed, chunked)
    if (bytes) keep(key, bytes)
    return bytes
  }

  return {
    read: (name, type, dataset, start, count) => {
      const chunked = chunkedOf(name, type, dataset)
      return chunked && assemble(chunked, type, start, count, (first) => chunkBytes(name, first, chunked))
    },
    close: () => {
      closeSync(descriptor)
      for (const key of kept.keys()) if (key.startsWith(reader)) drop(key)
    },
  }
}

function keep(key: string, bytes: Uint8Array): void {
  kept.set(key, bytes)
  keptBytes += bytes.length
  for (const oldest of kept.keys()) {
    if (keptBytes <= mostKeptBytes) return
    drop(oldest)
  }
}

function drop(key: string): void {
  keptBytes -= kept.get(key)?.length ?? 0
  kept.delete(key)
}

/** Null where the bytes are not as they should be, which the library then says in its own words; a fault of ours stays one. */
export function orNull<T>(work: () => T): T | null {
  try {
    return work()
  } catch (error) {
    if (error instanceof LayerRefused || error instanceof RangeError || isOfZlib(error)) return null
    throw error
  }
}

function isOfZlib(error: unknown): boolean {
  return error instanceof Error && 'code' in error && /^(Z_|ERR_BUFFER)/.test(String(error.code))
}

/** An object reference is the address of the object's header. */
export function addressOf(library: { create_object_reference(file: bigint, name: string): Uint8Array }, file: File, dataset: Dataset): number {
  const bytes = Buffer.from(library.create_object_reference(file.file_id, dataset.path))
  return Number(bytes.readBigUInt64LE(0))
}

function describe(read: ByteReader, address: number, type: NumberType, dataset: Dataset): Chunked | null {
  const { littleEndian, chunks, shape } = dataset.metadata
  const filters = dataset.filters.map(({ id }) => id)
  const usual = [[shuffleFilter, deflateFilter], [deflateFilter], [shuffleFilter], []]
  if (!littleEndian || !chunks || !shape || !usual.some((ids) => ids.join() === filters.join())) return null
  const layout = chunkLayout(read, address)
  // What the library says of the same dataset must agree before a byte is trusted.
  if (!layout || layout.cellBytes !== typeBytes[type] || layout.chunk.join() !== chunks.join()) return null
  const tree = chunkTree(read, layout.treeAddress, shape.length)
  return tree && { ...layout, chunks: tree, shuffle: filters.includes(shuffleFilter), deflate: filters.includes(deflateFilter) }
}

/** Null where zlib cannot read it. A chunk of another size than it should be the library would cut, or fill up, and say nothing. */
function unpack(name: string, stored: Uint8Array, { chunk, cellBytes, shuffle, deflate }: Chunked): Uint8Array | null {
  const expected = chunk.reduce((product, n) => product * n, cellBytes)
  let plain = stored
  try {
    if (deflate) plain = inflateSync(stored, { maxOutputLength: expected, chunkSize: Math.max(64, expected) })
  } catch (error) {
    if (error instanceof RangeError) throw wrongSize(name, expected)
    if (!isOfZlib(error)) throw error
    return null
  }
  if (plain.length !== expected) throw wrongSize(name, expected)
  return shuffle && cellBytes > 1 ? unshuffled(plain, cellBytes) : Uint8Array.from(plain)
}

function wrongSize(name: string, expected: number): LayerRefused {
  return new LayerRefused('damaged', `The file is damaged: ${name} cannot be read back whole.`, { what: name, reason: `a chunk does not unpack to its ${expected} bytes` })
}

/** The block, gathered from its chunks; null as soon as one of them cannot be had. */
function assemble({ chunk }: Chunked, type: NumberType, start: number[], count: number[], bytesOf: (first: string) => Uint8Array | null): Float64Array | null {
  const rank = count.length
  const values = new Float64Array(count.reduce((product, n) => product * n, 1))
  const first = start.map((from, d) => from - (from % chunk[d]!))
  const at = [...first]
  for (;;) {
    const bytes = bytesOf(at.join())
    if (!bytes) return null
    const numbers = numbersIn(bytes, type)
    if (!numbers) return null
    copyOverlap(numbers, chunk, at, values, start, count)
    let d = rank - 1
    for (; d >= 0; d--) {
      at[d]! += chunk[d]!
      if (at[d]! < start[d]! + count[d]!) break
      at[d] = first[d]!
    }
    if (d < 0) return values
  }
}

function copyOverlap(numbers: ArrayLike<number>, chunk: number[], at: number[], values: Float64Array, start: number[], count: number[]): void {
  const rank = count.length
  const low = at.map((from, d) => Math.max(from, start[d]!))
  const high = at.map((from, d) => Math.min(from + chunk[d]!, start[d]! + count[d]!))
  const last = rank - 1
  const width = high[last]! - low[last]!
  const row = [...low]
  for (;;) {
    let [from, to] = [0, 0]
    for (let d = 0; d < rank; d++) {
      from = from * chunk[d]! + row[d]! - at[d]!
      to = to * count[d]! + row[d]! - start[d]!
    }
    for (let i = 0; i < width; i++) values[to + i] = numbers[from + i]!
    let d = last - 1
    for (; d >= 0; d--) {
      if (++row[d]! < high[d]!) break
      row[d] = low[d]!
    }
    if (d < 0) return
  }
}

/** 64-bit integers are left to the library: they lose digits above 2^53, and it knows which. */
function numbersIn({ buffer, byteOffset, byteLength }: Uint8Array, type: NumberType): ArrayLike<number> | null {
  const length = byteLength / typeBytes[type]
  switch (type) {
    case 'i1': return new Int8Array(buffer, byteOffset, length)
    case 'u1': return new Uint8Array(buffer, byteOffset, length)
    case 'i2': return new Int16Array(buffer, byteOffset, length)
    case 'u2': return new Uint16Array(buffer, byteOffset, length)
    case 'i4': return new Int32Array(buffer, byteOffset, length)
    case 'u4': return new Uint32Array(buffer, byteOffset, length)
    case 'f4': return new Float32Array(buffer, byteOffset, length)
    case 'f8': return new Float64Array(buffer, byteOffset, length)
    default: return null
  }
}
