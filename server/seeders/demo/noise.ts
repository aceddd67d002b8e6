import type { DemoGrid } from './grid'

/**
 * Smooth noise that any single date can have alone: white noise is a hash of (seed, stream, date, knot), memory in
 * time is a cut-off moving average of it with weights phi^k, smoothness in space a cubic B-spline over few knots.
 * So a value never depends on which dates were made before.
 */
export interface NoiseStream {
  /** Tells streams of one seed apart. */
  stream: number
  /** Knots along latitude and longitude, at least 4 each. */
  knots: [number, number]
  /** Correlation from one day to the next, 0 to below 1. */
  memory: number
}

/** Adds `amount` times standard-normal noise of a date to `target`. Variance is 1 at every cell, not on average only. */
export function addNoise(target: Float64Array, amount: number, noise: NoiseStream, seed: number, day: number, grid: DemoGrid) {
  const [knotRows, knotColumns] = noise.knots
  const knots = knotPlane(noise, seed, day)
  const rows = splineWeights(grid.southward, knotRows)
  const columns = splineWeights(grid.eastward, knotColumns)
  const width = grid.eastward.length
  const line = new Float64Array(knotColumns)
  for (let row = 0; row < grid.southward.length; row++) {
    line.fill(0)
    for (let k = 0; k < 4; k++) {
      const weight = amount * (rows.weights[row * 4 + k] ?? 0)
      const start = ((rows.first[row] ?? 0) + k) * knotColumns
      for (let j = 0; j < knotColumns; j++) line[j] = (line[j] ?? 0) + weight * (knots[start + j] ?? 0)
    }
    for (let column = 0; column < width; column++) {
      const first = columns.first[column] ?? 0
      const w = column * 4
      const value =
        (columns.weights[w] ?? 0) * (line[first] ?? 0) +
        (columns.weights[w + 1] ?? 0) * (line[first + 1] ?? 0) +
        (columns.weights[w + 2] ?? 0) * (line[first + 2] ?? 0) +
        (columns.weights[w + 3] ?? 0) * (line[first + 3] ?? 0)
      const index = row * width + column
      target[index] = (target[index] ?? 0) + value
    }
  }
}

/** Adds `amount` times standard-normal noise without memory in time or space: a sensor's own. */
export function addWhiteNoise(target: Float64Array, amount: number, stream: number, seed: number, day: number) {
  const key = mixed(mixed(seed ^ Math.imul(stream, 0x9e3779b1)) ^ day)
  for (let i = 0; i < target.length; i++) target[i] = (target[i] ?? 0) + amount * normalOf(mixed(key ^ i))
}

/** One standard-normal number, for whatever happens once a year or once a day. */
export function normalAt(stream: number, seed: number, day: number): number {
  return normalOf(mixed(mixed(mixed(seed ^ Math.imul(stream, 0x9e3779b1)) ^ day)))
}

/** One number from 0 to below 1. */
export function uniformAt(stream: number, seed: number, day: number): number {
  return mixed(mixed(mixed(seed ^ Math.imul(stream, 0x9e3779b1)) ^ day)) / 2 ** 32
}

/** Weights below this share of the first are cut off. */
const leastWeight = 0.03

function knotPlane({ stream, knots, memory }: NoiseStream, seed: number, day: number): Float64Array {
  const plane = new Float64Array(knots[0] * knots[1])
  const days = memory > 0 ? Math.ceil(Math.log(leastWeight) / Math.log(memory)) : 1
  const norm = Math.sqrt((1 - memory ** 2) / (1 - memory ** (2 * days)))
  const base = mixed(seed ^ Math.imul(stream, 0x9e3779b1))
  for (let back = 0; back < days; back++) {
    const key = mixed(base ^ (day - back))
    const weight = norm * memory ** back
    for (let i = 0; i < plane.length; i++) plane[i] = (plane[i] ?? 0) + weight * normalOf(mixed(key ^ i))
  }
  return plane
}

interface SplineWeights {
  first: Int32Array
  weights: Float64Array
}

const knownWeights = new WeakMap<Float64Array, Map<number, SplineWeights>>()

/** For each position the first of its four knots and their weights, scaled to unit sum of squares. */
function splineWeights(positions: Float64Array, knots: number): SplineWeights {
  const known = knownWeights.get(positions)?.get(knots)
  if (known) return known
  const made = { first: new Int32Array(positions.length), weights: new Float64Array(positions.length * 4) }
  positions.forEach((position, i) => {
    const along = position * (knots - 3)
    const first = Math.min(Math.floor(along), knots - 4)
    const t = along - first
    const basis = [(1 - t) ** 3, 3 * t ** 3 - 6 * t ** 2 + 4, -3 * t ** 3 + 3 * t ** 2 + 3 * t + 1, t ** 3]
    const length = Math.hypot(...basis)
    made.first[i] = first
    basis.forEach((weight, k) => (made.weights[i * 4 + k] = weight / length))
  })
  const forPositions = knownWeights.get(positions) ?? new Map<number, SplineWeights>()
  knownWeights.set(positions, forPositions.set(knots, made))
  return made
}

/** A 32-bit integer hash (the finaliser of MurmurHash3). */
function mixed(value: number): number {
  let h = value | 0
  h = Math.imul(h ^ (h >>> 16), 0x85ebca6b)
  h = Math.imul(h ^ (h >>> 13), 0xc2b2ae35)
  return (h ^ (h >>> 16)) >>> 0
}

/** Sum of the four bytes of a hash, centred and scaled: near enough to normal, and never beyond 3.5. */
function normalOf(hash: number): number {
  return ((hash & 255) + ((hash >>> 8) & 255) + ((hash >>> 16) & 255) + (hash >>> 24) - 510) / 147.8
}
