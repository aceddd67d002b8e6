import type { MultiPolygon, Polygon, Position } from 'geojson'
import { areaToEquatorKm2 } from './wgs84'

/** Gauss-Legendre on -1..1: exact to the ninth degree, and nothing is left over in pieces of two degrees. */
const nodes = [0, 0.5384693101056831, 0.906179845938664] as const
const weights = [0.5688888888888889, 0.47862867049936647, 0.23692688505618908] as const
const longestPieceDeg = 2

/** Mean over a straight piece in latitude of q(lat) - q(reference). */
function meanHeightKm2(fromDeg: number, toDeg: number, referenceKm2: number): number {
  const middle = (fromDeg + toDeg) / 2
  const half = (toDeg - fromDeg) / 2
  let sum = weights[0] * (areaToEquatorKm2(middle) - referenceKm2)
  for (const i of [1, 2] as const) {
    const away = half * nodes[i]
    sum += weights[i] * (areaToEquatorKm2(middle - away) + areaToEquatorKm2(middle + away) - 2 * referenceKm2)
  }
  return sum / 2
}

function edgeKm2(from: Position, to: Position, referenceKm2: number): number {
  const [lon1 = NaN, lat1 = NaN] = from
  const [lon2 = NaN, lat2 = NaN] = to
  const width = ((lon2 - lon1) * Math.PI) / 180
  if (width === 0) return 0
  if (lat1 === lat2) return width * (areaToEquatorKm2(lat1) - referenceKm2)
  const pieces = Math.max(1, Math.ceil(Math.abs(lat2 - lat1) / longestPieceDeg))
  const step = (lat2 - lat1) / pieces
  let sum = 0
  for (let i = 0; i < pieces; i++) sum += meanHeightKm2(lat1 + i * step, lat1 + (i + 1) * step, referenceKm2)
  return (width / pieces) * sum
}

/**
 * WGS84 area in km2 of a longitude/latitude ring whose edges are straight in longitude and latitude (RFC 7946), open or
 * closed, either winding, never negative. Longitudes may run past 180 but must not jump. Fewer than three points: 0.
 * Source: the contour integral of q(lat) d(lon), q of `areaToEquatorKm2`.
 */
export function ringAreaKm2(ring: readonly Position[]): number {
  if (ring.length < 3) return 0
  // Heights are taken from a parallel close by, so a small ring far from the equator keeps its digits.
  const referenceKm2 = areaToEquatorKm2(ring[0]![1] ?? NaN)
  let sum = 0
  for (let i = 0; i < ring.length; i++) sum += edgeKm2(ring[i]!, ring[(i + 1) % ring.length]!, referenceKm2)
  return Math.abs(sum)
}

/** WGS84 area in km2 of a polygon or multipolygon: outer rings less their holes; edges as in `ringAreaKm2`. */
export function polygonAreaKm2(geometry: Polygon | MultiPolygon): number {
  const parts = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates
  let sum = 0
  for (const [outer = [], ...holes] of parts) {
    sum += ringAreaKm2(outer)
    for (const hole of holes) sum -= ringAreaKm2(hole)
  }
  return sum
}
