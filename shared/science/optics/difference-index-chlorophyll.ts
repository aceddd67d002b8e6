/**
 * Where the parabola has its minimum. Left of it the answer would rise again while the index falls: no value there.
 */
export const lowestNdci = -86.115 / (2 * 194.325)

/** Normalised difference chlorophyll index of Rrs at 665 and 708 nm, -1 to 1; NaN without a sum above 0. */
export function differenceIndex(rrs665: number, rrs708: number): number {
  const sum = rrs708 + rrs665
  return sum > 0 ? (rrs708 - rrs665) / sum : NaN
}

/**
 * Chlorophyll-a in mg m-3 of turbid, productive water from Rrs (sr-1) at 665 and 708 nm. NaN where a band is missing or
 * the index lies left of the parabola's minimum. Mishra & Mishra 2012, RSE 117:394-406, doi:10.1016/j.rse.2011.10.016
 * (coefficients verified).
 */
export function differenceIndexChlorophyll(rrs665: number, rrs708: number): number {
  const index = differenceIndex(rrs665, rrs708)
  return index >= lowestNdci ? 14.039 + index * (86.115 + index * 194.325) : NaN
}
