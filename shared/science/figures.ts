import { binnedQuantiles, type BinnedValues } from './binned-quantiles'
import { binOfLog10, histogramLength, type AreaHistogram } from './histogram'
import { isPart, isWater, isWhole, regionOutline, type RegionOutline, type RegionShares } from './region-outline'

export type Scale = 'log10' | 'linear'

/** The cells of one region, all of one length: what was seen of them, and how much of each lies inside. */
export interface RegionCells extends RegionShares {
  /** NaN is missing. */
  values: Float64Array
}

/** What one view says of a region. Null: no cell to say it from. */
export interface Figures {
  /** Cells with a share above 0, before any mask. */
  cells: number
  valid: number
  /** Cells wholly inside, and those of them that were seen. */
  wholeCells: number
  wholeValid: number
  validAreaKm2: number
  waterAreaKm2: number
  /** Seen water over water of the mask; null when the mask has no water here. */
  coverage: number | null
  mean: number | null
  geometricMean: number | null
  median: number | null
  p10: number | null
  p25: number | null
  p75: number | null
  p90: number | null
  p95: number | null
  max: number | null
  /** Position of the highest value in the lists given. */
  maxIndex: number | null
  sdLog10: number | null
  /** Valid cells at or below 0, left out of geometricMean and sdLog10. */
  nonPositive: number
  histogram: AreaHistogram
}

const percentiles = [0.1, 0.25, 0.5, 0.75, 0.9, 0.95] as const

/** Seen cells close together, and what one pass over them tells. */
interface Seen extends BinnedValues {
  /** log10 of the values; NaN at or below 0. */
  logs: Float64Array
  valid: number
  wholeValid: number
  validAreaKm2: number
  seenWaterKm2: number
  nonPositive: number
  maxIndex: number | null
}

/** Memory for one view's figures, used again for the next: asking for it anew takes as long as the sums do. */
export interface FiguresRoom {
  values: Float64Array
  weights: Float64Array
  logs: Float64Array
  bins: Uint8Array
  sorted: { values: Float64Array; weights: Float64Array }
}

export function figuresRoom(cells: number): FiguresRoom {
  const [values, weights, logs, sortedValues, sortedWeights] = Array.from({ length: 5 }, () => new Float64Array(cells)) as [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array]
  return { values, weights, logs, bins: new Uint8Array(cells), sorted: { values: sortedValues, weights: sortedWeights } }
}

function look(values: Float64Array, { weightKm2, kind }: RegionOutline, { values: kept, weights, logs, bins, sorted }: FiguresRoom): Seen {
  const size = values.length
  const binWeights = new Float64Array(histogramLength)
  let [count, valid, wholeValid, validAreaKm2, seenWaterKm2, nonPositive, max] = [0, 0, 0, 0, 0, 0, -Infinity]
  let maxIndex: number | null = null
  for (let i = 0; i < size; i++) {
    const value = values[i]!
    // Infinities less themselves are NaN too.
    if (value - value !== 0 || !(kind[i]! & isPart)) continue
    const weight = weightKm2[i]!
    valid++
    if (kind[i]! & isWhole) wholeValid++
    validAreaKm2 += weight
    if (kind[i]! & isWater) seenWaterKm2 += weight
    if (!(weight > 0)) continue
    const log = value > 0 ? Math.log10(value) : NaN
    const bin = value > 0 ? binOfLog10(log) : 0
    if (!(value > 0)) nonPositive++
    if (maxIndex === null || value > max) {
      max = value
      maxIndex = i
    }
    kept[count] = value
    weights[count] = weight
    logs[count] = log
    bins[count++] = bin
    binWeights[bin]! += weight
  }
  return { values: kept, weights, logs, bins, count, binWeights, room: sorted, valid, wholeValid, validAreaKm2, seenWaterKm2, nonPositive, maxIndex }
}

function meanOf({ values, weights, count }: Seen): number | null {
  let [total, sum] = [0, 0]
  for (let i = 0; i < count; i++) {
    total += weights[i]!
    sum += weights[i]! * values[i]!
  }
  return total > 0 ? sum / total : null
}

/** Weighted mean and population standard deviation of log10 over the values above 0; null without any. */
function logMoments({ logs, weights, count }: Seen): { mean: number; sd: number } | null {
  // Sums run over what is above the first log, so that equal values have no spread from rounding.
  let [first, total, sum] = [NaN, 0, 0]
  for (let i = 0; i < count; i++) {
    const log = logs[i]!
    if (Number.isNaN(log)) continue
    if (Number.isNaN(first)) first = log
    total += weights[i]!
    sum += weights[i]! * (log - first)
  }
  if (!(total > 0)) return null
  const mean = first + sum / total
  let squares = 0
  for (let i = 0; i < count; i++) if (!Number.isNaN(logs[i]!)) squares += weights[i]! * (logs[i]! - mean) * (logs[i]! - mean)
  return { mean, sd: Math.sqrt(squares / total) }
}

/**
 * The figures of one region in one view. A cell weighs its share times its area. NaN and infinities are missing;
 * percentiles (weighted, type 1), mean and max take every valid cell, at or below 0 too; on the log10 scale
 * geometricMean and sdLog10 (population) take those above 0; on the linear scale these two are null. The histogram
 * holds every valid cell. Lists of different lengths are a RangeError.
 */
export function summarise({ values, ...shares }: RegionCells, scale: Scale = 'log10'): Figures {
  return figuresOf(values, regionOutline(shares), scale)
}

/** The same, where the outline has been worked out before; `room` is for as many cells or more. */
export function figuresOf(values: Float64Array, outline: RegionOutline, scale: Scale, room = figuresRoom(values.length)): Figures {
  if (values.length !== outline.kind.length) throw new RangeError('Values, shares, areas and mask of a region have one length.')
  const seen = look(values, outline, room)
  const log = scale === 'log10' ? logMoments(seen) : null
  const [p10 = null, p25 = null, median = null, p75 = null, p90 = null, p95 = null] = binnedQuantiles(seen, percentiles)
  const { valid, wholeValid, validAreaKm2, nonPositive, maxIndex } = seen
  const { cells, wholeCells, waterAreaKm2 } = outline
  return {
    cells,
    valid,
    wholeCells,
    wholeValid,
    validAreaKm2,
    waterAreaKm2,
    coverage: waterAreaKm2 > 0 ? seen.seenWaterKm2 / waterAreaKm2 : null,
    mean: meanOf(seen),
    geometricMean: log && 10 ** log.mean,
    median,
    p10,
    p25,
    p75,
    p90,
    p95,
    max: maxIndex === null ? null : values[maxIndex]!,
    maxIndex,
    sdLog10: log && log.sd,
    nonPositive,
    histogram: seen.binWeights,
  }
}
