import { LayerRefused } from '../layer-refused'
import { numbersOf, type NumberType, type RawVariable, textOf, typeBytes } from './raw-netcdf'

/** How the stored numbers of one variable become values, by CF's rules (section 2.5 and 8.1). */
export interface Packing {
  scale: number
  offset: number
  /** Stored values that mean missing. */
  missing: number[]
  /** Valid range of the stored numbers. */
  lowest: number
  highest: number
  /** 2 to the number of bits for signed types that are marked as unsigned, else 0. */
  unsignedModulus: number
  /** Valid range of the unpacked values; null without one. */
  validMin: number | null
  validMax: number | null
  note: string | null
  warning: string | null
}

const defaultFills: Partial<Record<NumberType, number>> = {
  // One-byte types have no default fill by NetCDF's own rule: all their values may be data.
  i2: -32767, u2: 65535, i4: -2147483647, u4: 4294967295, i8: -9223372036854775806, u8: 18446744073709551614,
  f4: 9.969209968386869e36, f8: 9.969209968386869e36,
}

export function packingOf(variable: RawVariable): Packing {
  const { attributes, name } = variable
  const type = variable.type!
  const scale = numbersOf(attributes, 'scale_factor')[0] ?? 1
  const offset = numbersOf(attributes, 'add_offset')[0] ?? 0
  if (!Number.isFinite(scale) || scale === 0 || !Number.isFinite(offset)) {
    throw new LayerRefused('damaged', `${name} has an impossible scale (${scale}) or offset (${offset}).`, {
      variable: name, scale, offset,
    })
  }
  const marked = type.startsWith('i') && /^true$/i.test(textOf(attributes, '_Unsigned') ?? '')
  const unsignedModulus = marked ? 2 ** (8 * typeBytes[type]) : 0
  const stored = (value: number) => {
    if (type === 'f4') return Math.fround(value)
    return unsignedModulus && value < 0 ? value + unsignedModulus : value
  }

  const declaredFill = numbersOf(attributes, '_FillValue')
  const fill = declaredFill.length ? declaredFill : [defaultFills[type] ?? NaN]
  const missing = [...fill, ...numbersOf(attributes, 'missing_value')].map(stored).filter((value) => !Number.isNaN(value))

  const range = validRange(variable)
  const unpack = (value: number) => value * scale + offset
  // A range in a wider type than the packed numbers, while there is a scale, is meant for unpacked values
  // (NetCDF's attribute conventions); it is brought back to stored numbers so that one test serves both.
  const isPacked = scale !== 1 || offset !== 0
  const unpackedRange = isPacked && !type.startsWith('f') && range.some((end) => end !== null && end.type.startsWith('f'))
  const toStored = (value: number) => (unpackedRange ? (value - offset) / scale : stored(value))
  const [low, high] = range.map((end) => (end === null ? null : toStored(end.value)))
  const swapped = unpackedRange && scale < 0
  const slack = unpackedRange ? 1e-6 : 0
  const lowest = ((swapped ? high : low) ?? -Infinity) - slack
  const highest = ((swapped ? low : high) ?? Infinity) + slack
  const ends = [lowest, highest].map((end) => (Number.isFinite(end) ? unpack(end) : null))
  return {
    scale, offset, missing, lowest, highest, unsignedModulus,
    validMin: scale < 0 ? ends[1]! : ends[0]!,
    validMax: scale < 0 ? ends[0]! : ends[1]!,
    note: isPacked ? `scale ${scale}, offset ${offset}` : null,
    warning: unpackedRange
      ? `The valid range of ${name} is taken to be in its unpacked unit, because it is stored in a wider type.`
      : null,
  }
}

interface RangeEnd {
  value: number
  type: NumberType | 'text'
}

function validRange({ attributes }: RawVariable): [RangeEnd | null, RangeEnd | null] {
  const end = (attribute: string, index: number): RangeEnd | null => {
    const value = numbersOf(attributes, attribute)[index]
    const type = attributes.get(attribute)?.type
    return value === undefined || type === undefined || Number.isNaN(value) ? null : { value, type }
  }
  const hasRange = numbersOf(attributes, 'valid_range').length === 2
  if (hasRange) return [end('valid_range', 0), end('valid_range', 1)]
  return [end('valid_min', 0), end('valid_max', 0)]
}

/** Unpacks in place; missing, out of range, NaN and infinite become NaN. */
export function unpackInPlace(values: Float64Array, packing: Packing): void {
  const { scale, offset, missing, lowest, highest, unsignedModulus } = packing
  const [first = NaN, ...others] = missing
  for (let i = 0; i < values.length; i++) {
    let value = values[i]!
    if (unsignedModulus && value < 0) value += unsignedModulus
    const valid =
      value >= lowest && value <= highest && value !== first && Number.isFinite(value) &&
      !(others.length && others.includes(value))
    values[i] = valid ? value * scale + offset : NaN
  }
}

/** 1 where a stored number is neither missing nor within the valid range. */
export function outsideRange(stored: Float64Array, { missing, lowest, highest, unsignedModulus }: Packing): Uint8Array {
  return Uint8Array.from(stored, (number) => {
    const value = unsignedModulus && number < 0 ? number + unsignedModulus : number
    return Number(Number.isFinite(value) && !missing.includes(value) && (value < lowest || value > highest))
  })
}
