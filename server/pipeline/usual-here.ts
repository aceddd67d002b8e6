import { quantile } from '../../shared/science/quantile'
import type { LayerPoint, UsualHere } from '../../shared/schemas/layers'
import type { Context } from '../context'
import { oldestLayerAt } from '../queries/feed-days'
import { trustedLayers, type PlacedLayer } from '../queries/layers'
import type { CellAsked } from '../workers/picture-tasks'
import { cellAt, feedOf, rangeOf } from './layer-pictures'
import { placeOf } from './layer-place'

const halfWidthDays = 5
/** One answer opens at most so many layers; the newest years come first. */
const mostLayers = 400
const dayMs = 86_400_000

/**
 * What a place showed on the days around this day of year in earlier years: the plain median (type 7) of its cell's
 * values in the trusted layers of the same feed and processing version. On another grid the cell is the one that holds
 * the middle of this one.
 */
export async function usualHere(context: Context, layer: PlacedLayer, cell: LayerPoint['cell']): Promise<UsualHere> {
  const { layers, cut } = await earlierLayers(context, layer)
  const asked: (CellAsked & { year: number })[] = []
  for (const { earlier, year } of layers) {
    const at = cell && (await cellAt(context, earlier, cell.latitude, cell.longitude))
    if (at) asked.push({ layer: placeOf(context, earlier), ...at, year })
  }
  const feed = await feedOf(context, layer)
  const values = asked.length === 0 ? [] : await context.workers.light('readCells', { cells: asked.map(({ year: _, ...one }) => one), range: rangeOf(feed) })
  const seen = values.flatMap((value, i) => (value === null ? [] : [{ value, year: asked[i]!.year }]))
  return {
    halfWidthDays,
    median: quantile(seen.map((one) => one.value), 0.5),
    values: seen.length,
    years: new Set(seen.map((one) => one.year)).size,
    yearsWithLayers: new Set(layers.map((one) => one.year)).size,
    cut,
  }
}

/** Layers from the same days of earlier years, each with how many years earlier. */
async function earlierLayers(context: Context, layer: PlacedLayer): Promise<{ layers: { earlier: PlacedLayer; year: number }[]; cut: boolean }> {
  const oldest = await oldestLayerAt(context, layer.feedId)
  const layers: { earlier: PlacedLayer; year: number }[] = []
  for (let year = 1; oldest !== null; year++) {
    const day = sameDay(layer.observedAt, year)
    const [from, to] = [day - halfWidthDays * dayMs, day + (halfWidthDays + 1) * dayMs - 1]
    if (to < oldest) break
    const found = (await trustedLayers(context, layer.feedId, from, to)).filter((one) => one.processingVersion === layer.processingVersion)
    // A year is read whole or not at all, so that no year counts for more than its share.
    if (layers.length + found.length > mostLayers) return { layers, cut: true }
    layers.push(...found.map((earlier) => ({ earlier, year })))
  }
  return { layers, cut: false }
}

/** The beginning of the same calendar day some years earlier; 29 February becomes 1 March. */
function sameDay(instant: number, yearsEarlier: number): number {
  const date = new Date(instant)
  return Date.UTC(date.getUTCFullYear() - yearsEarlier, date.getUTCMonth(), date.getUTCDate())
}
