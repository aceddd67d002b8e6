import { createHash } from 'node:crypto'
import { colouringOf, colouringVersion, type Colouring } from '../../shared/colouring'
import type { LayerPoint } from '../../shared/schemas/layers'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { cellCorners } from '../grids/cell-corners'
import { LayerRefused } from '../grids/layer-refused'
import { projectTo } from '../grids/read/project'
import type { FeedRow } from '../models/feed'
import { BoundedCache } from '../pictures/bounded-cache'
import { cellFinder } from '../pictures/cell-finder'
import { layersById, type PlacedLayer } from '../queries/layers'
import type { LayerSurvey } from '../workers/picture-tasks'
import { gridOf } from './known-grids'
import { placeOf } from './layer-place'

export async function knownLayer(context: Context, id: number): Promise<PlacedLayer> {
  const [layer] = await layersById(context, [id])
  if (!layer) throw new ApiError('not-found', 'There is no such layer.')
  return layer
}

export async function feedOf(context: Context, layer: PlacedLayer): Promise<FeedRow> {
  const feed = await context.models.feeds.findByPk(layer.feedId, { rejectOnEmpty: true })
  return feed.get({ plain: true })
}

export interface Tile {
  z: number
  x: number
  y: number
  theme: 'light' | 'night'
}

/** All that a picture of a layer hangs on: its file or recipe, how its feed wants it read, and how values are coloured. */
export function pictureKey(layer: PlacedLayer, feed: FeedRow): string {
  const { id, checksum, variable, step, recipe, hiddenFlags, storedLog10, fileUnit } = layer
  const { quantity, unit, scale, validMin, validMax } = feed
  const text = JSON.stringify([colouringVersion, id, checksum, variable, step, recipe, hiddenFlags, storedLog10, fileUnit, quantity, unit, scale, validMin, validMax])
  return createHash('sha1').update(text).digest('base64url')
}

export const tileKey = (picture: string, { z, x, y, theme }: Tile): string => `${picture}:${z}/${x}/${y}:${theme}`

/** Pictures are small (2 to 40 kB); what a few people look at in an hour fits. */
const mostTileBytes = 48 * 1024 * 1024
const mostSurveys = 2000

interface Kept {
  tiles: BoundedCache<Uint8Array | null>
  surveys: BoundedCache<LayerSurvey>
}
const keptOf = new WeakMap<Context, Kept>()

function kept(context: Context): Kept {
  const known = keptOf.get(context)
  if (known) return known
  const fresh: Kept = { tiles: new BoundedCache(mostTileBytes, (tile) => 500 + (tile?.length ?? 0)), surveys: new BoundedCache(mostSurveys, () => 1) }
  keptOf.set(context, fresh)
  return fresh
}

/** A map tile as PNG; null where the layer has nothing to show. */
export async function layerTile(context: Context, layer: PlacedLayer, tile: Tile, knownFeed?: FeedRow): Promise<Uint8Array | null> {
  const feed = knownFeed ?? (await feedOf(context, layer))
  return kept(context).tiles.get(tileKey(pictureKey(layer, feed), tile), async () => {
    const colouring = await colouringOfLayer(context, layer, feed)
    const grid = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $id', { id: layer.gridId })
    return readable(context.workers.light('drawTile', { layer: placeOf(context, layer), range: rangeOf(feed), colouring, grid: grid!.definition, ...tile }))
  })
}

async function colouringOfLayer(context: Context, layer: PlacedLayer, feed: FeedRow): Promise<Colouring> {
  return colouringOf(feed) ?? (await surveyOf(context, layer, feed)).colouring
}

/** What a layer holds, looked at once. */
export async function surveyOf(context: Context, layer: PlacedLayer, feed: FeedRow): Promise<LayerSurvey> {
  return kept(context).surveys.get(pictureKey(layer, feed), async () => {
    const { rows, columns } = await gridOf(context, layer.gridId)
    const { quantity, variable, unit, scale, validMin, validMax } = feed
    return readable(context.workers.light('surveyLayer', { layer: placeOf(context, layer), feed: { quantity, variable, unit, scale, validMin, validMax }, rows, columns }))
  })
}

/** Stored bytes may go bad long after they were read: that is no fault of the one who asks, and said as it is. */
export async function readable<T>(reading: Promise<T>): Promise<T> {
  try {
    return await reading
  } catch (error) {
    if (!(error instanceof LayerRefused)) throw error
    throw new ApiError('unavailable', `The stored file of this layer cannot be read any more. ${error.message}`, { code: error.code, ...error.facts })
  }
}

export const rangeOf = ({ validMin, validMax }: FeedRow) => ({ validMin, validMax })

/** The cell that holds a place, and its value; null in all of them outside the grid. */
export async function layerCell(context: Context, layer: PlacedLayer, lat: number, lon: number): Promise<Pick<LayerPoint, 'row' | 'column' | 'value' | 'cell'>> {
  const feed = await feedOf(context, layer)
  const at = await cellAt(context, layer, lat, lon)
  if (!at) return { row: null, column: null, value: null, cell: null }
  const [value = null] = await readable(context.workers.light('readCells', { cells: [{ layer: placeOf(context, layer), ...at }], range: rangeOf(feed) }))
  const grid = await gridOf(context, layer.gridId)
  const place = cellCorners(grid, at.row * grid.columns + at.column)
  return { ...at, value, cell: place && { longitude: place.centre[0], latitude: place.centre[1], corners: place.corners } }
}

/** Row and column of the cell of a layer's grid that holds a place. */
export async function cellAt(context: Context, layer: PlacedLayer, lat: number, lon: number): Promise<{ row: number; column: number } | null> {
  const grid = await gridOf(context, layer.gridId)
  const cell = cellFinder(grid, grid.kind === 'transform' ? projectTo(grid.crs) : undefined)(lon, lat)
  return cell && { row: cell.row, column: cell.column }
}
