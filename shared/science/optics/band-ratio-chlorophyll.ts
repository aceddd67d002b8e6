import type { BandRatioSet } from './band-ratio-sets'

const lowestBlue = -0.001
const [lowestRatio, highestRatio] = [0.21, 30]
const [lowestMgPerM3, highestMgPerM3] = [0.001, 1000]

/**
 * Chlorophyll-a in mg m-3 of a maximum band ratio: 10 to the polynomial of x, the base-10 logarithm of the ratio.
 * NaN stays NaN. Clipped to 0.001..1000. Source: see band-ratio-sets.ts.
 */
export function chlorophyllOfRatio(ratio: number, { coefficients }: Pick<BandRatioSet, 'coefficients'>): number {
  const [a0, a1, a2, a3, a4] = coefficients
  const x = Math.log10(ratio)
  const log10 = a0 + x * (a1 + x * (a2 + x * (a3 + x * a4)))
  return Math.min(Math.max(10 ** log10, lowestMgPerM3), highestMgPerM3)
}

/**
 * Chlorophyll-a in mg m-3 from reflectances in sr-1. `blue` in the order of the set's `blueNm`, shortest first.
 * No value (NaN) where any band is missing, green is not above 0, the longest blue is not above 0, one of the two
 * shortest blues is at or below -0.001, or the ratio is not between 0.21 and 30. RangeError for a set that is not
 * for Rrs or another number of bands. Rules verified in the public Level-2 processing source.
 */
export function bandRatioChlorophyll(blue: readonly number[], green: number, set: BandRatioSet): number {
  if (set.ratioOf !== 'Rrs') throw new RangeError(`${set.title} takes a ratio of ${set.ratioOf}, not of Rrs.`)
  if (blue.length !== set.blueNm.length) throw new RangeError(`${set.title} takes ${set.blueNm.length} blue bands.`)
  if (!Number.isFinite(green) || blue.some((band) => !Number.isFinite(band))) return NaN
  if (!(green > 0) || !(blue.at(-1)! > 0)) return NaN
  if (!(Math.min(...blue.slice(0, 2)) > lowestBlue)) return NaN
  const ratio = Math.max(...blue) / green
  if (!(ratio > lowestRatio && ratio < highestRatio)) return NaN
  return chlorophyllOfRatio(ratio, set)
}
