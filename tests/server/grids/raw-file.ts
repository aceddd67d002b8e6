import type { NumberType, RawAttribute, RawNetcdf, RawVariable } from '../../../server/grids/read/raw-netcdf'

type Attributes = Record<string, string | number | number[]>

const attributesOf = (attributes: Attributes): Map<string, RawAttribute> =>
  new Map(
    Object.entries(attributes).map(([name, value]) => [name, { value, type: typeof value === 'string' ? 'text' : 'f8' }]),
  )

export function rawVariable(
  name: string,
  dimensions: [string, number][],
  attributes: Attributes = {},
  type: NumberType = 'f8',
): RawVariable {
  return {
    name, type, attributes: attributesOf(attributes), dimensions: dimensions.map(([dimension, size]) => ({ name: dimension, size })),
  }
}

/** A NetCDF file in memory; reads answer whole variables. */
export function rawFile(variables: RawVariable[], data: Record<string, number[]>, global: Attributes = {}): RawNetcdf {
  return {
    format: 'netcdf-classic',
    variables,
    attributes: attributesOf(global),
    warnings: [],
    read: ({ name }) => Float64Array.from(data[name] ?? []),
    readWords: ({ name }) => ({
      low: Uint32Array.from(data[name] ?? [], (value) => value % 2 ** 32),
      high: Uint32Array.from(data[name] ?? [], (value) => Math.floor(value / 2 ** 32)),
    }),
    close: () => undefined,
  }
}
