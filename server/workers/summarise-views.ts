import { summarise } from '../../shared/science/figures'
import type { GridWindow } from '../../shared/science/grid'
import { packHistogram } from '../../shared/science/histogram'
import { mergeLayers, type LayerValues } from '../../shared/science/merge-views'
import { windowOf } from '../../shared/science/cell-shares'
import { maskedAreas } from './masked-areas'
import { readMasked, type MaskedValues } from './read-masked'
import type { RegionCellWeights, Tasks, ViewFigures } from './tasks'
import { withinRange } from './valid-range'

type Input = Tasks['summariseViews']['input']

interface Reading extends MaskedValues {
  window: GridWindow
}

/** One layer's cells of a region, and what was hidden of them. */
interface RegionLayer extends MaskedValues, Omit<LayerValues, 'values'> {}

/**
 * Figures of many views. Each layer is read once, over the window of all regions that need it; views are merged cell by
 * cell over the region's cells, then summarised.
 */
export async function summariseViews(input: Input): Promise<ViewFigures[]> {
  const wanted = windowsOf(input)
  const figures: ViewFigures[] = new Array(input.views.length)
  const users = viewsOfLayers(input)
  const cellsOfView = new Map<number, RegionLayer[]>()
  for (const [at, layer] of input.layers.entries()) {
    const window = wanted[at]
    if (!window) continue
    const reading = { window, ...withinRange(await readMasked(layer, window), input) }
    for (const view of users[at]!) {
      const task = input.views[view]!
      const collected = cellsOfView.get(view) ?? []
      const { processingVersion, observedAt, endsAt, producedAt } = layer
      collected.push({ ...ofRegion(reading, input.weights[task.weights]!), processingVersion, observedAt, endsAt, producedAt })
      cellsOfView.set(view, collected)
      if (collected.length < task.layers.length) continue
      figures[view] = figuresOf(collected, input.weights[task.weights]!, input.scale)
      cellsOfView.delete(view)
    }
  }
  return figures
}

function figuresOf(
  layers: RegionLayer[],
  weights: RegionCellWeights,
  scale: Input['scale'],
): ViewFigures {
  const values = layers.length === 1 ? layers[0]!.values : mergeLayers(layers, scale)
  // An outline without any water here is no mask for this region: every cell counts.
  const water = weights.water.some((cell) => cell === 1) ? weights.water : undefined
  const { histogram, maxIndex, ...rest } = summarise({ values, share: weights.share, areaKm2: weights.areaKm2, ...(water ? { water } : {}) })
  return {
    ...rest,
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

function windowsOf(input: Input): (GridWindow | null)[] {
  const boxes = input.weights.map((weights) => windowOf(weights.index, weights.columns))
  const windows: (GridWindow | null)[] = input.layers.map(() => null)
  for (const task of input.views) {
    const box = boxes[task.weights]
    if (!box) continue
    for (const layer of task.layers) windows[layer] = union(windows[layer] ?? null, box)
  }
  return windows
}

function union(a: GridWindow | null, b: GridWindow): GridWindow {
  if (!a) return b
  const row = Math.min(a.row, b.row)
  const column = Math.min(a.column, b.column)
  return {
    row,
    column,
    rows: Math.max(a.row + a.rows, b.row + b.rows) - row,
    columns: Math.max(a.column + a.columns, b.column + b.columns) - column,
  }
}

function ofRegion({ window, values, hidden }: Reading, weights: RegionCellWeights): MaskedValues {
  return {
    values: pick(values, new Float64Array(weights.index.length), window, weights),
    hidden: new Map([...hidden].map(([reason, cells]) => [reason, pick(cells, new Uint8Array(weights.index.length), window, weights)])),
  }
}

function pick<T extends Float64Array | Uint8Array>(values: T, picked: T, window: GridWindow, { index, columns }: RegionCellWeights): T {
  for (let i = 0; i < index.length; i++) {
    const row = Math.floor(index[i]! / columns)
    picked[i] = values[(row - window.row) * window.columns + (index[i]! - row * columns) - window.column]!
  }
  return picked
}
