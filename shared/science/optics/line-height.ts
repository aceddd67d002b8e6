/** Wavelengths of a peak and the two bands its base line runs between, in nm. */
export type LineBands = readonly [baseNm: number, peakNm: number, baseNm: number]

/**
 * Bands of the published line heights. FLH of MODIS: Letelier & Abbott 1996, RSE 58:215-223, doi:10.1016/S0034-4257(96)00073-9,
 * and Behrenfeld et al. 2009, Biogeosciences 6:779 (verified). FLH of MERIS and OLCI: Gower et al. 1999, IJRS (from memory).
 * MCI: Gower et al. 2005, IJRS 26:2005-2012, doi:10.1080/01431160500075857 (from memory). SS(681): Wynne et al. 2008, IJRS
 * 29:3665-3672, doi:10.1080/01431160802007640 (form verified).
 */
export const lineHeightBands = {
  'flh-modis': [667, 678, 748],
  'flh-olci': [665, 681.25, 708.75],
  mci: [681.25, 708.75, 753.75],
  ss681: [665, 681.25, 708.75],
} as const satisfies Record<string, LineBands>

/** Height of the peak above the straight line between its base bands, in the unit given; NaN where a band is missing. */
export function lineHeight(values: readonly [number, number, number], [first, peak, last]: LineBands): number {
  const place = (peak - first) / (last - first)
  return values[1] - (values[0] + place * (values[2] - values[0]))
}

const lowestNlw = -0.01

/**
 * Fluorescence line height of MODIS from water-leaving radiances (mW cm-2 um-1 sr-1) at 667, 678 and 748 nm. NaN where
 * one is missing or below -0.01; not below 0. Rules verified in the public Level-2 processing source.
 */
export function fluorescenceLineHeight(nlw: readonly [number, number, number]): number {
  if (!nlw.every((one) => one >= lowestNlw)) return NaN
  return Math.max(0, lineHeight(nlw, lineHeightBands['flh-modis']))
}

/** Cyanobacteria index: the spectral shape at 681 nm with its sign turned, in the unit given. */
export function cyanobacteriaIndex(values: readonly [number, number, number]): number {
  return -lineHeight(values, lineHeightBands.ss681)
}
