import { sortTogether } from './sort-together'

/** Sums of weights that should meet a share exactly may miss it by rounding; this much of the total is let pass. */
export const shareRounding = 1e-12

/**
 * Weighted inverse distribution (type 1): for each share p in `shares` (0..1, else RangeError) the smallest value whose
 * cumulated weight reaches p of the total. `values` and `weights` have one length; NaN values, and weights that are
 * not above 0, take no part. Nothing left: nulls.
 */
export function weightedQuantiles(
  values: Float64Array,
  weights: Float64Array,
  shares: readonly number[],
): (number | null)[] {
  const kept = new Float64Array(values.length)
  const weightOf = new Float64Array(values.length)
  let count = 0
  for (let i = 0; i < values.length; i++) {
    if (!Number.isFinite(values[i]) || !(weights[i]! > 0)) continue
    kept[count] = values[i]!
    weightOf[count++] = weights[i]!
  }
  sortTogether(kept, weightOf, count)
  return sortedQuantiles(kept, weightOf, count, shares)
}

/** The same of the first `count` values, ascending, all finite and with weights above 0. */
export function sortedQuantiles(values: Float64Array, weights: Float64Array, count: number, shares: readonly number[]): (number | null)[] {
  if (shares.some((p) => !(p >= 0 && p <= 1))) throw new RangeError('A quantile is asked between 0 and 1.')
  if (count === 0) return shares.map(() => null)
  const cumulated = new Float64Array(count)
  let total = 0
  for (let i = 0; i < count; i++) cumulated[i] = total += weights[i]!
  return shares.map((p) => {
    const needed = (p - shareRounding) * total
    let [low, high] = [0, count - 1]
    while (low < high) {
      const middle = (low + high) >> 1
      if (cumulated[middle]! >= needed) high = middle
      else low = middle + 1
    }
    return values[low]!
  })
}
