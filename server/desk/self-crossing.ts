import type { Position } from 'geojson'

/** Where two edges of a polygon's rings cross or overlap; null when none do. Neighbours may meet in their shared point. */
export function selfCrossing(rings: Position[][]): Position | null {
  const edges = rings.flatMap((ring, r) => ring.slice(0, -1).map((from, i) => ({ from, to: ring[i + 1]!, ring: r, i, count: ring.length - 1 })))
  for (let a = 0; a < edges.length; a++) {
    for (let b = a + 1; b < edges.length; b++) {
      const [one, two] = [edges[a]!, edges[b]!]
      const neighbours = one.ring === two.ring && (two.i - one.i === 1 || (one.i === 0 && two.i === two.count - 1))
      if (!boxesTouch(one, two)) continue
      const at = neighbours ? foldedBack(one, two) : crossing(one, two)
      if (at) return at
    }
  }
  return null
}

interface Edge {
  from: Position
  to: Position
}

function boxesTouch(a: Edge, b: Edge): boolean {
  return [0, 1].every(
    (axis) =>
      Math.min(a.from[axis]!, a.to[axis]!) <= Math.max(b.from[axis]!, b.to[axis]!) && Math.min(b.from[axis]!, b.to[axis]!) <= Math.max(a.from[axis]!, a.to[axis]!),
  )
}

function side(a: Position, b: Position, p: Position): number {
  return Math.sign((b[0]! - a[0]!) * (p[1]! - a[1]!) - (b[1]! - a[1]!) * (p[0]! - a[0]!))
}

function crossing(a: Edge, b: Edge): Position | null {
  const [s1, s2] = [side(a.from, a.to, b.from), side(a.from, a.to, b.to)]
  const [s3, s4] = [side(b.from, b.to, a.from), side(b.from, b.to, a.to)]
  if (s1 * s2 > 0 || s3 * s4 > 0) return null
  // Rings may touch in a point of theirs; lying on each other is a fault.
  if (s1 === 0 && s2 === 0) return overlap(a, b)
  if (s1 * s2 === 0 || s3 * s4 === 0) return null
  const [dx, dy] = [a.to[0]! - a.from[0]!, a.to[1]! - a.from[1]!]
  const [ex, ey] = [b.to[0]! - b.from[0]!, b.to[1]! - b.from[1]!]
  const t = ((b.from[0]! - a.from[0]!) * ey - (b.from[1]! - a.from[1]!) * ex) / (dx * ey - dy * ex)
  return [a.from[0]! + t * dx, a.from[1]! + t * dy]
}

function overlap(a: Edge, b: Edge): Position | null {
  const axis = Math.abs(a.to[0]! - a.from[0]!) >= Math.abs(a.to[1]! - a.from[1]!) ? 0 : 1
  const low = Math.max(Math.min(a.from[axis]!, a.to[axis]!), Math.min(b.from[axis]!, b.to[axis]!))
  const high = Math.min(Math.max(a.from[axis]!, a.to[axis]!), Math.max(b.from[axis]!, b.to[axis]!))
  return high > low ? a.from : null
}

function foldedBack(a: Edge, b: Edge): Position | null {
  return side(a.from, a.to, b.from) === 0 && side(a.from, a.to, b.to) === 0 ? overlap(a, b) : null
}
