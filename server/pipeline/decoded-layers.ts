import { createHash } from 'node:crypto'
import { join } from 'node:path'
import type { Env } from '../env'
import type { PlacedLayer } from '../queries/layers'
import { softwareVersion } from '../software-version'

/** Raised whenever reading gives other values than before, so that what was decoded by then is made anew. */
const decodedVersion = 1

export function decodedFolder(env: Env): string {
  return join(env.dataDir, 'cache', 'decoded')
}

/**
 * Where the decoded tiles of a layer are kept: named by all that its values depend on, so that other settings of the
 * feed, another recipe or another version of Offing look elsewhere, and nothing ever needs to be called stale.
 */
export function packPath(env: Env, layer: Pick<PlacedLayer, 'checksum' | 'variable' | 'step' | 'hiddenFlags' | 'storedLog10' | 'fileUnit' | 'unit' | 'recipe'>): string {
  const { checksum, variable, step, hiddenFlags, storedLog10, fileUnit, unit, recipe } = layer
  const bands = recipe?.bands.map((band) => [band.checksum, band.variable, band.step, band.wavelengthNm]) ?? []
  const from = [decodedVersion, softwareVersion, checksum, variable, step, hiddenFlags, storedLog10, fileUnit, unit, recipe?.formula, recipe?.formulaVersion, bands]
  const key = createHash('sha256').update(JSON.stringify(from)).digest('hex').slice(0, 40)
  return join(decodedFolder(env), key.slice(0, 2), key)
}
