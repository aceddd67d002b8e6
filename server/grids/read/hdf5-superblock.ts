import { closeSync, openSync } from 'node:fs'
import { LayerRefused } from '../layer-refused'
import { readExactly } from './bytes'

/** Compares the end of file that an HDF5 superblock declares with the file's real size. */
export function checkHdf5Size(path: string, start: number, fileSize: number): void {
  const declared = declaredEnd(path, start, fileSize)
  if (declared === null || fileSize >= declared) return
  throw new LayerRefused(
    'truncated',
    `This file is not whole: it says it has ${declared} bytes, but only ${fileSize} arrived.`,
    { neededBytes: declared, fileSize },
  )
}

/** null when the superblock has a version this reader does not know; the library then decides. */
function declaredEnd(path: string, start: number, fileSize: number): number | null {
  const descriptor = openSync(path, 'r')
  try {
    const bytes = readExactly(descriptor, start, Math.min(96, fileSize - start))
    if (bytes.length < 48) {
      throw new LayerRefused('truncated', 'This HDF5 file ends inside its first block.', { fileSize })
    }
    const version = bytes[8]!
    const offsetSize = version < 2 ? bytes[13]! : bytes[9]!
    if (offsetSize !== 8 && offsetSize !== 4) return null
    // Behind the fixed fields stand base address, one address, then the end of file.
    const addresses = { 0: 24, 1: 28, 2: 12, 3: 12 }[version]
    if (addresses === undefined) return null
    const at = addresses + 2 * offsetSize
    return offsetSize === 8 ? Number(bytes.readBigUInt64LE(at)) : bytes.readUInt32LE(at)
  } finally {
    closeSync(descriptor)
  }
}
