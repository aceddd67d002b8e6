/**
 * Area in km2 by value: 20 bins a decade from 0.001 to 1000, so that "area above" can be answered for any level later.
 * A Float64Array of 122: [0] below 0.001 (zero and negative values too), [1..120] the bins, [121] from 1000 on.
 */
export type AreaHistogram = Float64Array

const binsPerDecade = 20
const lowestExponent = -3
const highestExponent = 3
const bins = binsPerDecade * (highestExponent - lowestExponent)
export const histogramLength = bins + 2

/** Place of a value among the bins, as a fraction, by its log10: 0 at 0.001, 120 at 1000. */
function placeOf(log10: number): number {
  const place = (log10 - lowestExponent) * binsPerDecade
  const past = place - Math.floor(place)
  // 0.001 and its like sit on an edge, and the logarithm misses it by its last digit.
  return past > 1 - 1e-9 ? Math.ceil(place) : past < 1e-9 ? Math.floor(place) : place
}

/** The position of a value in an `AreaHistogram`. */
export function binOf(value: number): number {
  return value > 0 ? binOfLog10(Math.log10(value)) : 0
}

/** The same by the value's log10. */
export function binOfLog10(log10: number): number {
  return Math.min(Math.max(Math.floor(placeOf(log10)) + 1, 0), bins + 1)
}

/**
 * Area in km2 with values at or above a level. Inside the bin that holds the level the area is taken as spread evenly
 * in log10 of the value; at a bin's edge the answer is exact. Levels outside 0.001..1000 cannot be told: null.
 */
export function areaAboveKm2(histogram: AreaHistogram, level: number): number | null {
  if (!(level > 0)) return null
  const place = placeOf(Math.log10(level))
  if (!(place >= 0 && place <= bins)) return null
  let sum = 0
  for (let bin = Math.floor(place) + 1; bin < histogramLength; bin++) sum += histogram[bin]!
  return sum - histogram[Math.floor(place) + 1]! * (place - Math.floor(place))
}

/** For storage: one byte with the first bin in use, then little-endian float32 km2 up to the last one in use. */
export function packHistogram(histogram: AreaHistogram): Uint8Array {
  let last = histogramLength - 1
  while (last >= 0 && histogram[last] === 0) last--
  if (last < 0) return new Uint8Array(0)
  let first = 0
  while (histogram[first] === 0) first++
  const bytes = new Uint8Array(1 + 4 * (last - first + 1))
  const view = new DataView(bytes.buffer)
  bytes[0] = first
  for (let bin = first; bin <= last; bin++) view.setFloat32(1 + 4 * (bin - first), histogram[bin]!, true)
  return bytes
}

/** The reverse of `packHistogram`. Bytes that are no packed histogram are a RangeError. */
export function unpackHistogram(bytes: Uint8Array): AreaHistogram {
  const histogram = new Float64Array(histogramLength)
  if (bytes.length === 0) return histogram
  const first = bytes[0]!
  const count = (bytes.length - 1) / 4
  if (!Number.isInteger(count) || first + count > histogramLength) throw new RangeError('These bytes are no histogram.')
  const view = new DataView(bytes.buffer, bytes.byteOffset)
  for (let i = 0; i < count; i++) histogram[first + i] = view.getFloat32(1 + 4 * i, true)
  return histogram
}

/** `areaAboveKm2` of packed histograms that stand one behind the other, each with as many bytes as `lengths` says. */
export function areasAboveKm2(packed: Uint8Array, lengths: readonly number[], level: number): (number | null)[] {
  const place = level > 0 ? placeOf(Math.log10(level)) : NaN
  const view = new DataView(packed.buffer, packed.byteOffset, packed.byteLength)
  let at = 0
  return lengths.map((length) => {
    const from = at
    at += length
    if (!(place >= 0 && place <= bins)) return null
    if (length === 0) return 0
    const first = packed[from]!
    const count = (length - 1) / 4
    if (!Number.isInteger(count) || first + count > histogramLength) throw new RangeError('These bytes are no histogram.')
    const split = Math.floor(place) + 1
    let sum = 0
    for (let bin = Math.max(first, split); bin < first + count; bin++) {
      const area = view.getFloat32(from + 1 + 4 * (bin - first), true)
      sum += bin === split ? area * (1 - (place - Math.floor(place))) : area
    }
    return sum
  })
}

/** Bins from the first to the last that holds any area, with the values they begin at (included) and end at; null: no such end. */
export function binsInUse(histogram: AreaHistogram): { from: number | null; to: number | null; areaKm2: number }[] {
  const [first, last] = [histogram.findIndex((area) => area > 0), histogram.findLastIndex((area) => area > 0)]
  if (first < 0) return []
  const edge = (bin: number) => 10 ** (lowestExponent + bin / binsPerDecade)
  return Array.from(histogram.subarray(first, last + 1), (areaKm2, i) => {
    const bin = first + i
    return { from: bin === 0 ? null : edge(bin - 1), to: bin === bins + 1 ? null : edge(bin), areaKm2 }
  })
}
