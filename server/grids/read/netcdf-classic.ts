import { closeSync, openSync } from 'node:fs'
import { readExactly } from './bytes'
import { type ClassicVariable, readClassicHeader } from './netcdf-classic-header'
import { type NumberType, type RawNetcdf, typeBytes } from './raw-netcdf'

const readAhead = 128 * 1024
const farApart = 8 * 1024
const longestRead = 1024 * 1024

/** A classic NetCDF file (CDF-1, CDF-2, CDF-5): blocks are read from where the header says they are. */
export function openClassic(path: string, fileSize: number): RawNetcdf {
  const descriptor = openSync(path, 'r')
  try {
    const header = readClassicHeader(descriptor, fileSize)
    const byName = new Map(header.variables.map((variable) => [variable.name, variable]))
    return {
      format: 'netcdf-classic',
      variables: header.variables,
      attributes: header.attributes,
      warnings: [],
      read: ({ name }, start, count) =>
        readBlock(descriptor, byName.get(name)!, header.recordBytes, fileSize, start, count),
      readWords: ({ name }, start, count) => {
        // Big-endian: each number is a pair of words, the high one first.
        const variable = byName.get(name)!
        const pairs: ClassicVariable = { ...variable, type: 'u4', dimensions: [...variable.dimensions, { name: '', size: 2 }] }
        const words = readBlock(descriptor, pairs, header.recordBytes, fileSize, [...start, 0], [...count, 2])
        const half = (at: number) => Uint32Array.from({ length: words.length / 2 }, (_, i) => words[2 * i + at]!)
        return { low: half(1), high: half(0) }
      },
      close: () => closeSync(descriptor),
    }
  } catch (error) {
    closeSync(descriptor)
    throw error
  }
}

/**
 * Reads a block of a variable in runs of neighbouring numbers. Runs that lie close together share one read of the
 * file, so that neither narrow windows nor unusual dimension orders cost a system call a number.
 */
function readBlock(
  descriptor: number,
  variable: ClassicVariable,
  recordBytes: number,
  fileSize: number,
  start: number[],
  count: number[],
): Float64Array {
  const type = variable.type!
  const width = typeBytes[type]
  const sizes = variable.dimensions.map(({ size }) => size)
  const strides = strideBytes(variable, sizes, width, recordBytes)
  const total = count.reduce((product, n) => product * n, 1)
  const values = new Float64Array(total)
  if (total === 0) return values

  // Trailing dimensions read in full join the run.
  let inner = count.length
  let run = 1
  while (inner > 0 && strides[inner - 1] === run * width) {
    inner--
    run *= count[inner]!
    if (count[inner] !== sizes[inner]) break
  }
  const outer = count.slice(0, inner)
  // Rows of a narrow window lie far apart: reading on to the next one would read mostly what nobody asked for.
  const nextRun = strides.findLast((_, d) => d < inner && count[d]! > 1) ?? Infinity
  const ahead = nextRun <= farApart ? readAhead : 0
  const base = variable.offset + start.reduce((sum, index, d) => sum + index * strides[d]!, 0)
  const position = outer.map(() => 0)
  let held: Buffer = Buffer.alloc(0)
  let heldAt = 0
  for (let filled = 0; filled < total; ) {
    const runAt = base + position.reduce((sum, index, d) => sum + index * strides[d]!, 0)
    for (let done = 0; done < run; ) {
      const piece = Math.min(run - done, longestRead / width)
      const at = runAt + done * width
      if (at < heldAt || at + piece * width > heldAt + held.length) {
        heldAt = at
        held = readExactly(descriptor, at, Math.min(Math.max(piece * width, ahead), fileSize - at))
      }
      decode(held, at - heldAt, type, values, filled, piece)
      filled += piece
      done += piece
    }
    for (let d = outer.length - 1; d >= 0; d--) {
      position[d] = position[d]! + 1
      if (position[d]! < outer[d]!) break
      position[d] = 0
    }
  }
  return values
}

function strideBytes(variable: ClassicVariable, sizes: number[], width: number, recordBytes: number): number[] {
  const strides = sizes.map(() => width)
  for (let d = sizes.length - 2; d >= 0; d--) strides[d] = strides[d + 1]! * sizes[d + 1]!
  if (variable.record) strides[0] = recordBytes
  return strides
}

function decode(bytes: Buffer, at: number, type: NumberType, out: Float64Array, to: number, count: number): void {
  const view = new DataView(bytes.buffer, bytes.byteOffset + at, count * typeBytes[type])
  if (type === 'f4') for (let i = 0; i < count; i++) out[to + i] = view.getFloat32(i * 4)
  else if (type === 'f8') for (let i = 0; i < count; i++) out[to + i] = view.getFloat64(i * 8)
  else if (type === 'i2') for (let i = 0; i < count; i++) out[to + i] = view.getInt16(i * 2)
  else if (type === 'u2') for (let i = 0; i < count; i++) out[to + i] = view.getUint16(i * 2)
  else if (type === 'i4') for (let i = 0; i < count; i++) out[to + i] = view.getInt32(i * 4)
  else if (type === 'u4') for (let i = 0; i < count; i++) out[to + i] = view.getUint32(i * 4)
  else if (type === 'i8') for (let i = 0; i < count; i++) out[to + i] = Number(view.getBigInt64(i * 8))
  else if (type === 'u8') for (let i = 0; i < count; i++) out[to + i] = Number(view.getBigUint64(i * 8))
  else if (type === 'u1') for (let i = 0; i < count; i++) out[to + i] = view.getUint8(i)
  else for (let i = 0; i < count; i++) out[to + i] = view.getInt8(i)
}
