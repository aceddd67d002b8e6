/** Water-leaving radiances, mW cm-2 um-1 sr-1. */
export interface BrightWaterBands {
  nlw443: number
  nlw510: number
  nlw555: number
  /** Aerosol radiance at 670 nm, where it is known. */
  aerosol670?: number
}

const between = (value: number, low: number, high: number) => value >= low && value <= high

/**
 * The spectral screen for coccoliths: 1 where water is as bright and white as shed coccoliths make it, 0 where not, NaN
 * where a band is missing. Without the aerosol radiance its test (at most 1.1) is left out. Resuspended chalk, bubbles,
 * thin cloud, glint and a bright shallow bottom pass the screen too. Numbers verified in the public Level-2 processing
 * source; after Brown & Yoder 1994, JGR 99(C4):7467-7482, doi:10.1029/93JC02156 (attribution from memory).
 */
export function brightWater({ nlw443, nlw510, nlw555, aerosol670 }: BrightWaterBands): number {
  if (![nlw443, nlw510, nlw555, aerosol670 ?? 0].every(Number.isFinite)) return NaN
  const bright = nlw443 >= 1.1 && nlw555 >= 0.9 && nlw510 >= 0 && (aerosol670 ?? 0) <= 1.1
  const white = between(nlw443 / nlw555, 0.75, 1.85) && between(nlw510 / nlw555, 1, 1.65) && between(nlw443 / nlw510, 0.6, 1.15)
  return Number(bright && white)
}
