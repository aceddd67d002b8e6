import { bandDistance, formulas, type Formula } from '../../../shared/science/optics/formulas'

/** The formulas that reflectances at these wavelengths are enough for: one list a formula, its latest version first. */
export function derivableFrom(wavelengthsNm: readonly number[]): Formula[][] {
  const possible = formulas.filter((formula) => formula.bands.every((band) => wavelengthsNm.some((nm) => bandDistance(band, nm) !== null)))
  const byName = new Map<string, Formula[]>()
  for (const formula of possible) byName.set(formula.name, [formula, ...(byName.get(formula.name) ?? [])])
  return [...byName.values()]
}
