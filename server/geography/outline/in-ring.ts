import type { Position } from 'geojson'

/** Whether a point lies inside a closed ring (even-odd); on its edge is either. */
export function inRing(ring: readonly Position[], [x = NaN, y = NaN]: Position): boolean {
  let inside = false
  for (let i = 0; i + 1 < ring.length; i++) {
    const [x1 = NaN, y1 = NaN] = ring[i]!
    const [x2 = NaN, y2 = NaN] = ring[i + 1]!
    if (y1 > y !== y2 > y && x < x1 + ((y - y1) / (y2 - y1)) * (x2 - x1)) inside = !inside
  }
  return inside
}

/** Whether a point lies in the water of a polygon: in its first ring and in none of its others. */
export function inPolygon(rings: readonly Position[][], point: Position): boolean {
  return inRing(rings[0]!, point) && !rings.slice(1).some((hole) => inRing(hole, point))
}
