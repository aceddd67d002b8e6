import { ApiError } from '../api-error'
import type { Context } from '../context'
import { cellFinder } from '../pictures/cell-finder'
import { projectTo } from '../grids/read/project'
import { layersById, type PlacedLayer } from '../queries/layers'
import { gridOf } from './known-grids'
import { placeOf } from './layer-place'

export async function knownLayer(context: Context, id: number): Promise<PlacedLayer> {
  const [layer] = await layersById(context, [id])
  if (!layer) throw new ApiError('not-found', 'There is no such layer.')
  return layer
}

/** A map tile as PNG; null where the layer has nothing to show. */
export async function layerTile(context: Context, layer: PlacedLayer, tile: { z: number; x: number; y: number; theme: 'light' | 'night' }): Promise<Uint8Array | null> {
  const grid = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $id', { id: layer.gridId })
  return context.workers.light('drawTile', { layer: placeOf(context, layer), grid: grid!.definition, ...tile })
}

/** The cell that holds a place, and its value; null in all of them outside the grid. */
export async function layerCell(context: Context, layer: PlacedLayer, lat: number, lon: number): Promise<{ row: number | null; column: number | null; value: number | null }> {
  const grid = await gridOf(context, layer.gridId)
  const cell = cellFinder(grid, grid.kind === 'transform' ? projectTo(grid.crs) : undefined)(lon, lat)
  if (!cell) return { row: null, column: null, value: null }
  return { ...cell, value: await context.workers.light('readCell', { layer: placeOf(context, layer), ...cell }) }
}
