import type { GridSource } from '../grid-source'
import { cfSource } from './cf-source'
import { openClassic } from './netcdf-classic'
import { openNetcdf4 } from './netcdf4'
import { recognise } from './signature'

/**
 * Opens a gridded file, whatever its format. Throws LayerRefused when it can't be read with certainty. The caller
 * closes the source.
 */
export async function openGridSource(path: string, fileName: string): Promise<GridSource> {
  const { format, fileSize, start } = recognise(path, fileName)
  if (format === 'geotiff') {
    const { openGeotiff } = await import('./geotiff')
    return openGeotiff(path, fileName, fileSize)
  }
  const file = format === 'netcdf4' ? await openNetcdf4(path, start, fileSize) : openClassic(path, fileSize)
  try {
    return cfSource(file, fileName)
  } catch (error) {
    file.close()
    throw error
  }
}
