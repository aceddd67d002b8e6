/** Points of a ring as x, y, x, y ...; the last is joined to the first. */
export type FlatRing = ArrayLike<number>

/**
 * The part of a ring on the left of the line from (x1, y1) to (x2, y2), by Sutherland and Hodgman. A hollow ring may
 * come back as one piece joined along the line; its signed area is that of the true parts all the same, and stays so
 * when it is cut again.
 */
export function clipRing(ring: FlatRing, x1: number, y1: number, x2: number, y2: number): number[] {
  const clipped: number[] = []
  const n = ring.length
  if (n === 0) return clipped
  const [dx, dy] = [x2 - x1, y2 - y1]
  let [fromX, fromY] = [ring[n - 2]!, ring[n - 1]!]
  let from = dx * (fromY - y1) - dy * (fromX - x1)
  for (let i = 0; i < n; i += 2) {
    const [toX, toY] = [ring[i]!, ring[i + 1]!]
    const to = dx * (toY - y1) - dy * (toX - x1)
    if (from >= 0 !== to >= 0) {
      const t = from / (from - to)
      clipped.push(fromX + (toX - fromX) * t, fromY + (toY - fromY) * t)
    }
    if (to >= 0) clipped.push(toX, toY)
    ;[fromX, fromY, from] = [toX, toY, to]
  }
  return clipped
}

/** Signed area of a ring in the plane, positive when it runs counter-clockwise; summed from its first point. */
export function flatArea(ring: FlatRing): number {
  const [x0 = 0, y0 = 0] = [ring[0], ring[1]]
  let twice = 0
  for (let i = 2; i + 3 < ring.length; i += 2) {
    twice += (ring[i]! - x0) * (ring[i + 3]! - y0) - (ring[i + 2]! - x0) * (ring[i + 1]! - y0)
  }
  return twice / 2
}
