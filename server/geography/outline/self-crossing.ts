import type { Position } from 'geojson'
import { inRing } from './in-ring'

/** Where edges cross, lie on each other, or a ring winds round its own water wrongly; `rings` are the two it concerns. */
export interface Crossing {
  at: Position
  rings: [number, number]
}

interface Edge {
  from: Position
  to: Position
  ring: number
  i: number
  count: number
  west: number
  east: number
}

/**
 * Where a polygon's closed rings cross or overlap; null where none do. Neighbours may meet in their shared point, and
 * rings may touch in points. Edges are straight in longitude and latitude. Swept from west to east.
 */
export function selfCrossing(rings: readonly Position[][]): Crossing | null {
  const touches: Crossing[] = []
  const open: Edge[] = []
  for (const edge of edgesOf(rings).sort((a, b) => a.west - b.west)) {
    let kept = 0
    for (const other of open) {
      if (other.east < edge.west) continue
      open[kept++] = other
      const found = between(other, edge)
      if (found === null) continue
      const crossing: Crossing = { at: found.at, rings: [other.ring, edge.ring] }
      if (!found.touch) return crossing
      touches.push(crossing)
    }
    open.length = kept
    open.push(edge)
  }
  const pinched = new Set(touches.filter(({ rings: [a, b] }) => a === b).map(({ rings: [a] }) => a))
  for (const ring of pinched) {
    const at = wrongWinding(rings[ring]!)
    if (at) return { at: touches.find((touch) => touch.rings[0] === ring && touch.rings[1] === ring)!.at, rings: [ring, ring] }
  }
  return null
}

function edgesOf(rings: readonly Position[][]): Edge[] {
  return rings.flatMap((ring, r) =>
    ring.slice(0, -1).map((from, i) => {
      const to = ring[i + 1]!
      return { from, to, ring: r, i, count: ring.length - 1, west: Math.min(from[0]!, to[0]!), east: Math.max(from[0]!, to[0]!) }
    }),
  )
}

function between(a: Edge, b: Edge): { at: Position; touch: boolean } | null {
  if (Math.max(a.from[1]!, a.to[1]!) < Math.min(b.from[1]!, b.to[1]!) || Math.max(b.from[1]!, b.to[1]!) < Math.min(a.from[1]!, a.to[1]!)) return null
  const apart = Math.abs(a.i - b.i)
  if (a.ring === b.ring && (apart === 1 || apart === a.count - 1)) {
    const at = foldedBack(a, b)
    return at && { at, touch: false }
  }
  return crossing(a, b)
}

function side(a: Position, b: Position, p: Position): number {
  return Math.sign((b[0]! - a[0]!) * (p[1]! - a[1]!) - (b[1]! - a[1]!) * (p[0]! - a[0]!))
}

function crossing(a: Edge, b: Edge): { at: Position; touch: boolean } | null {
  const [s1, s2] = [side(a.from, a.to, b.from), side(a.from, a.to, b.to)]
  const [s3, s4] = [side(b.from, b.to, a.from), side(b.from, b.to, a.to)]
  if (s1 * s2 > 0 || s3 * s4 > 0) return null
  if (s1 === 0 && s2 === 0) {
    const at = overlap(a, b)
    return at && { at, touch: false }
  }
  if (s1 === 0 || s2 === 0) return { at: s1 === 0 ? b.from : b.to, touch: true }
  if (s3 === 0 || s4 === 0) return { at: s3 === 0 ? a.from : a.to, touch: true }
  const [dx, dy] = [a.to[0]! - a.from[0]!, a.to[1]! - a.from[1]!]
  const [ex, ey] = [b.to[0]! - b.from[0]!, b.to[1]! - b.from[1]!]
  const t = ((b.from[0]! - a.from[0]!) * ey - (b.from[1]! - a.from[1]!) * ex) / (dx * ey - dy * ex)
  return { at: [a.from[0]! + t * dx, a.from[1]! + t * dy], touch: false }
}

function overlap(a: Edge, b: Edge): Position | null {
  const axis = Math.abs(a.to[0]! - a.from[0]!) >= Math.abs(a.to[1]! - a.from[1]!) ? 0 : 1
  const low = Math.max(Math.min(a.from[axis]!, a.to[axis]!), Math.min(b.from[axis]!, b.to[axis]!))
  const high = Math.min(Math.max(a.from[axis]!, a.to[axis]!), Math.max(b.from[axis]!, b.to[axis]!))
  if (!(high > low)) return null
  return [a.from, a.to, b.from, b.to].find((p) => p[axis] === low) ?? a.from
}

function foldedBack(a: Edge, b: Edge): Position | null {
  return side(a.from, a.to, b.from) === 0 && side(a.from, a.to, b.to) === 0 ? overlap(a, b) : null
}

/**
 * A ring that touches itself may enclose pieces or leave holes, but must have its water on one side all along: a figure
 * of eight that crosses in a corner does not. Looks just beside every edge.
 */
function wrongWinding(ring: Position[]): Position | null {
  let water: number | null = null
  for (let i = 0; i + 1 < ring.length; i++) {
    const [from, to] = [ring[i]!, ring[i + 1]!]
    const [dx, dy] = [to[0]! - from[0]!, to[1]! - from[1]!]
    const beside = 1e-6
    const middle: Position = [from[0]! + dx / 2 - dy * beside, from[1]! + dy / 2 + dx * beside]
    const left = inRing(ring, middle) ? 1 : -1
    water ??= left
    if (left !== water) return middle
  }
  return null
}
