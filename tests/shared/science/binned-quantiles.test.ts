import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { binnedQuantiles } from '../../../shared/science/binned-quantiles'
import { binOf, histogramLength } from '../../../shared/science/histogram'
import { weightedQuantiles } from '../../../shared/science/weighted-quantile'

const shares = [0, 0.1, 0.25, 0.5, 0.75, 0.9, 0.95, 1]

function byBins(values: number[], weights: number[]) {
  const binWeights = new Float64Array(histogramLength)
  const bins = Uint8Array.from(values, binOf)
  for (const [i, weight] of weights.entries()) binWeights[bins[i]!]! += weight
  return binnedQuantiles({ values: Float64Array.from(values), weights: Float64Array.from(weights), bins, count: values.length, binWeights }, shares)
}

describe('quantiles by way of bins', () => {
  it('are those of all values sorted', () => {
    const value = fc.oneof(fc.double({ min: 1e-5, max: 1e5, noNaN: true }), fc.constantFrom(0.001, 1, 0, -1, 1000, 10 ** 0.05))
    const cell = fc.tuple(value, fc.integer({ min: 1, max: 9 }))
    fc.assert(
      fc.property(fc.array(cell, { minLength: 1, maxLength: 60 }), (cells) => {
        const [values, weights] = [cells.map(([one]) => one), cells.map(([, weight]) => weight)]
        expect(byBins(values, weights)).toEqual(weightedQuantiles(Float64Array.from(values), Float64Array.from(weights), shares))
      }),
      { numRuns: 500 },
    )
  })

  it('of nothing are nothing', () => {
    expect(byBins([], [])).toEqual(shares.map(() => null))
  })
})
