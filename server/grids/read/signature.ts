import { closeSync, fstatSync, openSync } from 'node:fs'
import type { GridFormat } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { readExactly } from './bytes'

const hdf5Magic = Buffer.from([0x89, 0x48, 0x44, 0x46, 0x0d, 0x0a, 0x1a, 0x0a])

export interface Signature {
  format: GridFormat
  fileSize: number
  /** Where the HDF5 superblock begins; 0 for the other formats. */
  start: number
}

/** Recognises a file by its first bytes, never by its name. */
export function recognise(path: string, fileName: string): Signature {
  const descriptor = openSync(path, 'r')
  try {
    const fileSize = fstatSync(descriptor).size
    if (fileSize === 0) throw new LayerRefused('empty-file', 'This file is empty.', { fileName })
    const head = readExactly(descriptor, 0, Math.min(fileSize, 512))
    const start = findHdf5(descriptor, fileSize)
    if (start !== null) return { format: 'netcdf4', fileSize, start }
    if (head.subarray(0, 3).toString('latin1') === 'CDF') {
      const version = head[3]
      if (version === 1 || version === 2 || version === 5) return { format: 'netcdf-classic', fileSize, start: 0 }
      throw new LayerRefused(
        'unsupported-encoding',
        'This file begins like a classic NetCDF file, but its version is unknown.',
        { fileName, version },
      )
    }
    if (isTiff(head)) return { format: 'geotiff', fileSize, start: 0 }
    throw new LayerRefused(
      'unknown-format',
      `This is not a NetCDF or GeoTIFF file: it ${beginsWith(head)}.`,
      { fileName, firstBytes: head.subarray(0, 16).toString('hex') },
    )
  } finally {
    closeSync(descriptor)
  }
}

/** The superblock may stand at 0, 512, 1024, 2048 and so on; four doublings cover every user block met in practice. */
function findHdf5(descriptor: number, fileSize: number): number | null {
  for (const start of [0, 512, 1024, 2048, 4096, 8192]) {
    if (start + 8 > fileSize) return null
    if (readExactly(descriptor, start, 8).equals(hdf5Magic)) return start
  }
  return null
}

/** TIFF and BigTIFF, in either byte order. */
function isTiff(head: Buffer): boolean {
  if (head.length < 4) return false
  const order = head.subarray(0, 2).toString('latin1')
  if (order === 'II') return [42, 43].includes(head.readUInt16LE(2))
  return order === 'MM' && [42, 43].includes(head.readUInt16BE(2))
}

function beginsWith(head: Buffer): string {
  const known: [string, string][] = [
    ['\x89PNG', 'is a PNG picture'],
    ['\xff\xd8\xff', 'is a JPEG picture'],
    ['GIF8', 'is a GIF picture'],
    ['PK\x03\x04', 'is a ZIP archive'],
    ['%PDF', 'is a PDF document'],
    ['GRIB', 'is a GRIB file'],
    ['\x0e\x03\x13\x01', 'is an HDF4 file'],
  ]
  const start = head.toString('latin1')
  const match = known.find(([magic]) => start.startsWith(magic))
  if (match) return match[1]
  if (/^\s*(<!doctype html|<html|<head)/i.test(start)) return 'is a web page'
  const printable = head.every((byte) => byte >= 32 || byte === 9 || byte === 10 || byte === 13)
  return printable ? 'begins with text' : 'begins with bytes that belong to no format Offing knows'
}
