import type { Scale } from '../../shared/science/figures'
import { mergeLayers, type LayerValues } from '../../shared/science/merge-views'
import type { ValidRange } from './picture-tasks'
import type { MaskedValues } from './read-masked'
import { readTiles, type LayerTiles } from './read-tiles'
import { cellsOf, planOf, type RegionPlan } from './region-cells'
import type { LayerPlace, RegionCellWeights } from './tasks'
import { withinRange } from './valid-range'

/** One layer's cells of a region, and what was hidden of them. */
export interface RegionLayer extends MaskedValues, Omit<LayerValues, 'values'> {}

/** The cells of a region in a layer that has been read, within the feed's valid range. */
export function regionLayer({ processingVersion, observedAt, endsAt, producedAt }: LayerPlace, plan: RegionPlan, tiles: LayerTiles, range: ValidRange): RegionLayer {
  return { ...withinRange(cellsOf(plan, tiles), range), processingVersion, observedAt, endsAt, producedAt }
}

/** The values of a view: its layers merged cell by cell. */
export function mergedValues(layers: readonly RegionLayer[], scale: Scale): Float64Array {
  return layers.length === 1 ? layers[0]!.values : mergeLayers(layers, scale)
}

/** Reads one view of a region for somebody who waits: nothing is decoded for later. */
export async function readView(layers: readonly LayerPlace[], weights: RegionCellWeights, { scale, ...range }: ValidRange & { scale: Scale }): Promise<Float64Array> {
  const plan = planOf(weights, weights)
  const read: RegionLayer[] = []
  for (const layer of layers) read.push(regionLayer(layer, plan, await readTiles(layer, plan.tiles, false), range))
  return mergedValues(read, scale)
}
