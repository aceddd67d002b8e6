import type { Context } from '../context'
import type { PlacedLayer } from '../queries/layers'
import type { LayerPlace } from '../workers/tasks'
import { packPath } from './decoded-layers'
import { storedPath } from './stored-files'

/**
 * Where a worker finds the values of a layer; of a derived one, its formula and where each band is. Asked from the
 * original, decoded tiles are passed over.
 */
export function placeOf(context: Context, layer: PlacedLayer, from: 'anywhere' | 'the original' = 'anywhere'): LayerPlace {
  const { processingVersion, observedAt, endsAt, producedAt, rows, columns, recipe, hiddenFlags, storedLog10, fileUnit, unit } = layer
  const at = (of: { checksum: string; fileName: string; variable: string; step: number }) => ({
    path: storedPath(context.env, of.checksum),
    fileName: of.fileName,
    variable: of.variable,
    step: of.step,
  })
  return {
    ...at(layer),
    processingVersion,
    observedAt,
    endsAt,
    producedAt,
    rows,
    columns,
    pack: from === 'the original' ? null : packPath(context.env, layer),
    reading: { hiddenFlags, storedLog10, fileUnit, unit },
    ...(recipe ? { recipe: { ...recipe, bands: recipe.bands.map((band) => ({ ...at(band), wavelengthNm: band.wavelengthNm })) } } : {}),
  }
}
