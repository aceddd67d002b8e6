/** 1 mW cm-2 um-1 sr-1 is 10 W m-2 um-1 sr-1. */
export const wattsPerSquareMetre = 10

/** Threshold in W m-2 um-1 sr-1 (verified): Amin et al. 2009, Optics Express 17:9126-9144, doi:10.1364/OE.17.009126. */
export const redBandThreshold = 0.15

/**
 * Red band difference in W m-2 um-1 sr-1 of water-leaving radiances at 667 and 678 nm given in mW cm-2 um-1 sr-1, the
 * unit of files. NaN where one is missing. Made for one organism of one shelf; it says nothing of toxins.
 */
export function redBandDifference(nlw667: number, nlw678: number): number {
  return wattsPerSquareMetre * (nlw678 - nlw667)
}
