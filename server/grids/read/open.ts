import type { GridSource } from '../grid-source'
import { cfSource } from './cf-source'
import type { RawNetcdf } from './raw-netcdf'
import { recognise } from './signature'

/**
 * Opens a gridded file, whatever its format. Throws LayerRefused when it can't be read with certainty. The caller
 * closes the source.
 */
export async function openGridSource(path: string, fileName: string): Promise<GridSource> {
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
