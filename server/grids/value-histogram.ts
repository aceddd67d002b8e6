import type { FoundHistogram } from '../../shared/schemas/found'
import { binOf } from '../../shared/science/histogram'
import { quantileOfSorted } from '../../shared/science/quantile'

const binsPerDecade = 20
const lowestExponent = -3
const mostLinearBins = 60

/**
 * Cells by value, from ascending values without NaN. log10: bins of a twentieth of a decade from 0.001 to 1000, the bins of
 * the summaries' own histograms; zero and negative values are `below`. linear: even bins of 1, 2 or 5 times a power of
 * ten, 30 to 60 over the values; where a few of them lie far out, over the middle 99 % of them. No values: null.
 * Percentiles are type 1, as over cells everywhere.
 */
export function valueHistogram(sorted: Float64Array, scale: 'log10' | 'linear'): FoundHistogram | null {
  if (sorted.length === 0) return null
  const at = (p: number) => quantileOfSorted(sorted, p, 1)!
  const bins = scale === 'log10' ? decadeBins(sorted) : evenBins(sorted, at(0.005), at(0.995))
  return { scale, ...bins, p2: at(0.02), p10: at(0.1), median: at(0.5), p90: at(0.9), p98: at(0.98) }
}

type Bins = Pick<FoundHistogram, 'step' | 'firstBin' | 'counts' | 'below' | 'above'>

function decadeBins(sorted: Float64Array): Bins {
  const last = 6 * binsPerDecade + 1
  const counts = new Array<number>(last + 1).fill(0)
  for (const value of sorted) counts[binOf(value)]!++
  const inside = counts.slice(1, last)
  const first = inside.findIndex((count) => count > 0)
  const end = inside.findLastIndex((count) => count > 0) + 1
  return {
    step: 1 / binsPerDecade,
    firstBin: lowestExponent * binsPerDecade + Math.max(0, first),
    counts: first < 0 ? [] : inside.slice(first, end),
    below: counts[0]!,
    above: counts[last]!,
  }
}

function evenBins(sorted: Float64Array, low: number, high: number): Bins {
  const [least, most] = [sorted[0]!, sorted[sorted.length - 1]!]
  const farOut = high > low && most - least > 3 * (high - low)
  const [from, to] = farOut ? [low, high] : [least, most]
  const step = evenStep(to > from ? to - from : Math.abs(from) || 1)
  const firstBin = placeOf(from, step)
  const counts = new Array<number>(placeOf(to, step) - firstBin + 1).fill(0)
  let [below, above] = [0, 0]
  for (const value of sorted) {
    const bin = placeOf(value, step) - firstBin
    if (bin < 0) below++
    else if (bin >= counts.length) above++
    else counts[bin]!++
  }
  return { step, firstBin, counts, below, above }
}

/** The smallest of 1, 2 and 5 times a power of ten that needs no more than the most bins. */
function evenStep(span: number): number {
  const power = 10 ** Math.floor(Math.log10(span / mostLinearBins))
  const times = [1, 2, 5, 10].find((one) => span / (one * power) <= mostLinearBins)!
  return Number((times * power).toPrecision(3))
}

/** The bin of a value; one that misses its edge by the last digits only is on it. */
function placeOf(value: number, step: number): number {
  const place = value / step
  const edge = Math.round(place)
  return Math.abs(place - edge) < 1e-9 * Math.max(1, Math.abs(place)) ? edge : Math.floor(place)
}
