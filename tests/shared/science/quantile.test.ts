import { describe, expect, it } from 'vitest'
import { quantile, quantileOfSorted, sortedValid } from '../../../shared/science/quantile'
import { weightedQuantiles } from '../../../shared/science/weighted-quantile'

describe('quantiles', () => {
  it('the median of an odd number of values is the middle one, missing values left out', () => {
    expect(quantile([9, NaN, 1, 4, NaN], 0.5)).toBe(4)
    expect(quantile([9, NaN, 1, 4, Infinity], 0.5)).toBe(4)
  })

  it('nothing has no quantile', () => {
    expect(quantile([], 0.5)).toBeNull()
    expect(quantile([NaN, NaN], 0.5)).toBeNull()
  })

  it('one value is every quantile of itself', () => {
    for (const type of [1, 2, 3, 4, 5, 6, 7, 8, 9] as const) expect(quantile([3], 0.9, type)).toBe(3)
  })

  it('the ends are the least and the greatest', () => {
    const sorted = sortedValid([5, 2, 8, -1])
    expect([quantileOfSorted(sorted, 0), quantileOfSorted(sorted, 1)]).toEqual([-1, 8])
  })

  it('a share that rounds just past an integer position still lands on it', () => {
    const hundred = Array.from({ length: 100 }, (_, i) => i + 1)
    expect(100 * 0.29).not.toBe(29)
    expect(quantile(hundred, 0.29, 1)).toBe(29)
    expect(quantile(hundred, 0.29, 2)).toBe(29.5)
  })

  it('a share outside 0 to 1 is refused', () => {
    expect(() => quantile([1], 1.5)).toThrow(RangeError)
    expect(() => quantile([1], NaN)).toThrow(RangeError)
  })
})

describe('weighted quantiles', () => {
  const of = (values: number[], weights: number[], p: number) =>
    weightedQuantiles(Float64Array.from(values), Float64Array.from(weights), [p])[0]

  it('a heavy cell pulls the median to itself', () => {
    expect(of([1, 2, 3, 4], [1, 1, 1, 5], 0.5)).toBe(4)
  })

  it('a value whose cumulated weight just reaches the share is taken', () => {
    expect(of([1, 2, 3, 4], [2, 1, 1, 4], 0.25)).toBe(1)
    expect(of([10, 9, 8, 7, 6, 5, 4, 3, 2, 1], Array<number>(10).fill(0.1), 0.9)).toBe(9)
  })

  it('missing values and cells without weight take no part', () => {
    expect(of([1, NaN, 3], [1, 100, 1], 1)).toBe(3)
    expect(of([1, 2, 99], [1, 1, 0], 1)).toBe(2)
    expect(of([NaN], [1], 0.5)).toBeNull()
  })
})
