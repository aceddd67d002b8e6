import { binOf, histogramLength, type AreaHistogram } from './histogram'
import { weightedQuantiles } from './weighted-quantile'

export type Scale = 'log10' | 'linear'

/** The cells of one region, all of one length: what was seen of them, and how much of each lies inside. */
export interface RegionCells {
  /** NaN is missing. */
  values: Float64Array
  /** Share of the cell inside the region, 0..1. */
  share: Float64Array
  /** Area of the full cell in km2. */
  areaKm2: Float64Array
  /** 1 where the mask says water; without a mask every cell is water. */
  water?: Uint8Array
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

/** A share this close to 1 is a whole cell. */
const wholeShare = 1 - 1e-9
const percentiles = [0.1, 0.25, 0.5, 0.75, 0.9, 0.95] as const

function count(cells: RegionCells, weights: Float64Array) {
  const { values, share, water } = cells
  const sums = { cells: 0, valid: 0, wholeCells: 0, wholeValid: 0, validAreaKm2: 0, waterAreaKm2: 0 }
  let seenWaterKm2 = 0
  for (let i = 0; i < values.length; i++) {
    if (!(share[i]! > 0)) continue
    const seen = Number.isFinite(values[i])
    const whole = share[i]! >= wholeShare
    sums.cells++
    if (whole) sums.wholeCells++
    if (whole && seen) sums.wholeValid++
    if (seen) sums.valid++
    if (seen) sums.validAreaKm2 += weights[i]!
    if (water && !water[i]) continue
    sums.waterAreaKm2 += weights[i]!
    if (seen) seenWaterKm2 += weights[i]!
  }
  return { ...sums, coverage: sums.waterAreaKm2 > 0 ? seenWaterKm2 / sums.waterAreaKm2 : null }
}

/** Weighted mean and population standard deviation of f over the cells that `takes` lets in; null without any. */
function moments(
  values: Float64Array,
  weights: Float64Array,
  takes: (value: number) => boolean,
  f: (value: number) => number,
): { mean: number; sd: number } | null {
  let [total, mean, squares] = [0, 0, 0]
  for (let i = 0; i < values.length; i++) {
    const weight = weights[i]!
    if (!Number.isFinite(values[i]) || !(weight > 0) || !takes(values[i]!)) continue
    const value = f(values[i]!)
    total += weight
    const away = value - mean
    mean += (away * weight) / total
    squares += weight * away * (value - mean)
  }
  return total > 0 ? { mean, sd: Math.sqrt(Math.max(0, squares / total)) } : null
}

function highest(values: Float64Array, weights: Float64Array): number | null {
  let at: number | null = null
  for (let i = 0; i < values.length; i++) {
    if (Number.isFinite(values[i]) && weights[i]! > 0 && (at === null || values[i]! > values[at]!)) at = i
  }
  return at
}

/**
 * The figures of one region in one view. A cell weighs its share times its area. NaN and infinities are missing;
 * percentiles (weighted, type 1), mean and max take every valid cell, at or below 0 too; on the log10 scale
 * geometricMean and sdLog10 (population) take those above 0; on the linear scale these two are null. The histogram
 * holds every valid cell. Lists of different lengths are a RangeError.
 */
export function summarise(cells: RegionCells, scale: Scale = 'log10'): Figures {
  const { values, share, areaKm2, water } = cells
  if ([share, areaKm2, water ?? values].some((list) => list.length !== values.length)) {
    throw new RangeError('Values, shares, areas and mask of a region have one length.')
  }
  const weights = share.map((part, i) => part * areaKm2[i]!)
  const linear = moments(values, weights, () => true, (value) => value)
  const log = scale === 'log10' ? moments(values, weights, (value) => value > 0, Math.log10) : null
  const [p10 = null, p25 = null, median = null, p75 = null, p90 = null, p95 = null] =
    weightedQuantiles(values, weights, percentiles)
  const maxIndex = highest(values, weights)
  const histogram = new Float64Array(histogramLength)
  let nonPositive = 0
  for (let i = 0; i < values.length; i++) {
    if (!Number.isFinite(values[i]) || !(weights[i]! > 0)) continue
    histogram[binOf(values[i]!)]! += weights[i]!
    if (values[i]! <= 0) nonPositive++
  }
  return {
    ...count(cells, weights),
    mean: linear && linear.mean,
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
    histogram,
  }
}
