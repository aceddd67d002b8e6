export type QuantileType = 1 | 2 | 3 | 4 | 5 | 6 | 7 | 8 | 9

/** The finite values of a list, ascending. */
export function sortedValid(values: ArrayLike<number>): Float64Array {
  return Float64Array.from(values).filter(Number.isFinite).sort()
}

/** Where the fraction of an order statistic is decided, a product like 0.29 * 100 must not miss its integer. */
const nearInteger = 4 * Number.EPSILON

function offset(p: number, type: QuantileType): number {
  if (type <= 2 || type === 4) return 0
  if (type === 3) return -0.5
  if (type === 5) return 0.5
  if (type === 6) return p
  if (type === 7) return 1 - p
  if (type === 8) return (p + 1) / 3
  return p / 4 + 3 / 8
}

function share(fraction: number, j: number, type: QuantileType): number {
  if (type === 1) return fraction > 0 ? 1 : 0
  if (type === 2) return fraction > 0 ? 1 : 0.5
  if (type === 3) return fraction === 0 && j % 2 === 0 ? 0 : 1
  return fraction
}

/**
 * Sample quantile of ascending finite values (see `sortedValid`), by one of the nine definitions of Hyndman and Fan
 * 1996, Am. Stat. 50:361-365; type 7 is the one of baselines. `p` in 0..1, else RangeError. No values: null.
 */
export function quantileOfSorted(sorted: ArrayLike<number>, p: number, type: QuantileType = 7): number | null {
  if (!(p >= 0 && p <= 1)) throw new RangeError(`A quantile is asked between 0 and 1, not ${p}.`)
  const n = sorted.length
  if (n === 0) return null
  const position = n * p + offset(p, type)
  const fuzz = nearInteger * Math.max(1, position)
  const j = Math.floor(position + fuzz)
  const rest = position - j
  const g = share(Math.abs(rest) <= fuzz ? 0 : rest, j, type)
  const low = sorted[Math.min(Math.max(j, 1), n) - 1]!
  const high = sorted[Math.min(Math.max(j + 1, 1), n) - 1]!
  return g === 0 ? low : low + g * (high - low)
}

/** The same of values in any order; NaN and infinities are missing and ignored. */
export function quantile(values: ArrayLike<number>, p: number, type: QuantileType = 7): number | null {
  return quantileOfSorted(sortedValid(values), p, type)
}
