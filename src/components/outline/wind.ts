import type { RegionGeometry } from '../../../shared/schemas/regions'

/** Outer rings counter-clockwise, holes clockwise, as RFC 7946 wants it; which way round a person went is no news to them. */
export function wound(geometry: RegionGeometry): RegionGeometry {
  if (geometry.type === 'Polygon') return { ...geometry, coordinates: windRings(geometry.coordinates) }
  return { ...geometry, coordinates: geometry.coordinates.map(windRings) }
}

function windRings(rings: number[][][]): number[][][] {
  return rings.map((ring, place) => (signedArea(ring) < 0 === (place === 0) ? ring.toReversed() : ring))
}

function signedArea(ring: number[][]): number {
  let sum = 0
  ring.forEach(([x = 0, y = 0], i) => {
    const [nextX = 0, nextY = 0] = ring[(i + 1) % ring.length] ?? []
    sum += x * nextY - nextX * y
  })
  return sum / 2
}
