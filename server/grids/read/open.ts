import { rmSync } from 'node:fs'
import type { GridSource } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { cfSource } from './cf-source'
import { gunzipBeside, isGzip } from './gunzip'
import type { RawNetcdf } from './raw-netcdf'
import { recognise } from './signature'

/**
 * Opens a gridded file, whatever its format. Throws LayerRefused when it can't be read with certainty. The caller
 * closes the source.
 */
export async function openGridSource(path: string, fileName: string): Promise<GridSource> {
  if (!isGzip(path)) return openExpanded(path, fileName)
  const expanded = await gunzipBeside(path, fileName)
  try {
    if (isGzip(expanded)) {
      throw new LayerRefused('unsupported-encoding', 'This file was packed by gzip twice; unpack it first.', { fileName })
    }
    return await openExpanded(expanded, fileName)
  } finally {
    // The source holds the file open: without its name it lasts just as long, and is gone even if the process is killed.
    rmSync(expanded, { force: true })
  }
}

async function openExpanded(path: string, fileName: string): Promise<GridSource> {
  const { format, fileSize, start } = recognise(path, fileName)
  if (format === 'geotiff') return (await import('./geotiff')).openGeotiff(path, fileName, fileSize)
  const file = await openNetcdf(path, fileSize, format === 'netcdf4' ? start : null)
  try {
    return cfSource(file, fileName)
  } catch (error) {
    file.close()
    throw error
  }
}

/** Each format's library is loaded when first needed: HDF5's alone takes most of a second. */
async function openNetcdf(path: string, fileSize: number, hdf5Start: number | null): Promise<RawNetcdf> {
  if (hdf5Start === null) return (await import('./netcdf-classic')).openClassic(path, fileSize)
  return (await import('./netcdf4')).openNetcdf4(path, hdf5Start, fileSize)
}
