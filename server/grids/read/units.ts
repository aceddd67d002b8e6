/** A unit as it may be spelled, brought to one form: lower case, plain ASCII, exponents as -3. */
function normalise(unit: string): string {
  const superscripts: Record<string, string> = { '⁻': '-', '¹': '1', '²': '2', '³': '3' }
  return unit
    .trim()
    .replace(/[⁻¹²³]/g, (sign) => superscripts[sign] ?? sign)
    .replace(/[µμ]/g, 'u')
    .toLowerCase()
    .replace(/\*\*|\^/g, '')
    .replace(/[{}[\]()]/g, ' ')
    .replace(/\s+/g, ' ')
    .trim()
}

const milligrams: Record<string, number> = {
  kg: 1e6, kilogram: 1e6, g: 1e3, gram: 1e3, mg: 1, milligram: 1, ug: 1e-3, microgram: 1e-3, mcg: 1e-3, ng: 1e-6,
}
const cubicMetres: Record<string, number> = {
  m: 1, meter: 1, metre: 1, l: 1e-3, liter: 1e-3, litre: 1e-3, dm: 1e-3, ml: 1e-6, cm: 1e-6,
}

/**
 * How many mg m-3 one of this unit is, or null if it is no mass in a volume. Takes mg m-3, mg/m3, mg m^-3, ug L-1,
 * microgram/liter, kg m-3 and the like, with or without a word for the substance ("mg chl m-3").
 */
export function milligramsPerCubicMetre(unit: string): number | null {
  const plain = normalise(unit).replace(/\b(chl(orophyll)?|chl)([ -]?a)?\b/g, ' ').replace(/[.·*]/g, ' ').trim()
  const parts = /^([a-z]+?)s?\s*(\/|\bper\b)?\s*(?:(cubic)\s+)?([a-z]+?)s?\s*(-?\d)?$/.exec(plain.replace(/\s+/g, ' '))
  if (!parts) return null
  const [, mass, divided, cubic, volume, exponent] = parts
  const massFactor = milligrams[mass!]
  const volumeFactor = cubicMetres[volume!]
  if (massFactor === undefined || volumeFactor === undefined) return null
  const isLength = ['m', 'meter', 'metre', 'dm', 'cm'].includes(volume!)
  const size = cubic ? (exponent === undefined ? 3 : NaN) : Number(exponent ?? (divided ? 1 : NaN))
  const expected = (isLength ? 3 : 1) * (divided ? 1 : -1)
  return size === expected ? massFactor / volumeFactor : null
}

/** True for sr-1 in its spellings. */
export function isPerSteradian(unit: string): boolean {
  return /^((sr|steradian)s? ?-1|(1 ?\/|per) ?(sr|steradian)s?)$/.test(normalise(unit))
}

/** True for the ways to write that a number has no unit, as a logarithm has none. */
export function isBare(unit: string): boolean {
  return /^(1|none|no units?|unit-?less|dimension-?less|-|n\/?a|)$/.test(normalise(unit))
}

/** The unit inside a logarithm: log10(mg m-3), log10 mg m-3, lg(re 1 mg m-3); null if it is none. */
export function insideLog10(unit: string): string | null {
  const match = /^\s*(?:log_?10|lg)\s*[([]?\s*(?:re:?\s*)?(?:1\s+)?(.*?)\s*[)\]]?\s*$/i.exec(unit)
  return match ? match[1]! : null
}
