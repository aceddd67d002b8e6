import { figuresOf, figuresRoom, type FiguresRoom } from '../../shared/science/figures'
import { packHistogram } from '../../shared/science/histogram'
import { mergeLayers, type LayerValues } from '../../shared/science/merge-views'
import { regionOutline, type RegionOutline } from '../../shared/science/region-outline'
import { fewestWholeCells, wholeWaterCells } from '../../shared/science/whole-water'
import { maskedAreas } from './masked-areas'
import type { MaskedValues } from './read-masked'
import { readTiles } from './read-tiles'
import { cellsOf, planOf, type RegionPlan } from './region-cells'
import type { LayerPlace, RegionCellWeights, Tasks, ViewFigures } from './tasks'
import { withinRange } from './valid-range'

type Input = Tasks['summariseViews']['input']

/** One layer's cells of a region, and what was hidden of them. */
interface RegionLayer extends MaskedValues, Omit<LayerValues, 'values'> {}

/** What stays the same for a region over all its views. */
interface Region {
  weights: RegionCellWeights
  plan: RegionPlan
  outline: RegionOutline
  room: FiguresRoom
  /** An outline without any water here is no mask for this region: every cell counts. */
  water: Uint8Array | undefined
  /** Too few whole water cells for percentiles to mean anything. */
  few: boolean
}

/**
 * Figures of many views. Each layer is read once, in the tiles of all regions that need it; views are merged cell by
 * cell over the region's cells, then summarised.
 */
export async function summariseViews(input: Input): Promise<ViewFigures[]> {
  const regions = input.weights.map(regionOf)
  const figures: ViewFigures[] = new Array(input.views.length)
  const users = viewsOfLayers(input)
  const cellsOfView = new Map<number, RegionLayer[]>()
  let kept: Promise<void> | undefined
  for (const [at, layer] of input.layers.entries()) {
    const ofLayer = users[at]!.map((view) => regions[input.views[view]!.weights]!)
    const wanted = new Set(ofLayer.flatMap(({ plan }) => plan.tiles))
    if (wanted.size === 0) continue
    const tiles = await readTiles(layer, [...wanted], true)
    await kept
    kept = tiles.kept
    for (const [i, view] of users[at]!.entries()) {
      const region = ofLayer[i]!
      const collected = cellsOfView.get(view) ?? []
      collected.push({ ...withinRange(cellsOf(region.plan, tiles), input), ...madeWhen(layer) })
      if (collected.length < input.views[view]!.layers.length) {
        cellsOfView.set(view, collected)
        continue
      }
      figures[view] = viewFigures(collected, region, input.scale)
      cellsOfView.delete(view)
    }
  }
  await kept
  return figures
}

function regionOf(weights: RegionCellWeights): Region {
  const { share, areaKm2 } = weights
  const water = weights.water.some((cell) => cell === 1) ? weights.water : undefined
  return { weights, plan: planOf(weights, weights), room: figuresRoom(share.length), outline: regionOutline({ share, areaKm2, ...(water ? { water } : {}) }), water, few: wholeWaterCells(weights) < fewestWholeCells }
}

function madeWhen({ processingVersion, observedAt, endsAt, producedAt }: LayerPlace): Omit<LayerValues, 'values'> {
  return { processingVersion, observedAt, endsAt, producedAt }
}

const noPercentiles = { median: null, p10: null, p25: null, p75: null, p90: null, p95: null }

function viewFigures(layers: RegionLayer[], { weights, outline, room, water, few }: Region, scale: Input['scale']): ViewFigures {
  const values = layers.length === 1 ? layers[0]!.values : mergeLayers(layers, scale)
  const { histogram, maxIndex, ...rest } = figuresOf(values, outline, scale, room)
  return {
    ...rest,
    ...(few && noPercentiles),
    maxCell: maxIndex === null ? null : weights.index[maxIndex]!,
    histogram: packHistogram(histogram),
    masked: maskedAreas(layers, values, weights, water),
  }
}

function viewsOfLayers(input: Input): number[][] {
  const users: number[][] = input.layers.map(() => [])
  for (const [view, task] of input.views.entries()) for (const layer of task.layers) users[layer]!.push(view)
  return users
}
