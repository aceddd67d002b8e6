import { figuresOf, figuresRoom, type FiguresRoom } from '../../shared/science/figures'
import { packHistogram } from '../../shared/science/histogram'
import { outlineOf, waterOf, type RegionOutline } from '../../shared/science/region-outline'
import { fewestWholeCells, wholeWaterCells } from '../../shared/science/whole-water'
import { maskedAreas } from './masked-areas'
import { readTiles } from './read-tiles'
import { planOf, type RegionPlan } from './region-cells'
import type { RegionCellWeights, Tasks, ViewFigures } from './tasks'
import { mergedValues, regionLayer, type RegionLayer } from './view-cells'

type Input = Tasks['summariseViews']['input']

/** What stays the same for a region over all its views. */
interface Region {
  weights: RegionCellWeights
  plan: RegionPlan
  outline: RegionOutline
  room: FiguresRoom
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
  for (const [at, layer] of input.layers.entries()) {
    const ofLayer = users[at]!.map((view) => regions[input.views[view]!.weights]!)
    const wanted = new Set(ofLayer.flatMap(({ plan }) => plan.tiles))
    if (wanted.size === 0) continue
    const tiles = await readTiles(layer, [...wanted], true)
    for (const [i, view] of users[at]!.entries()) {
      const region = ofLayer[i]!
      const collected = cellsOfView.get(view) ?? []
      collected.push(regionLayer(layer, region.plan, tiles, input))
      if (collected.length < input.views[view]!.layers.length) {
        cellsOfView.set(view, collected)
        continue
      }
      figures[view] = viewFigures(collected, region, input.scale)
      cellsOfView.delete(view)
    }
  }
  return figures
}

function regionOf(weights: RegionCellWeights): Region {
  const room = figuresRoom(weights.share.length)
  return { weights, plan: planOf(weights, weights), room, outline: outlineOf(weights), water: waterOf(weights), few: wholeWaterCells(weights) < fewestWholeCells }
}

const noPercentiles = { median: null, p10: null, p25: null, p75: null, p90: null, p95: null }

function viewFigures(layers: RegionLayer[], { weights, outline, room, water, few }: Region, scale: Input['scale']): ViewFigures {
  const values = mergedValues(layers, scale)
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
