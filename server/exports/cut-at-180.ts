import type { Position } from 'geojson'
import { intersection, type Geom } from 'polyclip-ts'
import type { RegionGeometry } from '../../shared/schemas/regions'

/**
 * An outline as RFC 7946 wants it written: cut at the 180th meridian into parts within -180..180 (3.1.9), outer rings
 * counter-clockwise and holes clockwise (3.1.6). One that lies within comes back as it is.
 */
export function cutAt180(geometry: RegionGeometry): RegionGeometry {
  const parts = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates
  const lons = parts.flat(2).map(([lon]) => lon!)
  const west = lons.reduce((a, b) => Math.min(a, b))
  const east = lons.reduce((a, b) => Math.max(a, b))
  if (west >= -180 && east <= 180) return geometry
  const cut: Position[][][] = []
  for (let turn = 360 * Math.floor((west + 180) / 360); turn - 180 < east; turn += 360) {
    const world: Geom = [[[turn - 180, -90], [turn + 180, -90], [turn + 180, 90], [turn - 180, 90], [turn - 180, -90]]]
    for (const rings of intersection(parts as Geom, world)) cut.push(rings.map((ring, i) => wound(ring.map(([lon, lat]) => [lon - turn, lat]), i === 0 ? 1 : -1)))
  }
  return cut.length === 1 ? { type: 'Polygon', coordinates: cut[0]! } : { type: 'MultiPolygon', coordinates: cut }
}

function wound(ring: Position[], sense: 1 | -1): Position[] {
  let twice = 0
  for (let i = 0; i + 1 < ring.length; i++) twice += (ring[i]![0]! - ring[0]![0]!) * (ring[i + 1]![1]! - ring[0]![1]!) - (ring[i + 1]![0]! - ring[0]![0]!) * (ring[i]![1]! - ring[0]![1]!)
  return Math.sign(twice) === sense ? ring : [...ring].reverse()
}
