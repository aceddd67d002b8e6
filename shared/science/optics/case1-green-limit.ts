/**
 * The highest Rrs (sr-1) at 560 nm that chlorophyll (mg m-3) alone explains. NaN for chlorophyll at or below 0. After
 * Morel & Belanger 2006, RSE 102:237-249; form verified in the public Level-2 processing source.
 */
export function case1GreenLimit(chlMgPerM3: number): number {
  const x = Math.log10(Math.min(chlMgPerM3, 10))
  return chlMgPerM3 > 0 ? 0.00331 + x * (0.002122 + x * (0.00031587 - 0.00023145 * x)) : NaN
}

/**
 * How much brighter green is than the chlorophyll explains, in percent of it. NaN for chlorophyll at or below 0.2, where
 * the limit is not evaluated, and where green is missing or not above 0.
 */
export function greenExcessPercent(rrs560: number, chlMgPerM3: number): number {
  return chlMgPerM3 > 0.2 && rrs560 > 0 ? (100 * (rrs560 - case1GreenLimit(chlMgPerM3))) / rrs560 : NaN
}
