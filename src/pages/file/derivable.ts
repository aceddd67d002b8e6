import { bandDistance, formulas, type Formula } from '../../../shared/science/optics/formulas'

/** The formulas that reflectances at these wavelengths are enough for. */
export function derivableFrom(wavelengthsNm: readonly number[]): Formula[] {
  return formulas.filter((formula) => formula.bands.every((band) => wavelengthsNm.some((nm) => bandDistance(band, nm) !== null)))
}
