import type { Position } from 'geojson'

export type Placed = [x: number, y: number]

/** A chord may leave the curve it stands for by this much of a cell. */
const toleranceCells = 1e-6
const deepestSplit = 24
/** A curve that bends both ways can pass through the middle of its chord, so every edge is looked at in four pieces. */
const firstPieces = 4

/**
 * A longitude/latitude ring in the plane of a grid. Edges are straight in longitude and latitude, so they bend in the
 * plane: each is split until chord and curve agree within a millionth of a cell. `place` maps degrees to columns and
 * rows. Null when no point has a place there; a RangeError when only some have, or when an edge tears.
 */
export function planeRing(
  ring: readonly Position[],
  place: (lon: number, lat: number) => Placed,
): { x: Float64Array; y: Float64Array } | null {
  const corners = ring.map(([lon = NaN, lat = NaN]) => place(lon, lat))
  const placed = corners.filter(([x, y]) => Number.isFinite(x) && Number.isFinite(y)).length
  if (placed === 0) return null
  const xs: number[] = []
  const ys: number[] = []
  for (let i = 0; i < ring.length; i++) {
    const [lon1 = NaN, lat1 = NaN] = ring[i]!
    const [lon2 = NaN, lat2 = NaN] = ring[(i + 1) % ring.length]!
    let from = corners[i]!
    for (let piece = 0; piece < firstPieces; piece++) {
      const t1 = piece / firstPieces
      const t2 = (piece + 1) / firstPieces
      const at = (t: number) => place(lon1 + (lon2 - lon1) * t, lat1 + (lat2 - lat1) * t)
      const to = t2 === 1 ? corners[(i + 1) % ring.length]! : at(t2)
      follow(at, t1, from, t2, to, xs, ys, 0)
      from = to
    }
  }
  return { x: Float64Array.from(xs), y: Float64Array.from(ys) }
}

/** Adds the start of a piece and whatever points it needs before its end. */
function follow(
  at: (t: number) => Placed,
  t1: number,
  from: Placed,
  t2: number,
  to: Placed,
  xs: number[],
  ys: number[],
  depth: number,
): void {
  const middle = at((t1 + t2) / 2)
  const away = Math.hypot(middle[0] - (from[0] + to[0]) / 2, middle[1] - (from[1] + to[1]) / 2)
  if (!Number.isFinite(away)) throw new RangeError('Part of this outline has no place in the projection of the grid.')
  if (away <= toleranceCells || depth === deepestSplit) {
    if (away > 1) throw new RangeError('This outline crosses the edge of the projection of the grid.')
    xs.push(from[0])
    ys.push(from[1])
    return
  }
  follow(at, t1, from, (t1 + t2) / 2, middle, xs, ys, depth + 1)
  follow(at, (t1 + t2) / 2, middle, t2, to, xs, ys, depth + 1)
}
