/**
 * Mean solar irradiance outside the atmosphere over a sensor's bands, mW cm-2 um-1, by nominal band in nm. From memory:
 * check against the sensor's own table before resting a claim on it.
 */
export const solarIrradiance = {
  'modis-aqua': { 412: 172.912, 443: 187.622, 488: 194.933, 531: 185.747, 547: 186.539, 667: 152.255, 678: 148.052, 748: 128.065 },
  seawifs: { 443: 190.154, 490: 196.473, 510: 188.158, 555: 183.01, 670: 151.143 },
} as const satisfies Record<string, Record<number, number>>

/** Normalised water-leaving radiance (mW cm-2 um-1 sr-1) of Rrs (sr-1); NaN stays NaN. */
export function waterLeavingRadiance(rrs: number, irradiance: number): number {
  return rrs * irradiance
}

/** Water reflectance, without unit, of Rrs (sr-1). */
export function waterReflectance(rrs: number): number {
  return Math.PI * rrs
}

/** Rrs just below the surface (sr-1) of Rrs above it; verified in the public Level-2 processing source. */
export function belowSurfaceReflectance(rrs: number): number {
  return rrs / (0.52 + 1.7 * rrs)
}
