import type { GridFormat } from '../grid-source'

export type NumberType = 'i1' | 'u1' | 'i2' | 'u2' | 'i4' | 'u4' | 'i8' | 'u8' | 'f4' | 'f8'

export const typeBytes: Record<NumberType, number> = {
  i1: 1, u1: 1, i2: 2, u2: 2, i4: 4, u4: 4, i8: 8, u8: 8, f4: 4, f8: 8,
}

export type AttributeValue = string | number | number[]

export interface RawAttribute {
  value: AttributeValue
  type: NumberType | 'text'
}

export type RawAttributes = ReadonlyMap<string, RawAttribute>

export interface RawVariable {
  name: string
  /** null for text, compounds and other things that are no numbers. */
  type: NumberType | null
  dimensions: { name: string; size: number }[]
  attributes: RawAttributes
}

/** A NetCDF file before its meaning is worked out; the classic and the HDF5 based format look the same here. */
export interface RawNetcdf {
  format: GridFormat
  variables: RawVariable[]
  attributes: RawAttributes
  warnings: string[]
  /** The stored (packed) numbers of a block, in the file's own dimension order. */
  read(variable: RawVariable, start: number[], count: number[]): Float64Array
  /** The bits of a block of a 64-bit integer variable, which numbers above 2^53 would lose. */
  readWords(variable: RawVariable, start: number[], count: number[]): { low: Uint32Array; high: Uint32Array }
  close(): void
}

export function textOf(attributes: RawAttributes, name: string): string | null {
  const value = attributes.get(name)?.value
  return typeof value === 'string' && value.trim() !== '' ? value.trim() : null
}

/** The attribute as numbers; numeric text counts, because some writers store fill values as text. */
export function numbersOf(attributes: RawAttributes, name: string): number[] {
  const value = attributes.get(name)?.value
  if (value === undefined) return []
  if (typeof value === 'number') return [value]
  if (typeof value !== 'string') return value
  const trimmed = value.trim()
  const number = Number(trimmed)
  return trimmed !== '' && (!Number.isNaN(number) || /^nan$/i.test(trimmed)) ? [number] : []
}

export function plainAttributes(attributes: RawAttributes): Record<string, AttributeValue> {
  return Object.fromEntries([...attributes].map(([name, { value }]) => [name, value]))
}
