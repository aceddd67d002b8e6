import type { ViewFigures } from './tasks'

/** Figures of many views in a few arrays: handing over thousands of objects between threads costs more than making them. */
export interface PackedFigures {
  /** For each view in turn the numbers named below; NaN for null. */
  numbers: Float64Array
  histograms: Uint8Array
  histogramLengths: Uint32Array
  masked: { view: number; reason: string; areaKm2: number }[]
}

const names = [
  'cells', 'valid', 'wholeCells', 'wholeValid', 'validAreaKm2', 'waterAreaKm2', 'coverage', 'mean', 'geometricMean', 'median',
  'p10', 'p25', 'p75', 'p90', 'p95', 'max', 'sdLog10', 'nonPositive', 'maxCell',
] as const satisfies readonly (keyof ViewFigures)[]

/** No figure is ever NaN: none of them is one, or it is null. */
export function packFigures(figures: readonly ViewFigures[]): PackedFigures {
  const numbers = new Float64Array(figures.length * names.length)
  const histogramLengths = Uint32Array.from(figures, ({ histogram }) => histogram.length)
  const histograms = new Uint8Array(histogramLengths.reduce((sum, length) => sum + length, 0))
  const masked: PackedFigures['masked'] = []
  let at = 0
  for (const [view, one] of figures.entries()) {
    for (const [i, name] of names.entries()) numbers[view * names.length + i] = one[name] ?? NaN
    histograms.set(one.histogram, at)
    at += one.histogram.length
    for (const { reason, areaKm2 } of one.masked) masked.push({ view, reason, areaKm2 })
  }
  return { numbers, histograms, histogramLengths, masked }
}

export function unpackFigures({ numbers, histograms, histogramLengths, masked }: PackedFigures): ViewFigures[] {
  let at = 0
  const figures = Array.from(histogramLengths, (length, view): ViewFigures => {
    const place = view * names.length
    const known = (i: number) => numbers[place + i]!
    const orNull = (i: number) => (Number.isNaN(numbers[place + i]!) ? null : numbers[place + i]!)
    const histogram = histograms.subarray(at, (at += length))
    return {
      cells: known(0), valid: known(1), wholeCells: known(2), wholeValid: known(3), validAreaKm2: known(4), waterAreaKm2: known(5),
      coverage: orNull(6), mean: orNull(7), geometricMean: orNull(8), median: orNull(9), p10: orNull(10), p25: orNull(11), p75: orNull(12),
      p90: orNull(13), p95: orNull(14), max: orNull(15), sdLog10: orNull(16), nonPositive: known(17), maxCell: orNull(18), histogram, masked: [],
    }
  })
  for (const { view, reason, areaKm2 } of masked) figures[view]!.masked.push({ reason, areaKm2 })
  return figures
}
