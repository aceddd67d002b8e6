const red = { a: 228.1, c: 0.1641 }
const nearInfrared = { a: 3078.9, c: 0.2112 }
const [redUpTo, infraredFrom] = [0.05, 0.07]

function oneBand(reflectance: number, { a, c }: typeof red): number {
  return reflectance >= 0 && reflectance < c ? (a * reflectance) / (1 - reflectance / c) : NaN
}

/**
 * Turbidity in FNU from water reflectances (pi times Rrs, no unit) at 645 and 859 nm: by the red band below 0.05, by the
 * near infrared above 0.07, in between each by its share. NaN where a band that counts is missing, below 0
 * or at its saturation. Dogliotti et al. 2015, RSE 156:157-168, doi:10.1016/j.rse.2014.09.020 (verified).
 */
export function turbidityFnu(reflectance645: number, reflectance859: number): number {
  if (Number.isNaN(reflectance645)) return NaN
  if (reflectance645 < redUpTo) return oneBand(reflectance645, red)
  if (reflectance645 > infraredFrom) return oneBand(reflectance859, nearInfrared)
  const share = (reflectance645 - redUpTo) / (infraredFrom - redUpTo)
  return oneBand(reflectance645, red) * (1 - share) + oneBand(reflectance859, nearInfrared) * share
}

/** Rrs (sr-1) at 670 nm above which water counts as turbid; verified in the public Level-2 processing source. */
export const turbidAboveRrs670 = 0.0012

/** 1 where the water is turbid by its red reflectance, 0 where not; NaN where it is missing. */
export function turbidWater(rrs670: number): number {
  return Number.isFinite(rrs670) ? Number(rrs670 > turbidAboveRrs670) : NaN
}
