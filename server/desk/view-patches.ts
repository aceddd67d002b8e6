import { outlineOf } from '../../shared/science/region-outline'
import type { Context } from '../context'
import type { Place } from '../geography/geodesic'
import type { FeedRow } from '../models/feed'
import type { GeometryRow } from '../models/geometry'
import type { RegionRow } from '../models/region'
import { rangeOf } from '../pipeline/layer-pictures'
import { placeOf } from '../pipeline/layer-place'
import { maskedWeights } from '../pipeline/masks/mask-in-force'
import { layersById } from '../queries/layers'
import type { StoredFigures } from '../queries/stored-views'
import type { FoundPatches, ViewAsked } from '../workers/patch-tasks'

export interface PatchesWanted {
  region: Pick<RegionRow, 'site'>
  geometry: Pick<GeometryRow, 'id' | 'west' | 'east'>
  feed: FeedRow
  level: number
  minimumCells: number
  most: number
}

/** What a stored view rests on. */
type Ground = Pick<StoredFigures, 'layerIds' | 'maskId'>

/** Patches of a stored view, by the layers and the mask its figures rest on; null where the layers are gone. */
export async function patchesOfView(
  context: Context,
  run: Context['workers']['light'],
  { region, geometry, feed, level, minimumCells, most }: PatchesWanted,
  view: Ground,
  before: Ground | null = null,
): Promise<FoundPatches | null> {
  const now = await viewAsked(context, geometry.id, view)
  if (!now) return null
  const site: Place | null = region.site && [region.site.longitude, region.site.latitude]
  return run('findPatches', {
    now,
    before: before && (await viewAsked(context, geometry.id, before)),
    level,
    minimumCells,
    most,
    site,
    nearLongitude: (geometry.west + geometry.east) / 2,
    reading: { ...rangeOf(feed), scale: feed.scale },
  })
}

async function viewAsked(context: Context, geometryId: number, { layerIds, maskId }: Ground): Promise<ViewAsked | null> {
  const layers = await layersById(context, layerIds)
  const [first] = layers
  if (!first) return null
  const grid = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $id', { id: first.gridId })
  const weights = await maskedWeights(context, geometryId, { id: maskId, gridId: first.gridId }, first)
  return { layers: layers.map((layer) => placeOf(context, layer)), weights, grid: grid!.definition }
}

/** Water of the outline on the grid of a view; 0 where its layers are gone. */
export async function waterAreaKm2(context: Context, geometryId: number, { layerIds, maskId }: Ground): Promise<number> {
  const [first] = await layersById(context, layerIds.slice(0, 1))
  return first ? outlineOf(await maskedWeights(context, geometryId, { id: maskId, gridId: first.gridId }, first)).waterAreaKm2 : 0
}
