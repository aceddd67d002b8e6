/**
 * Particulate inorganic carbon of the difference d of green and red Rrs (sr-1), mol m-3. Three generations differ by up
 * to a factor of 3 and more: the version belongs to every value. 2017: Mitchell et al. 2017, JGR Oceans,
 * doi:10.1002/2017JC013146 (verified). 2021: verified as a comment of the public Level-2 processing source. 2026:
 * verified there.
 */
export const calciteVersions = {
  '2017': (d: number) => 0.4579 * d - 0.0006,
  '2021': (d: number) => 1.3055 * d - 0.00188,
  '2026': (d: number) => (d >= 0 ? 79.446 * d ** 2.16 : NaN),
} as const
export type CalciteVersion = keyof typeof calciteVersions

const lowestMolPerM3 = 1e-5

/**
 * Calcite carbon in mol m-3 of Rrs (sr-1) in green (near 550 nm) and red (near 667 nm). NaN where a band is missing or
 * below 0, and where the answer is negative; not below 1e-5.
 */
export function calciteMolPerM3(rrsGreen: number, rrsRed: number, version: CalciteVersion): number {
  if (!(rrsGreen >= 0 && rrsRed >= 0)) return NaN
  const calcite = calciteVersions[version](rrsGreen - rrsRed)
  return calcite >= 0 ? Math.max(calcite, lowestMolPerM3) : NaN
}
