import { describe, expect, it } from 'vitest'
import { summarise } from '../../../shared/science/figures'
import { areaAboveKm2, areasAboveKm2, binOf, packHistogram, unpackHistogram } from '../../../shared/science/histogram'

function histogramOf(...values: number[]) {
  const ones = new Float64Array(values.length).fill(1)
  return summarise({ values: Float64Array.from(values), share: ones, areaKm2: ones }).histogram
}

describe('area by value', () => {
  it('every decade begins on the edge of a bin', () => {
    for (const [i, level] of [0.001, 0.01, 0.1, 1, 10, 100, 1000].entries()) expect(binOf(level)).toBe(1 + 20 * i)
    expect([binOf(0), binOf(-3), binOf(0.0009), binOf(1e9)]).toEqual([0, 0, 0, 121])
  })

  it('holds every valid cell and no missing one', () => {
    expect(histogramOf(-1, 0, 0.5, 3, NaN, 5000).reduce((a, b) => a + b)).toBe(5)
  })

  it('area above a bin edge is exact', () => {
    const histogram = histogramOf(0, 0.2, 1, 1.01, 9.9, 10, 2000)
    expect(areaAboveKm2(histogram, 1)).toBe(5)
    expect(areaAboveKm2(histogram, 10)).toBe(2)
    expect(areaAboveKm2(histogram, 0.001)).toBe(6)
    expect(areaAboveKm2(histogram, 1000)).toBe(1)
  })

  it('inside a bin the area is shared evenly in log10', () => {
    const histogram = histogramOf(1.05, 1.06, 1.07, 1.08)
    expect(areaAboveKm2(histogram, 10 ** 0.0125)).toBeCloseTo(3, 9)
    expect(areaAboveKm2(histogram, 10 ** 0.025)).toBeCloseTo(2, 9)
  })

  it('a level outside the bins cannot be told', () => {
    const histogram = histogramOf(1)
    for (const level of [0, -1, 0.0005, 1500, NaN]) expect(areaAboveKm2(histogram, level)).toBeNull()
  })

  it('is the same from many packed ones as from each', () => {
    const histograms = [histogramOf(0.5, 0.75, 3), histogramOf(), histogramOf(0, 0.002, 5000), histogramOf(1, 1.05, 1.06)]
    const packed = histograms.map(packHistogram)
    for (const level of [0.001, 0.6, 1, 1.055, 1000, 2000, -1]) {
      expect(areasAboveKm2(Buffer.concat(packed), packed.map((bytes) => bytes.length), level)).toEqual(histograms.map((one) => areaAboveKm2(one, level)))
    }
    expect(() => areasAboveKm2(Uint8Array.of(1, 2, 3), [3], 1)).toThrow(RangeError)
  })

  it('packs small and comes back', () => {
    const histogram = histogramOf(0.5, 0.75, 3)
    const bytes = packHistogram(histogram)
    expect(bytes.length).toBeLessThan(80)
    expect(unpackHistogram(bytes)).toEqual(histogram)
    expect(unpackHistogram(packHistogram(histogramOf()))).toEqual(histogramOf())
    expect(() => unpackHistogram(Uint8Array.of(1, 2, 3))).toThrow(RangeError)
  })
})
