import type { Context } from '../context'
import type { Transaction } from '../db'
import { layersById, type PlacedLayer } from '../queries/layers'
import { activeGeometries, type ActiveGeometry } from '../queries/geometries'
import { worthHalving } from './figures-in-halves'
import { placeOf } from './layer-place'
import { summariseViews, type ViewKey } from './summarise-views'
import { viewDay } from './view-day'

/**
 * Figures for every region whose box meets the layers' grid: each view they belong to is made anew. What lies in nobody's
 * water is only decoded, for regions to come.
 */
export async function summariseLayers(
  context: Context,
  feedId: number,
  layerIds: readonly number[],
  alongside: (tx: Transaction) => Promise<void>,
): Promise<void> {
  const layers = await layersById(context, layerIds)
  const geometries = await activeGeometries(context)
  await summariseViews(context, viewKeysOf(layers, geometries, feedId), alongside)
  const unwatched = layers.filter((layer) => !geometries.some((geometry) => boxesMeet(geometry, layer)))
  await decodeInHalves(context, unwatched)
}

/** Of many layers each of two threads decodes one half. */
async function decodeInHalves(context: Context, layers: readonly PlacedLayer[]): Promise<void> {
  if (layers.length === 0) return
  const places = layers.map((layer) => placeOf(context, layer))
  const middle = places.length < worthHalving ? places.length : places.length >> 1
  await Promise.all([
    context.workers.heavy('decodeLayers', { layers: places.slice(0, middle) }),
    ...(middle < places.length ? [context.workers.second('decodeLayers', { layers: places.slice(middle) })] : []),
  ])
}

/** The views that layers belong to: one for each region their grid's box meets, and day. */
export function viewKeysOf(layers: readonly PlacedLayer[], geometries: readonly ActiveGeometry[], feedId: number): ViewKey[] {
  return geometries.flatMap((geometry) => {
    const days = new Set(layers.filter((layer) => boxesMeet(geometry, layer)).map((layer) => viewDay(layer, geometry.centreLongitude)))
    return [...days].map((day) => ({ geometryId: geometry.id, feedId, day }))
  })
}

interface Box {
  west: number
  south: number
  east: number
  north: number
}

/** Boxes on the globe, in whatever turn their longitudes are written. */
export function boxesMeet(region: Box, grid: Box): boolean {
  if (region.north < grid.south || region.south > grid.north) return false
  return [-720, -360, 0, 360, 720].some((turn) => region.west + turn <= grid.east && region.east + turn >= grid.west)
}
