import { describe, expect, it } from 'vitest'
import { summarise } from '../../../shared/science/figures'
import { grid } from './small-grid'

const ones = (count: number) => new Float64Array(count).fill(1)
const whole = (values: Float64Array) => ({ values, share: ones(values.length), areaKm2: ones(values.length) })

describe('the figures of a region', () => {
  it('a summary ignores missing cells', () => {
    const { values } = grid`1 2 · / 4 8 ·`
    const figures = summarise(whole(values))
    expect(figures).toMatchObject({ cells: 6, valid: 4, validAreaKm2: 4, mean: 3.75, median: 2 })
    expect(figures).toMatchObject({ max: 8, maxIndex: 4 })
    expect(figures.geometricMean).toBeCloseTo(2 ** 1.5, 12)
    expect(figures.coverage).toBeCloseTo(4 / 6, 12)
  })

  it('a region with no valid cell has no mean, and a coverage of 0', () => {
    const none = { mean: null, geometricMean: null, median: null, p10: null, p95: null, max: null, maxIndex: null }
    expect(summarise(whole(grid`· · / · ·`.values))).toMatchObject({ ...none, sdLog10: null, valid: 0, coverage: 0 })
  })

  it('a region without cells, or without water, has no coverage', () => {
    expect(summarise(whole(new Float64Array(0)))).toMatchObject({ cells: 0, coverage: null, mean: null })
    const { values } = grid`1 2 / 3 4`
    expect(summarise({ ...whole(values), water: new Uint8Array(4) }).coverage).toBeNull()
  })

  it('a cell weighs its share times its area', () => {
    const { values } = grid`1 5`
    const figures = summarise({ values, share: Float64Array.of(0.5, 1), areaKm2: Float64Array.of(6, 1) })
    expect(figures).toMatchObject({ mean: 2, median: 1, p75: 1, p90: 5, validAreaKm2: 4 })
  })

  it('coverage counts seen water of the mask, while the figures take every valid cell', () => {
    const { values } = grid`1 · / 3 8`
    const figures = summarise({ ...whole(values), water: Uint8Array.of(1, 1, 1, 0) })
    expect(figures).toMatchObject({ mean: 4, valid: 3, validAreaKm2: 3, waterAreaKm2: 3 })
    expect(figures.coverage).toBeCloseTo(2 / 3, 12)
  })

  it('values at or below 0 stay in linear figures and are counted out of the log10 ones', () => {
    const { values } = grid`-1 0 / 1 100`
    const figures = summarise(whole(values))
    expect(figures).toMatchObject({ nonPositive: 2, mean: 25, p10: -1, median: 0 })
    expect(figures.geometricMean).toBeCloseTo(10, 12)
    expect(figures.sdLog10).toBeCloseTo(1, 12)
  })

  it('only values at or below 0 leave no geometric mean', () => {
    expect(summarise(whole(grid`-1 0`.values))).toMatchObject({ geometricMean: null, sdLog10: null, mean: -0.5 })
  })

  it('a linear quantity has no log10 figures', () => {
    const figures = summarise(whole(grid`10 20`.values), 'linear')
    expect(figures).toMatchObject({ mean: 15, geometricMean: null, sdLog10: null })
  })

  it('whole cells are told from cut ones, and cells that only touch are none', () => {
    const { values } = grid`1 · 3 4`
    const share = Float64Array.of(1, 1, 0.999, 0)
    const figures = summarise({ values, share, areaKm2: ones(4) })
    expect(figures).toMatchObject({ cells: 3, valid: 2, wholeCells: 2, wholeValid: 1, max: 3 })
  })

  it('lists of different lengths are refused', () => {
    expect(() => summarise({ values: ones(2), share: ones(2), areaKm2: ones(3) })).toThrow(RangeError)
  })
})
