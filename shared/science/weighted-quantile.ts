/** Sums of weights that should meet a share exactly may miss it by rounding; this much of the total is let pass. */
const rounding = 1e-12

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
  if (shares.some((p) => !(p >= 0 && p <= 1))) throw new RangeError('A quantile is asked between 0 and 1.')
  const order: number[] = []
  for (let i = 0; i < values.length; i++) if (Number.isFinite(values[i]) && weights[i]! > 0) order.push(i)
  if (order.length === 0) return shares.map(() => null)
  order.sort((a, b) => values[a]! - values[b]!)
  const cumulated = new Float64Array(order.length)
  let total = 0
  for (let i = 0; i < order.length; i++) cumulated[i] = total += weights[order[i]!]!
  return shares.map((p) => {
    const needed = (p - rounding) * total
    let [low, high] = [0, order.length - 1]
    while (low < high) {
      const middle = (low + high) >> 1
      if (cumulated[middle]! >= needed) high = middle
      else low = middle + 1
    }
    return values[order[low]!]!
  })
}
