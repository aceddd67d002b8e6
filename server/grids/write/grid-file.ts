/** What the writers take: one regular file on a latitude/longitude grid. Values are NaN where missing. */
export interface GridFile {
  /** Cell centres in degrees, in either direction. */
  latitudes: ArrayLike<number>
  longitudes: ArrayLike<number>
  /** Epoch milliseconds UTC, ascending. */
  times: readonly number[]
  /** Start and end of each step, for composites. */
  timeBounds?: readonly (readonly [number, number])[]
  variables: GridFileVariable[]
  globalAttributes?: Record<string, AttributeInput>
  /** Deflate level 1 to 9; none without it. Ignored by the classic format, which has no compression. */
  deflate?: number
}

export type AttributeInput = string | number

export interface GridFileVariable {
  name: string
  dtype: 'i2' | 'f4' | 'u1'
  /** times x latitudes x longitudes, row-major. */
  data: Float64Array
  /** value = packed * scale + offset */
  scale?: number
  offset?: number
  /** Packed value that stands for missing. */
  fill?: number
  attributes?: Record<string, AttributeInput>
}

export const defaultFill = { i2: -32767, f4: 9.969209968386869e36, u1: 255 } as const

const limits = { i2: [-32768, 32767], u1: [0, 255] } as const

/**
 * Packs values for storage; missing becomes the fill value. Throws RangeError when a value has no packed form:
 * a silently clipped number would be a wrong number.
 */
export function packValues(variable: GridFileVariable): Int16Array | Float32Array | Uint8Array {
  const { dtype, data, scale = 1, offset = 0, fill = defaultFill[dtype] } = variable
  if (dtype === 'f4') {
    return Float32Array.from(data, (value) => (Number.isNaN(value) ? fill : (value - offset) / scale))
  }
  const [lowest, highest] = limits[dtype]
  const packed = dtype === 'i2' ? new Int16Array(data.length) : new Uint8Array(data.length)
  for (let i = 0; i < data.length; i++) {
    const value = data[i]!
    if (Number.isNaN(value)) {
      packed[i] = fill
      continue
    }
    const stored = Math.round((value - offset) / scale)
    if (stored < lowest || stored > highest || stored === fill) {
      throw new RangeError(`${variable.name}: ${value} has no packed form with scale ${scale} and offset ${offset}`)
    }
    packed[i] = stored
  }
  return packed
}

const dayMs = 86_400_000

/** Days for dates alone, seconds as soon as a clock time matters, so that a reader can tell the two apart. */
export function encodeTimes(file: GridFile): { units: string; values: Float64Array; bounds: Float64Array | null } {
  const dates = file.times.every((time) => time % dayMs === 0)
  const unitMs = dates ? dayMs : 1000
  return {
    units: dates ? 'days since 1970-01-01' : 'seconds since 1970-01-01 00:00:00',
    values: Float64Array.from(file.times, (time) => time / unitMs),
    bounds: file.timeBounds ? Float64Array.from(file.timeBounds.flat(), (time) => time / unitMs) : null,
  }
}

export function checkShape(file: GridFile): void {
  const cells = file.times.length * file.latitudes.length * file.longitudes.length
  if (cells === 0) throw new RangeError('a grid file needs at least one time, latitude and longitude')
  for (const variable of file.variables) {
    if (variable.data.length !== cells) {
      throw new RangeError(`${variable.name} has ${variable.data.length} values where the axes give ${cells}`)
    }
  }
}
