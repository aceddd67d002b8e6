import { formulas } from './science/optics/formulas'
import type { Feed } from './schemas/feeds'

/** What a feed measures, in a word to stand in front of a unit. */
export function quantityWord({ quantity, variable }: Pick<Feed, 'quantity' | 'variable'>): string {
  if (quantity === 'chlorophyll') return 'Chlorophyll'
  if (quantity === 'reflectance') return `Reflectance ${variable}`
  return formulas.find((one) => one.quantity === 'other' && one.variable === variable)?.title ?? variable
}
