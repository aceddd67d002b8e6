interface Shift {
  nm: number
  below: number
  a1: number
  b1: number
  a2: number
  b2: number
}

/** Verified in the public Level-2 processing source (conversion of Rrs between green bands). */
const shifts: readonly Shift[] = [
  { nm: 547, below: 0.001723, a1: 0.986, b1: 0.081495, a2: 1.031, b2: 0.000216 },
  { nm: 550, below: 0.001597, a1: 0.988, b1: 0.062195, a2: 1.014, b2: 0.000128 },
  { nm: 560, below: 0.001148, a1: 1.023, b1: -0.103624, a2: 0.979, b2: -0.000121 },
  { nm: 565, below: 0.000891, a1: 1.039, b1: -0.183044, a2: 0.971, b2: -0.00017 },
]
const toleranceNm = 2

/** Green bands that can be brought to 555 nm, 555 itself first. */
export const shiftableGreenNm: readonly number[] = [555, ...shifts.map(({ nm }) => nm)]

/**
 * Rrs (sr-1) at 555 nm from a green band within 2 nm of 547, 550, 555, 560 or 565; the nearest of these counts. NaN
 * where it is missing, or at or below 0 where a logarithm is asked for. RangeError for any other band.
 */
export function rrsAt555(rrs: number, nm: number): number {
  const near = [...shiftableGreenNm].sort((a, b) => Math.abs(a - nm) - Math.abs(b - nm))[0]!
  if (!(Math.abs(near - nm) <= toleranceNm)) throw new RangeError(`No shift from ${nm} nm to 555 nm is known.`)
  const shift = shifts.find((one) => one.nm === near)
  if (!shift) return rrs
  return rrs < shift.below ? 10 ** (shift.a1 * Math.log10(rrs) - shift.b1) : shift.a2 * rrs - shift.b2
}
