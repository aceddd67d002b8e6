import type { Scale } from './figures'

export interface LayerValues {
  /** One value a cell, NaN missing; every layer of a view is on one grid. */
  values: Float64Array
  processingVersion: string
  /** Start and end of what the layer shows, and when it was made; epoch milliseconds, null where not said. */
  observedAt?: number | null
  endsAt?: number | null
  producedAt?: number | null
}

/** Natural order of processing versions: numbers inside them compare as numbers, so 9 comes before 10. */
export function compareVersions(a: string, b: string): number {
  const pieces = (version: string) => version.toLowerCase().match(/\d+|\D+/g) ?? []
  const [left, right] = [pieces(a), pieces(b)]
  for (let i = 0; i < Math.min(left.length, right.length); i++) {
    const [x, y] = [left[i]!, right[i]!]
    const numeric = /^\d/.test(x) && /^\d/.test(y)
    const order = numeric ? Number(x) - Number(y) : x < y ? -1 : x > y ? 1 : 0
    if (order !== 0) return Math.sign(order)
  }
  return Math.sign(left.length - right.length)
}

/** One cell: values of one version; on the log10 scale those at or below 0 step back as long as there are others. */
function together(values: number[], scale: Scale): number {
  const positive = scale === 'log10' ? values.filter((value) => value > 0) : []
  if (positive.length === 1) return positive[0]!
  if (positive.length > 0) return 10 ** (positive.reduce((sum, value) => sum + Math.log10(value), 0) / positive.length)
  return values.reduce((sum, value) => sum + value, 0) / values.length
}

/**
 * Whether one layer corrects another: same start and end, both say when they were made, and it was made later. Where
 * either does not say, nobody knows which corrects which.
 */
function corrects(later: LayerValues, earlier: LayerValues): boolean {
  if (later.producedAt == null || earlier.producedAt == null || later.observedAt == null) return false
  return later.producedAt > earlier.producedAt && later.observedAt === earlier.observedAt && (later.endsAt ?? null) === (earlier.endsAt ?? null)
}

/**
 * Merges the layers of one view cell by cell: the latest processing version that saw the cell wins; of layers of one
 * instant in that version the one made last; several layers left give the mean of log10 ('log10': chlorophyll and its like) or the mean ('linear'). NaN and infinities
 * are missing; a cell nobody saw is NaN. The order of layers does not matter beyond rounding.
 * RangeError for no layers or layers of different lengths.
 */
export function mergeLayers(layers: readonly LayerValues[], scale: Scale): Float64Array {
  const latestFirst = [...layers].sort((a, b) => compareVersions(b.processingVersion, a.processingVersion))
  const first = latestFirst[0]
  if (!first) throw new RangeError('A view needs at least one layer.')
  if (layers.some((layer) => layer.values.length !== first.values.length)) {
    throw new RangeError('Layers of one view have the same cells.')
  }
  const correctedBy = new Map(latestFirst.map((layer) => [layer, latestFirst.filter((other) => corrects(other, layer))]))
  const someCorrected = [...correctedBy.values()].some((others) => others.length > 0)
  return Float64Array.from(first.values, (_, cell) => {
    const seen: LayerValues[] = []
    let version: string | null = null
    for (const layer of latestFirst) {
      if (version !== null && compareVersions(version, layer.processingVersion) !== 0) break
      if (!Number.isFinite(layer.values[cell])) continue
      version = layer.processingVersion
      seen.push(layer)
    }
    const counted = someCorrected ? seen.filter((layer) => !correctedBy.get(layer)!.some((other) => seen.includes(other))) : seen
    return counted.length === 0 ? NaN : together(counted.map((layer) => layer.values[cell]!), scale)
  })
}
