import { open } from 'node:fs/promises'
import {
  type AttributeInput,
  checkShape,
  defaultFill,
  encodeTimes,
  type GridFile,
  type GridFileVariable,
  packValues,
} from './grid-file'

const types = { byte: 1, text: 2, short: 3, float: 5, double: 6 } as const
type ClassicType = keyof typeof types
const storedAs = { i2: 'short', f4: 'float', u1: 'byte' } as const
const widths = { byte: 1, text: 1, short: 2, float: 4, double: 8 } as const

type Attributes = Record<string, AttributeInput | { type: ClassicType; value: number }>

interface ClassicVariable {
  name: string
  type: ClassicType
  dimensions: number[]
  attributes: Attributes
  /** Bytes of the whole variable, or of one record of it. */
  bytes: number
  record: boolean
  values: ArrayLike<number>
}

const padded = (bytes: number): number => Math.ceil(bytes / 4) * 4

/** Writes a classic NetCDF file with 64-bit offsets (CDF-2), time being the record dimension. */
export async function writeNetcdfClassic(path: string, file: GridFile): Promise<void> {
  checkShape(file)
  const dimensions = [
    { name: 'time', size: 0 },
    { name: 'lat', size: file.latitudes.length },
    { name: 'lon', size: file.longitudes.length },
    ...(file.timeBounds ? [{ name: 'nv', size: 2 }] : []),
  ]
  const variables = layOut(file)
  const globals: Attributes = { Conventions: 'CF-1.8', ...file.globalAttributes }
  // The header's length does not depend on the offsets it holds, so a first pass with zeros gives its length.
  const begins = placeVariables(variables, header(file, dimensions, globals, variables, []).length, file.times.length)
  const target = await open(path, 'w')
  try {
    await target.write(header(file, dimensions, globals, variables, begins.offsets), 0, null, 0)
    for (const [index, variable] of variables.entries()) {
      const steps = variable.record ? file.times.length : 1
      const count = variable.values.length / steps
      for (let step = 0; step < steps; step++) {
        const bytes = Buffer.alloc(padded(variable.bytes))
        encode(bytes, variable.type, variable.values, step * count, count)
        await target.write(bytes, 0, bytes.length, begins.offsets[index]! + step * begins.recordBytes)
      }
    }
  } finally {
    await target.close()
  }
}

function layOut(file: GridFile): ClassicVariable[] {
  const [rows, columns] = [file.latitudes.length, file.longitudes.length]
  const times = encodeTimes(file)
  const axis = (name: string, dimension: number, values: ArrayLike<number>, attributes: Attributes) => ({
    name,
    type: 'double' as const,
    dimensions: [dimension],
    attributes,
    bytes: dimension === 0 ? 8 : values.length * 8,
    record: dimension === 0,
    values,
  })
  return [
    axis('lat', 1, file.latitudes, { standard_name: 'latitude', units: 'degrees_north', axis: 'Y' }),
    axis('lon', 2, file.longitudes, { standard_name: 'longitude', units: 'degrees_east', axis: 'X' }),
    axis('time', 0, times.values, {
      standard_name: 'time',
      units: times.units,
      calendar: 'standard',
      axis: 'T',
      ...(times.bounds ? { bounds: 'time_bnds' } : {}),
    }),
    ...(times.bounds
      ? [{ ...axis('time_bnds', 0, times.bounds, {}), dimensions: [0, 3], bytes: 16 }]
      : []),
    ...file.variables.map((variable) => ({
      name: variable.name,
      type: storedAs[variable.dtype],
      dimensions: [0, 1, 2],
      attributes: variableAttributes(variable),
      bytes: rows * columns * widths[storedAs[variable.dtype]],
      record: true,
      values: packValues(variable),
    })),
  ]
}

function variableAttributes({ dtype, fill, scale, offset, attributes }: GridFileVariable): Attributes {
  const value = fill ?? defaultFill[dtype]
  return {
    // The classic format has no unsigned types: the bytes are stored signed and marked.
    ...(dtype === 'u1' ? { _Unsigned: 'true' } : {}),
    _FillValue: { type: storedAs[dtype], value: dtype === 'u1' && value > 127 ? value - 256 : value },
    ...(scale === undefined ? {} : { scale_factor: scale }),
    ...(offset === undefined ? {} : { add_offset: offset }),
    ...attributes,
  }
}

function placeVariables(variables: ClassicVariable[], headerBytes: number, steps: number) {
  const offsets = variables.map(() => 0)
  let next = headerBytes
  for (const record of [false, true]) {
    for (const [index, variable] of variables.entries()) {
      if (variable.record !== record) continue
      offsets[index] = next
      next += padded(variable.bytes)
    }
  }
  const recordBytes = variables.reduce((sum, v) => sum + (v.record && steps > 0 ? padded(v.bytes) : 0), 0)
  return { offsets, recordBytes }
}

function header(
  file: GridFile,
  dimensions: { name: string; size: number }[],
  globals: Attributes,
  variables: ClassicVariable[],
  offsets: number[],
): Buffer {
  const list = (tag: number, items: Buffer[]) =>
    Buffer.concat([int(items.length ? tag : 0), int(items.length), ...items])
  const attributes = (set: Attributes) =>
    list(12, Object.entries(set).map(([name, value]) => Buffer.concat([text(name), attributeValue(value)])))
  return Buffer.concat([
    Buffer.from([0x43, 0x44, 0x46, 2]),
    int(file.times.length),
    list(10, dimensions.map(({ name, size }) => Buffer.concat([text(name), int(size)]))),
    attributes(globals),
    list(
      11,
      variables.map((variable, index) => {
        const begin = Buffer.alloc(8)
        begin.writeBigUInt64BE(BigInt(offsets[index] ?? 0))
        return Buffer.concat([
          text(variable.name),
          int(variable.dimensions.length),
          ...variable.dimensions.map(int),
          attributes(variable.attributes),
          int(types[variable.type]),
          // Readers work the size out from the dimensions; the field holds 2^32 - 1 where it can't say it.
          int(Math.min(padded(variable.bytes), 0xffffffff)),
          begin,
        ])
      }),
    ),
  ])
}

function attributeValue(value: Attributes[string]): Buffer {
  if (typeof value === 'string') return Buffer.concat([int(types.text), text(value)])
  const { type, value: number } = typeof value === 'number' ? { type: 'double' as const, value } : value
  const bytes = Buffer.alloc(padded(widths[type]))
  encode(bytes, type, [number], 0, 1)
  return Buffer.concat([int(types[type]), int(1), bytes])
}

function int(value: number): Buffer {
  const bytes = Buffer.alloc(4)
  bytes.writeUInt32BE(value)
  return bytes
}

function text(value: string): Buffer {
  const bytes = Buffer.alloc(4 + padded(Buffer.byteLength(value)))
  bytes.writeUInt32BE(Buffer.byteLength(value))
  bytes.write(value, 4)
  return bytes
}

function encode(bytes: Buffer, type: ClassicType, values: ArrayLike<number>, from: number, count: number): void {
  for (let i = 0; i < count; i++) {
    const value = values[from + i]!
    if (type === 'double') bytes.writeDoubleBE(value, i * 8)
    else if (type === 'float') bytes.writeFloatBE(value, i * 4)
    else if (type === 'short') bytes.writeInt16BE(value, i * 2)
    else bytes[i] = value & 0xff
  }
}
