import { bandDistance, formulaOf, type Formula, type NeededBand } from '../../shared/science/optics/formulas'
import type { Context } from '../context'
import type { FeedRow } from '../models/feed'
import { bandsOfFiles, neighbourLayers, type NeighbourLayer } from '../queries/band-layers'
import { writeDerivedLayers, type BandSource, type DerivedLayer } from '../queries/derived-layers'
import { layersById, type PlacedLayer } from '../queries/layers'
import { bandsOfReport, type FileBand } from './file-bands'

/**
 * The layers of a derived feed over the given layers of its source: one recipe each, on the same grid and time, where
 * every band is there. Nothing is computed; values come when the layer is read. Made once, however often it is run;
 * answers the ids of all that can be made.
 */
export async function deriveLayers(context: Context, feed: FeedRow, sourceIds: readonly number[]): Promise<number[]> {
  const formula = formulaOf(feed.formula ?? '', feed.formulaVersion ?? '')
  if (!formula || feed.derivedFrom === null) throw new Error(`The feed ${feed.name} is not a derived one.`)
  const sources = await layersById(context, sourceIds)
  const files = await bandsOfFiles(context, sources.map((layer) => layer.fileId), bandsOfReport)
  const neighbours = await neighbourLayers(context, sourceIds, feed.derivedSources.filter((id) => id !== feed.derivedFrom), bandsOfReport)
  const layers = sources.flatMap((source): DerivedLayer[] => {
    const bands = recipeFor(formula, source, files.get(source.fileId) ?? [], neighbours.get(source.id) ?? [])
    return bands ? [{ sourceId: source.id, bands }] : []
  })
  return writeDerivedLayers(context, { feedId: feed.id, variable: feed.variable }, layers)
}

/** Each band from the layer's own file, else from a layer of the same time, grid and version; null where one is missing. */
function recipeFor(formula: Formula, source: PlacedLayer, inFile: readonly FileBand[], neighbours: readonly NeighbourLayer[]): BandSource[] | null {
  const place = inFile.find((band) => band.variable === source.variable)?.place
  const own = inFile
    .filter((band) => band.place === place)
    .map(({ variable, wavelengthNm }) => ({ fileId: source.fileId, variable, wavelengthNm, step: source.step }))
  const recipe = formula.bands.map((band) => nearest(band, own) ?? nearest(band, neighbours))
  return recipe.every((band) => band !== null) ? recipe : null
}

function nearest<T extends { wavelengthNm: number }>(needed: NeededBand, bands: readonly T[]): T | null {
  let best: { band: T; away: number } | null = null
  for (const band of bands) {
    const away = bandDistance(needed, band.wavelengthNm)
    if (away !== null && (best === null || away < best.away)) best = { band, away }
  }
  return best?.band ?? null
}
