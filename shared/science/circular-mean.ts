/**
 * Running mean of odd length over a closed circle (the days of a year). Nulls are missing: they do not count, and stay
 * null. Length 1 changes nothing. An even length is a RangeError.
 */
export function circularMean(values: readonly (number | null)[], length: number): (number | null)[] {
  if (!(Number.isInteger(length) && length > 0 && length % 2 === 1)) {
    throw new RangeError(`A running mean needs an odd number of days, not ${length}.`)
  }
  if (length === 1) return [...values]
  const half = (length - 1) / 2
  return values.map((middle, i) => {
    if (middle === null) return null
    let [sum, count] = [0, 0]
    for (let step = -half; step <= half; step++) {
      const value = values[(((i + step) % values.length) + values.length) % values.length]
      if (value == null) continue
      sum += value
      count++
    }
    return sum / count
  })
}
