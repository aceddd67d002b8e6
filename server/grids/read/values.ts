import type { GridVariable } from '../grid-source'
import type { Meaning } from './quantity'

type Conversion = Pick<Meaning, 'log10' | 'factor' | 'note'>

/** From the file's unpacked numbers to the unit Offing works in, in place; NaN stays NaN. */
export function convertInPlace(values: Float64Array, { log10, factor }: Conversion): void {
  if (log10) for (let i = 0; i < values.length; i++) values[i] = finite(10 ** values[i]! * factor)
  else if (factor !== 1) for (let i = 0; i < values.length; i++) values[i] = finite(values[i]! * factor)
}

const finite = (value: number): number => (Number.isFinite(value) ? value : NaN)

export function validLimits(
  validMin: number | null,
  validMax: number | null,
  conversion: Conversion,
): Pick<GridVariable, 'validMin' | 'validMax'> {
  const convert = (limit: number | null): number | null => {
    if (limit === null) return null
    const value = Float64Array.of(limit)
    convertInPlace(value, conversion)
    return Number.isFinite(value[0]) ? value[0]! : null
  }
  return { validMin: convert(validMin), validMax: convert(validMax) }
}

export function describeConversion(packingNote: string | null, { note }: Conversion): string | null {
  const notes = [packingNote, note].filter((part) => part !== null)
  return notes.length ? notes.join('; ') : null
}
