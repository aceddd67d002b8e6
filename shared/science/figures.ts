import { binOfLog10, histogramLength, type AreaHistogram } from './histogram'
import { sortTogether } from './sort-together'
import { sortedQuantiles } from './weighted-quantile'

export type Scale = 'log10' | 'linear'

/** The cells of one region, all of one length: what was seen of them, and how much of each lies inside. */
export interface RegionCells {
  /** NaN is missing. */
  values: Float64Array
  /** Share of the cell inside the region, 0..1. */
  share: Float64Array
  /** Area of the full cell in km2. */
  areaKm2: Float64Array
  /** Share times area, where it is at hand. */
  weightKm2?: Float64Array
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
export const wholeShare = 1 - 1e-9
const percentiles = [0.1, 0.25, 0.5, 0.75, 0.9, 0.95] as const

interface Seen {
  values: Float64Array
  weights: Float64Array
  count: number
  /** Position of the highest value in the lists given. */
  maxIndex: number | null
}

function countCells({ values, share, water }: RegionCells, weights: Float64Array) {
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

/** The cells that count, close together. */
function seenCells(values: Float64Array, weights: Float64Array): Seen {
  const seen: Seen = { values: new Float64Array(values.length), weights: new Float64Array(values.length), count: 0, maxIndex: null }
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!
    if (!Number.isFinite(value) || !(weights[i]! > 0)) continue
    seen.values[seen.count] = value
    seen.weights[seen.count++] = weights[i]!
    if (seen.maxIndex === null || value > values[seen.maxIndex]!) seen.maxIndex = i
  }
  return seen
}

function meanOf({ values, weights, count }: Seen): number | null {
  let [total, sum] = [0, 0]
  for (let i = 0; i < count; i++) {
    total += weights[i]!
    sum += weights[i]! * values[i]!
  }
  return total > 0 ? sum / total : null
}

/** Area by value, and weighted mean and population standard deviation of log10 over the values above 0. */
function logFigures({ values, weights, count }: Seen) {
  const histogram = new Float64Array(histogramLength)
  const logs = new Float64Array(count)
  let [total, sum, nonPositive] = [0, 0, 0]
  // Sums run over what is above the first log, so that equal values have no spread from rounding.
  let first = NaN
  for (let i = 0; i < count; i++) {
    const log = values[i]! > 0 ? Math.log10(values[i]!) : NaN
    logs[i] = log
    if (Number.isNaN(log)) {
      nonPositive++
      histogram[0]! += weights[i]!
      continue
    }
    histogram[binOfLog10(log)]! += weights[i]!
    if (Number.isNaN(first)) first = log
    total += weights[i]!
    sum += weights[i]! * (log - first)
  }
  if (!(total > 0)) return { histogram, nonPositive, log: null }
  const mean = first + sum / total
  let squares = 0
  for (let i = 0; i < count; i++) if (!Number.isNaN(logs[i])) squares += weights[i]! * (logs[i]! - mean) ** 2
  return { histogram, nonPositive, log: { mean, sd: Math.sqrt(squares / total) } }
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
  const weights = cells.weightKm2 ?? share.map((part, i) => part * areaKm2[i]!)
  const seen = seenCells(values, weights)
  const { histogram, nonPositive, log } = logFigures(seen)
  const mean = meanOf(seen)
  sortTogether(seen.values, seen.weights, seen.count)
  const [p10 = null, p25 = null, median = null, p75 = null, p90 = null, p95 = null] =
    sortedQuantiles(seen.values, seen.weights, seen.count, percentiles)
  const logarithmic = scale === 'log10' ? log : null
  return {
    ...countCells(cells, weights),
    mean,
    geometricMean: logarithmic && 10 ** logarithmic.mean,
    median,
    p10,
    p25,
    p75,
    p90,
    p95,
    max: seen.maxIndex === null ? null : values[seen.maxIndex]!,
    maxIndex: seen.maxIndex,
    sdLog10: logarithmic && logarithmic.sd,
    nonPositive,
    histogram,
  }
}
