import type { MaskedValues } from './read-masked'

export const outOfRange = 'outside the valid range'

/** Makes what lies outside a feed's own valid range (both ends included, in its unit) missing, and says so as a reason. */
export function withinRange({ values, hidden }: MaskedValues, { validMin, validMax }: { validMin: number | null; validMax: number | null }): MaskedValues {
  if (validMin === null && validMax === null) return { values, hidden }
  const low = validMin ?? -Infinity
  const high = validMax ?? Infinity
  const outside = Uint8Array.from(values, (value) => Number(value < low || value > high))
  return { values: values.map((value) => (value >= low && value <= high ? value : NaN)), hidden: new Map([...hidden, [outOfRange, outside]]) }
}
