import { readSync } from 'node:fs'
import { LayerRefused } from '../layer-refused'

/** Reads exactly `length` bytes at `offset`, or refuses the file as truncated. */
export function readExactly(descriptor: number, offset: number, length: number): Buffer {
  const bytes = Buffer.allocUnsafe(length)
  let filled = 0
  while (filled < length) {
    const count = readSync(descriptor, bytes, filled, length - filled, offset + filled)
    if (count === 0) {
      throw new LayerRefused('truncated', 'The file ends before its data do; it was probably not sent whole.', {
        offset,
        length,
        missingBytes: length - filled,
      })
    }
    filled += count
  }
  return bytes
}
