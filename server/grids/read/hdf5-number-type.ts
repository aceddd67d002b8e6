import type { Dataset, File } from 'h5wasm'
import { readExactly } from './bytes'
import { addressOf } from './hdf5-chunks'
import { messages } from './hdf5-layout'

const datatype = 0x0003
const [wholeNumbers, floats] = [0, 1]

/**
 * What is unusual about how a dataset stores its numbers, as words; null for numbers that fill their bytes. The library
 * hands narrower ones over as they lie there, so that -9 in 17 bits would read as 131063. `start` is where HDF5 begins
 * in the file, which is handed over open: an unpacked one has no name any more.
 */
export function oddNumbers(descriptor: number, start: number, library: Parameters<typeof addressOf>[0], file: File, dataset: Dataset): string | null {
  const read = (offset: number, length: number) => readExactly(descriptor, start + offset, length)
  for (const { type, body } of messages(read, addressOf(library, file, dataset))) {
    if (type === datatype) return oddIn(body)
  }
  return null
}

/** HDF5 file format, datatype message: class and version, 24 bits of the class, size, then offset and precision in bits. */
function oddIn(body: Buffer): string | null {
  const [kind, version] = [body[0]! & 0x0f, body[0]! >> 4]
  // A type shared by several datasets stands elsewhere; its message has no version of a type.
  if (version < 1 || version > 5 || (kind !== wholeNumbers && kind !== floats)) return null
  const bits = 8 * body.readUInt32LE(4)
  const [offset, precision] = [body.readUInt16LE(8), body.readUInt16LE(10)]
  if (offset !== 0 || precision !== bits) return `numbers of ${precision} bits in ${bits}`
  if (kind === floats && !isIeee(body, bits)) return `floating-point numbers of a form of their own`
  return null
}

/** Where sign, exponent and mantissa of the IEEE 754 numbers stand, and their bias. */
const ieee: Record<number, [number, number, number, number, number, number]> = {
  16: [15, 10, 5, 0, 10, 15],
  32: [31, 23, 8, 0, 23, 127],
  64: [63, 52, 11, 0, 52, 1023],
}

function isIeee(body: Buffer, bits: number): boolean {
  const found = [body[2]!, body[12]!, body[13]!, body[14]!, body[15]!, body.readUInt32LE(16)]
  // Bit 6 of the first byte marks the byte order of the VAX.
  return (body[1]! & 0x40) === 0 && (ieee[bits]?.every((number, i) => number === found[i]) ?? true)
}
