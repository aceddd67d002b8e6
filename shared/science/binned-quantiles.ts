import { sortTogether } from './sort-together'
import { shareRounding } from './weighted-quantile'

/** Values with weights above 0, all finite, and for each the bin it lies in. Bins rise with the values. */
export interface BinnedValues {
  values: Float64Array
  weights: Float64Array
  bins: Uint8Array
  count: number
  /** Sum of weights by bin. */
  binWeights: Float64Array
  /** Room for as many values and weights as there are, overwritten. */
  room?: { values: Float64Array; weights: Float64Array }
}

/**
 * Weighted inverse distribution (type 1), the same as `weightedQuantiles`, by way of bins: only the bins that hold an
 * answer are sorted. `shares` ascending, 0..1. Without values: nulls.
 */
export function binnedQuantiles({ values, weights, bins, count, binWeights, room }: BinnedValues, shares: readonly number[]): (number | null)[] {
  if (count === 0) return shares.map(() => null)
  let total = 0
  for (let bin = 0; bin < binWeights.length; bin++) total += binWeights[bin]!
  const answers: number[] = []
  const within = room?.values ?? new Float64Array(count)
  const weightOf = room?.weights ?? new Float64Array(count)
  let [bin, below, sorted, held] = [0, 0, -1, 0]
  for (const share of shares) {
    const needed = (share - shareRounding) * total
    while (bin < binWeights.length - 1 && (binWeights[bin] === 0 || below + binWeights[bin]! < needed) && anyAbove(binWeights, bin)) below += binWeights[bin++]!
    if (sorted !== bin) {
      held = 0
      for (let i = 0; i < count; i++) {
        if (bins[i] !== bin) continue
        within[held] = values[i]!
        weightOf[held++] = weights[i]!
      }
      sortTogether(within, weightOf, held)
      sorted = bin
    }
    let at = 0
    for (let sum = below + weightOf[0]!; sum < needed && at < held - 1; sum += weightOf[at]!) at++
    answers.push(within[at]!)
  }
  return answers
}

/** Rounding must not lead past the last bin that holds something. */
function anyAbove(binWeights: Float64Array, bin: number): boolean {
  for (let above = bin + 1; above < binWeights.length; above++) if (binWeights[above]! > 0) return true
  return false
}
