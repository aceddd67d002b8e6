/** Cell edges from centres: midpoints, the outermost mirrored. Needs two centres. */
export function edgesFromCentres(centres: Float64Array): Float64Array {
  const n = centres.length
  const edges = new Float64Array(n + 1)
  for (let i = 1; i < n; i++) edges[i] = (centres[i - 1]! + centres[i]!) / 2
  edges[0] = 2 * centres[0]! - edges[1]!
  edges[n] = 2 * centres[n - 1]! - edges[n - 1]!
  return edges
}

/**
 * Cell edges from bounds (pairs, row-major), or null when the cells leave gaps or overlap, do not hold their
 * centres, or hold no numbers: such bounds can't be edges of a grid.
 */
export function edgesFromBounds(bounds: Float64Array, centres: Float64Array): Float64Array | null {
  const n = centres.length
  if (bounds.length !== 2 * n) return null
  const up = n > 1 ? centres[1]! > centres[0]! : bounds[1]! >= bounds[0]!
  const edges = new Float64Array(n + 1)
  for (let i = 0; i < n; i++) {
    const [a, b] = [bounds[2 * i]!, bounds[2 * i + 1]!]
    const [first, last] = a < b === up ? [a, b] : [b, a]
    const size = Math.abs(last - first)
    const centre = centres[i]!
    const slack = size * 1e-3
    if (!(size > 0) || centre < Math.min(a, b) - slack || centre > Math.max(a, b) + slack) return null
    if (i > 0 && Math.abs(edges[i]! - first) > slack) return null
    if (i === 0) edges[0] = first
    edges[i + 1] = last
  }
  return edges
}

/** Longitudes without the jump at 180 or 360: each step becomes the shorter way round. */
export function unwrapLongitudes(longitudes: Float64Array): Float64Array {
  const unwrapped = Float64Array.from(longitudes)
  let turn = 0
  for (let i = 1; i < unwrapped.length; i++) {
    const step = longitudes[i]! - longitudes[i - 1]!
    if (step > 180) turn -= 360
    else if (step < -180) turn += 360
    unwrapped[i] = longitudes[i]! + turn
  }
  return unwrapped
}

export function isMonotonic(values: Float64Array): boolean {
  const up = values.length < 2 || values[1]! > values[0]!
  for (let i = 1; i < values.length; i++) {
    if (up ? !(values[i]! > values[i - 1]!) : !(values[i]! < values[i - 1]!)) return false
  }
  return true
}
