/** One line of the bench's table. */
export interface Measured {
  what: string
  value: number
  /** Empty for a ratio. */
  unit: string
  /** What it should not exceed; null where there is no such aim. */
  most: number | null
  /** Seconds, where the value is a ratio of the two. */
  ours?: number
  reference?: number
}

export function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b)
  const middle = sorted.length >> 1
  return sorted.length % 2 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2
}

/** The smallest value that a share of them does not exceed. */
export function percentile(values: readonly number[], share: number): number {
  const sorted = [...values].sort((a, b) => a - b)
  return sorted[Math.max(0, Math.ceil(share * sorted.length) - 1)]!
}

export function ratio(what: string, ours: readonly number[], reference: readonly number[], most: number | null): Measured {
  const [mine, theirs] = [median(ours), median(reference)]
  return { what, value: mine / theirs, unit: '', most, ours: mine, reference: theirs }
}

export function report(results: readonly Measured[]): void {
  console.log(JSON.stringify(results))
}
