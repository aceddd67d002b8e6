import type { Position } from 'geojson'
import { regionGeometry, type RegionGeometry } from '../../shared/schemas/regions'
import { polygonAreaKm2 } from '../../shared/science/ring-area'
import { ApiError } from '../api-error'
import { selfCrossing } from './self-crossing'

export const mostVertices = 5_000

export interface CheckedGeometry {
  geometry: RegionGeometry
  areaKm2: number
  /** What was put right, in words. */
  repairs: string[]
  box: { west: number; south: number; east: number; north: number }
  centreLongitude: number
}

/** Takes an outline as sent, puts right what has one meaning, and refuses the rest with a sentence. */
export function checkedGeometry(sent: unknown): CheckedGeometry {
  const repairs = new Set<string>()
  const parts = partsOf(sent).map((rings) => rings.map((ring) => checkedRing(ring, repairs)))
  const vertices = parts.flat().reduce((sum, ring) => sum + ring.length, 0)
  if (vertices > mostVertices) refuse(`The outline has ${vertices} points; at most ${mostVertices} can be taken.`)
  const unwound = parts.map((rings) => {
    const [outer, ...holes] = rings
    return [wound(outer!, 1, repairs), ...holes.map((hole) => wound(hole, -1, repairs))]
  })
  const aligned = alignParts(unwound)
  for (const rings of aligned) {
    const crossing = selfCrossing(rings)
    if (crossing) refuse(`The outline crosses itself near ${crossing[1]!.toFixed(3)}, ${crossing[0]!.toFixed(3)} (latitude, longitude).`)
  }
  const geometry: RegionGeometry =
    aligned.length === 1 ? { type: 'Polygon', coordinates: aligned[0]! } : { type: 'MultiPolygon', coordinates: aligned }
  const areaKm2 = polygonAreaKm2(geometry)
  if (!(areaKm2 > 1e-6)) refuse('The outline encloses no area.')
  const outer = aligned.map((rings) => rings[0]!).flat()
  const box = {
    west: Math.min(...outer.map(([lon]) => lon!)),
    east: Math.max(...outer.map(([lon]) => lon!)),
    south: Math.min(...outer.map(([, lat]) => lat!)),
    north: Math.max(...outer.map(([, lat]) => lat!)),
  }
  return { geometry, areaKm2, repairs: [...repairs], box, centreLongitude: (box.west + box.east) / 2 }
}

function refuse(sentence: string): never {
  throw new ApiError('not-valid', sentence, { fields: { geometry: sentence } })
}

function partsOf(sent: unknown): Position[][][] {
  const geometry = isFeature(sent) ? sent.geometry : sent
  const parsed = regionGeometry.safeParse(geometry)
  if (!parsed.success) {
    const type = typeof geometry === 'object' && geometry !== null && 'type' in geometry ? String(geometry.type) : null
    if (type !== null && type !== 'Polygon' && type !== 'MultiPolygon') refuse(`An outline is a Polygon or a MultiPolygon, not a ${type}.`)
    refuse('The outline is not a GeoJSON Polygon: each ring needs at least three points of longitude and latitude as numbers.')
  }
  return parsed.data.type === 'Polygon' ? [parsed.data.coordinates] : parsed.data.coordinates
}

function isFeature(sent: unknown): sent is { type: 'Feature'; geometry: unknown } {
  return typeof sent === 'object' && sent !== null && 'type' in sent && sent.type === 'Feature' && 'geometry' in sent
}

function checkedRing(ring: Position[], repairs: Set<string>): Position[] {
  const points: Position[] = []
  let turn = 0
  for (const position of ring) {
    const [lon, lat] = position as [number, number]
    if (!Number.isFinite(lon) || !Number.isFinite(lat)) refuse('A point of the outline has no number for longitude or latitude.')
    if (lat < -90 || lat > 90) refuse(`A point has latitude ${lat}; latitudes lie between -90 and 90, and longitude comes first.`)
    if (lon < -360 || lon > 360) refuse(`A point has longitude ${lon}; longitudes lie between -180 and 180.`)
    if (position.length > 2) repairs.add('Heights were left out.')
    const before = points.at(-1)
    // A step of more than half the globe is a step across the 180th meridian.
    if (before) {
      while (lon + turn - before[0]! > 180) turn -= 360
      while (lon + turn - before[0]! < -180) turn += 360
      if (turn !== 0) repairs.add('It crosses the 180th meridian; its longitudes were written on beyond it.')
    }
    if (before && before[0] === lon + turn && before[1] === lat) {
      repairs.add('Repeated points were left out.')
      continue
    }
    points.push([lon + turn, lat])
  }
  const [first, last] = [points[0]!, points.at(-1)!]
  if (Math.abs(first[0]! - last[0]!) >= 359.999) refuse('An outline round a pole cannot be taken; leave a gap along a meridian.')
  if (first[0] !== last[0] || first[1] !== last[1]) {
    points.push([...first])
    repairs.add('The outline was closed.')
  }
  if (points.length < 4) refuse('The outline needs at least three different points.')
  return points
}

function wound(ring: Position[], sense: 1 | -1, repairs: Set<string>): Position[] {
  let twice = 0
  for (let i = 0; i + 1 < ring.length; i++) twice += ring[i]![0]! * ring[i + 1]![1]! - ring[i + 1]![0]! * ring[i]![1]!
  if (twice === 0) refuse('The outline encloses no area.')
  if (Math.sign(twice) === sense) return ring
  repairs.add('Its winding was turned round (RFC 7946: outlines run counter-clockwise, holes clockwise).')
  return [...ring].reverse()
}

/** Parts on both sides of the 180th meridian are brought into one turn of longitudes. */
function alignParts(parts: Position[][][]): Position[][][] {
  const middle = (rings: Position[][]) => {
    const lons = rings[0]!.map(([lon]) => lon!)
    return (Math.min(...lons) + Math.max(...lons)) / 2
  }
  const home = middle(parts[0]!)
  return parts.map((rings) => {
    const turn = -360 * Math.round((middle(rings) - home) / 360)
    return turn === 0 ? rings : rings.map((ring) => ring.map(([lon, lat]) => [lon! + turn, lat!]))
  })
}
