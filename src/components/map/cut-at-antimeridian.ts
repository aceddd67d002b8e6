type Position = readonly [longitude: number, latitude: number]
export type Ring = Position[]

/**
 * Cuts a closed ring at 180 degrees, so that no edge runs across the map. A ring that goes round a pole is closed along
 * that pole. Longitudes come back within -180 to 180; a ring that crosses nowhere comes back whole.
 */
export function cutAtAntimeridian(ring: readonly (readonly number[])[]): Ring[] {
  const unwrapped = closedAtPole(unwrap(ring))
  const longitudes = unwrapped.map(([longitude]) => longitude)
  const west = Math.min(...longitudes)
  const east = Math.max(...longitudes)
  const pieces: Ring[] = []
  for (let world = Math.floor((west + 180) / 360); world <= Math.floor((east + 180) / 360); world++) {
    const shift = world * 360
    const clipped = clipLongitudes(unwrapped, shift - 180, shift + 180)
    if (clipped.length >= 3) pieces.push(clipped.map(([longitude, latitude]) => [longitude - shift, latitude]))
  }
  return pieces
}

/** Adds or takes whole turns so that each point is within half a turn of the one before. */
function unwrap(ring: readonly (readonly number[])[]): Ring {
  const points: Ring = []
  let turns = 0
  let before: number | undefined
  for (const [longitude = 0, latitude = 0] of ring) {
    if (before !== undefined && longitude - before > 180) turns -= 360
    if (before !== undefined && longitude - before < -180) turns += 360
    before = longitude
    points.push([longitude + turns, latitude])
  }
  return points
}

function closedAtPole(points: Ring): Ring {
  const first = points[0]
  const last = points.at(-1)
  if (!first || !last || Math.abs(last[0] - first[0]) < 180) return points
  const pole = mean(points) < 0 ? -90 : 90
  return [...points, [last[0], pole], [first[0], pole]]
}

function mean(points: Ring): number {
  return points.reduce((sum, [, latitude]) => sum + latitude, 0) / points.length
}

/** Sutherland and Hodgman's polygon clipping against two meridians. */
function clipLongitudes(points: Ring, west: number, east: number): Ring {
  return clipHalf(clipHalf(points, (longitude) => longitude >= west, west), (longitude) => longitude <= east, east)
}

function clipHalf(points: Ring, inside: (longitude: number) => boolean, edge: number): Ring {
  const kept: Ring = []
  points.forEach((point, index) => {
    const before = points.at(index - 1) ?? point
    if (inside(point[0]) !== inside(before[0])) {
      const share = (edge - before[0]) / (point[0] - before[0])
      kept.push([edge, before[1] + share * (point[1] - before[1])])
    }
    if (inside(point[0])) kept.push(point)
  })
  return kept
}
