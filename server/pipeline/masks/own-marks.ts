import type { Context } from '../../context'
import { LayerRefused } from '../../grids/layer-refused'
import { BoundedCache } from '../../pictures/bounded-cache'
import { layersById } from '../../queries/layers'
import { placeOf } from '../layer-place'

const keptOf = new WeakMap<Context, BoundedCache<string | null>>()
const mostLayers = 500

/** What a layer's file says of land itself, in words: "the flag LAND of quality". Files never change. */
export function ownMarks(context: Context, layerId: number): Promise<string | null> {
  const kept = keptOf.get(context) ?? new BoundedCache<string | null>(mostLayers, () => 1)
  keptOf.set(context, kept)
  return kept.get(String(layerId), async () => {
    const [layer] = await layersById(context, [layerId])
    if (!layer) return null
    try {
      return await context.workers.light('findLandMarks', { layer: placeOf(context, layer) })
    } catch (error) {
      // A file gone bad says nothing of land; that it went bad is said where it is read.
      if (error instanceof LayerRefused) return null
      throw error
    }
  })
}
