import type { Place } from '../geography/geodesic'
import { outlineOf } from '../../shared/science/region-outline'
import type { Context } from '../context'
import type { FeedRow } from '../models/feed'
import type { GeometryRow } from '../models/geometry'
import type { RegionRow } from '../models/region'
import { cellWeights } from '../pipeline/cell-weights'
import { rangeOf } from '../pipeline/layer-pictures'
import { placeOf } from '../pipeline/layer-place'
import { layersById } from '../queries/layers'
import type { FoundPatches, ViewAsked } from '../workers/patch-tasks'

export interface PatchesWanted {
  region: Pick<RegionRow, 'site'>
  geometry: Pick<GeometryRow, 'id' | 'west' | 'east'>
  feed: FeedRow
  level: number
  minimumCells: number
  most: number
}

/** Patches of the view that was made from some layers; null where the layers are gone. `before` are those of the view before. */
export async function patchesOfLayers(
  context: Context,
  run: Context['workers']['light'],
  { region, geometry, feed, level, minimumCells, most }: PatchesWanted,
  layerIds: readonly number[],
  before: readonly number[] = [],
): Promise<FoundPatches | null> {
  const now = await viewAsked(context, geometry.id, layerIds)
  if (!now) return null
  const site: Place | null = region.site && [region.site.longitude, region.site.latitude]
  return run('findPatches', {
    now,
    before: await viewAsked(context, geometry.id, before),
    level,
    minimumCells,
    most,
    site,
    nearLongitude: (geometry.west + geometry.east) / 2,
    reading: { ...rangeOf(feed), scale: feed.scale },
  })
}

async function viewAsked(context: Context, geometryId: number, layerIds: readonly number[]): Promise<ViewAsked | null> {
  const layers = await layersById(context, layerIds)
  const [first] = layers
  if (!first) return null
  const grid = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $id', { id: first.gridId })
  const weights = await cellWeights(context, geometryId, first.gridId, first)
  return { layers: layers.map((layer) => placeOf(context, layer)), weights, grid: grid!.definition }
}

/** Water of the outline on the grid of a view; 0 where its layers are gone. */
export async function waterAreaKm2(context: Context, geometryId: number, layerIds: readonly number[]): Promise<number> {
  const [first] = await layersById(context, layerIds.slice(0, 1))
  return first ? outlineOf(await cellWeights(context, geometryId, first.gridId, first)).waterAreaKm2 : 0
}
