import { describe, expect, it } from 'vitest'
import { quantile, type QuantileType } from '../../shared/science/quantile'
import { weightedQuantiles } from '../../shared/science/weighted-quantile'
import numpy from './values/quantiles.json'
import published from './values/statistics.json'

const types = [1, 2, 3, 4, 5, 6, 7, 8, 9] as const

describe('sample quantiles of Hyndman and Fan', () => {
  it.each(types)('type %i agrees with the published table', (type: QuantileType) => {
    const table = published.quantiles.types[type]
    const tens = Array.from({ length: 10 }, (_, i) => i + 1)
    for (const [p, value] of Object.entries(table.x1_10)) expect(quantile(tens, Number(p), type)).toBeCloseTo(value, 6)
    for (const [p, value] of Object.entries(table.five)) {
      expect(quantile(published.quantiles.data_b, Number(p), type)).toBeCloseTo(value, 6)
    }
  })

  it.each(types)('type %i agrees with numpy', (type: QuantileType) => {
    for (const { values, types: rows } of numpy.plain) {
      for (const [i, p] of numpy.shares.entries()) {
        const expected = rows[type][i]
        if (expected != null) expect(quantile(values, p, type)).toBeCloseTo(expected, 12)
      }
    }
  })
})

describe('weighted percentiles', () => {
  it('agree with the published checks', () => {
    for (const { x, w, p, value } of published.weighted.check) {
      expect(weightedQuantiles(Float64Array.from(x), Float64Array.from(w), [p])).toEqual([value])
    }
  })

  it('agree with exact fractions', () => {
    for (const { values, weights, answers } of numpy.weighted) {
      const seen = Float64Array.from(values, (value) => value ?? NaN)
      expect(weightedQuantiles(seen, Float64Array.from(weights), numpy.shares)).toEqual(answers)
    }
  })
})
