import { basename, resolve } from 'node:path'
import { LayerRefused } from '../grids/layer-refused'
import type { Workers } from '../workers/workers'
import { checkReadable } from './readable-file'

/**
 * Prints what is understood of each file, the report that GET /api/files/:id gives; a refused one gives its sentence on
 * the error output. Answers whether all could be read.
 */
export async function inspectFiles(workers: Workers, paths: readonly string[]): Promise<boolean> {
  for (const path of paths) await checkReadable(path)
  let allRead = true
  for (const path of paths) {
    const fileName = basename(path)
    try {
      const { report } = await workers.heavy('inspectFile', { path: resolve(path), fileName })
      console.log(JSON.stringify(report, null, 2))
    } catch (error) {
      if (!(error instanceof LayerRefused)) throw error
      console.error(`${fileName} is refused (${error.code}). ${error.message}`)
      allRead = false
    }
  }
  return allRead
}
