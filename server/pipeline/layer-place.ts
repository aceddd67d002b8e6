import type { Context } from '../context'
import type { PlacedLayer } from '../queries/layers'
import type { LayerPlace } from '../workers/tasks'
import { storedPath } from './stored-files'

/** Where a worker finds the values of a layer; of a derived one, its formula and where each band is. */
export function placeOf(context: Context, layer: PlacedLayer): LayerPlace {
  const { processingVersion, observedAt, endsAt, producedAt, recipe, hiddenFlags, storedLog10, fileUnit, unit } = layer
  const at = (of: { checksum: string; fileName: string; variable: string; step: number }) => ({
    path: storedPath(context.env, of.checksum),
    fileName: of.fileName,
    variable: of.variable,
    step: of.step,
  })
  const place = { ...at(layer), processingVersion, observedAt, endsAt, producedAt, reading: { hiddenFlags, storedLog10, fileUnit, unit } }
  if (!recipe) return place
  const { formula, formulaVersion, bands } = recipe
  return { ...place, recipe: { formula, formulaVersion, bands: bands.map((band) => ({ ...at(band), wavelengthNm: band.wavelengthNm })) } }
}
