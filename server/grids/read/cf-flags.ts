import type { FlagCells, FlagMeaning } from '../flags'
import { numbersOf, type RawAttributes, type RawNetcdf, type RawVariable, textOf, typeBytes } from './raw-netcdf'

/**
 * What a flag variable's numbers mean, by CF 3.5; null when it is no flag variable, or when its lists don't fit
 * together, which `problem` then says.
 */
export function flagMeanings(variable: RawVariable): { meanings: FlagMeaning[] | null; problem: string | null } {
  const { attributes, type, name } = variable
  const text = textOf(attributes, 'flag_meanings')
  if (text === null || type === null || type.startsWith('f')) return { meanings: null, problem: null }
  const names = text.split(/[\s,;]+/).filter(Boolean)
  const modulus = 2 ** (8 * typeBytes[type])
  const unsigned = (value: number) => (value < 0 ? value + modulus : value)
  const masks = flagNumbers(attributes, 'flag_masks').map(unsigned)
  const values = flagNumbers(attributes, 'flag_values').map(unsigned)
  const fits = [masks, values].every((list) => list.length === 0 || list.length === names.length)
  if (!fits || masks.length + values.length === 0 || new Set(names).size !== names.length) {
    return {
      meanings: null,
      problem: `The flags of ${name} are not used: ${names.length} meanings, ${masks.length} masks and ${values.length} values do not fit together.`,
    }
  }
  const meanings = names.map((meaning, i): FlagMeaning => ({
    name: meaning,
    ...(masks.length ? { mask: masks[i]! } : {}),
    ...(values.length ? { value: values[i]! } : {}),
  }))
  return { meanings, problem: null }
}

/** Some writers store the lists as text: "1b, 2b, 4b". */
function flagNumbers(attributes: RawAttributes, name: string): number[] {
  const text = attributes.get(name)?.value
  if (typeof text !== 'string') return numbersOf(attributes, name)
  const parts = text.split(/[\s,;]+/).filter(Boolean)
  const numbers = parts.map((part) => Number(part.replace(/(?<=\d)(ub|us|ull?|b|s|l|ll)$/i, '')))
  return numbers.every(Number.isInteger) ? numbers : []
}

/** The names by which an attribute lists other variables. */
export function ancillaryNames(variable: RawVariable): string[] {
  return (textOf(variable.attributes, 'ancillary_variables') ?? '').split(/[\s,]+/).filter(Boolean)
}

const filledMeaning = /gap_?-?fill|gap_?free|^filled|_filled|interpolat|reconstruct|extrapolat|climatolog/i
const notFilled = /^(not|no|non|un|without)[_-]?|fill_?value/i

/** Meanings that say a cell was filled in rather than seen. */
export function filledMeanings(meanings: readonly FlagMeaning[]): FlagMeaning[] {
  return meanings.filter(({ name }) => filledMeaning.test(name) && !notFilled.test(name))
}

const filledProduct = /gap[-_ ]?(free|fill)|cloud[-_ ]?free|reconstruct|interpolated|dineof/i

/** True when the file says of itself that cells without an observation were filled in. */
export function saysGapFilled(file: RawNetcdf, variable: RawVariable): boolean {
  const level = textOf(file.attributes, 'processing_level') ?? ''
  const words = [
    ...['title', 'summary', 'product_name', 'product_type', 'product'].map((name) => textOf(file.attributes, name)),
    textOf(variable.attributes, 'long_name'),
    textOf(variable.attributes, 'comment'),
  ]
  return /^l(evel)?[-_ ]?4/i.test(level) || words.some((text) => text !== null && filledProduct.test(text))
}

/** The bits of a block of flags, in the file's own dimension order. Only a declared fill value counts as missing. */
export function flagBlock(file: RawNetcdf, variable: RawVariable, start: number[], count: number[]): FlagCells {
  const type = variable.type!
  const fill = numbersOf(variable.attributes, '_FillValue')[0]
  const modulus = 2 ** (8 * typeBytes[type])
  const unsignedFill = fill !== undefined && fill < 0 ? fill + modulus : fill
  if (typeBytes[type] === 8) {
    const { low, high } = file.readWords(variable, start, count)
    return { raw: low, high, missing: missingAt(low, (i) => high[i]! * 2 ** 32 + low[i]! === unsignedFill) }
  }
  const raw = Uint32Array.from(file.read(variable, start, count), (value) => (value < 0 ? value + modulus : value))
  return { raw, high: null, missing: missingAt(raw, (i) => raw[i] === unsignedFill) }
}

function missingAt(raw: Uint32Array, isMissing: (index: number) => boolean): Uint8Array | null {
  const missing = Uint8Array.from(raw, (_, i) => Number(isMissing(i)))
  return missing.includes(1) ? missing : null
}
