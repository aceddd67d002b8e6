import { deflateRawSync, inflateRawSync } from 'node:zlib'

const perDegree = 1e9
/** Stands for a corner without a place. */
const absent = 0

/**
 * Corner coordinates as text: billionths of a degree, as differences of differences along each row, in bytes of seven
 * bits, deflated. Exact for numbers rounded to a billionth of a degree; a few bytes a corner where a grid is smooth.
 */
export function packDegrees(values: Float64Array, across: number): string {
  // Three bytes a corner are enough for smooth grids; eight of seven bits hold any difference of places on Earth.
  let bytes = new Uint8Array(values.length * 3 + 8)
  let length = 0
  const put = (number: number) => {
    if (length + 8 > bytes.length) {
      const longer = new Uint8Array(Math.ceil(bytes.length * 1.5) + 8)
      longer.set(bytes)
      bytes = longer
    }
    let rest = number
    while (rest >= 128) {
      bytes[length++] = (rest % 128) + 128
      rest = Math.floor(rest / 128)
    }
    bytes[length++] = rest
  }
  let [previous, step] = [0, 0]
  for (let i = 0; i < values.length; i++) {
    if (i % across === 0) step = 0
    const value = values[i]!
    if (Number.isNaN(value)) {
      put(absent)
      continue
    }
    const units = Math.round(value * perDegree)
    const bend = units - previous - step
    put(1 + (bend < 0 ? -2 * bend - 1 : 2 * bend))
    step = units - previous
    previous = units
  }
  return deflateRawSync(bytes.subarray(0, length), { level: 2 }).toString('base64')
}

export function unpackDegrees(text: string, count: number, across: number): Float64Array {
  const bytes = inflateRawSync(Buffer.from(text, 'base64'), { maxOutputLength: 10 * count + 16 })
  const values = new Float64Array(count)
  let [previous, step, at] = [0, 0, 0]
  for (let i = 0; i < count; i++) {
    if (i % across === 0) step = 0
    let [number, weight] = [0, 1]
    for (;;) {
      const byte = bytes[at++]
      if (byte === undefined) throw new RangeError('the text of this grid ends early')
      number += (byte & 127) * weight
      weight *= 128
      if (byte < 128) break
    }
    if (number === absent) {
      values[i] = NaN
      continue
    }
    const folded = number - 1
    const bend = folded % 2 ? -(folded + 1) / 2 : folded / 2
    step += bend
    previous += step
    values[i] = previous / perDegree
  }
  return values
}
