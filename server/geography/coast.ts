import geodesic from 'geographiclib-geodesic'
import { eccentricitySquared, semiMajorAxisM } from '../../shared/science/wgs84'
import { isLand, landRings } from './land'

/** A piece of coast, straight in longitude and latitude: lon1, lat1, lon2, lat2 in degrees. */
export type CoastPiece = [number, number, number, number]

let tilesOnce: Map<number, CoastPiece[]> | undefined

/** Pieces of coast by whole degree; a piece stands in every tile its box touches. */
function coastTiles(): Map<number, CoastPiece[]> {
  if (tilesOnce) return tilesOnce
  const tiles = new Map<number, CoastPiece[]>()
  for (const ring of landRings()) {
    for (let i = 1; i < ring.length; i++) {
      const [lon1 = NaN, lat1 = NaN] = ring[i - 1]!
      const [lon2 = NaN, lat2 = NaN] = ring[i]!
      for (const piece of cutAt180(lon1, lat1, lon2, lat2)) addPiece(tiles, piece)
    }
  }
  tilesOnce = tiles
  return tiles
}

/** The sides along which the outline's land is cut at 180 degrees and at the pole are no coast. */
function cutAt180(lon1: number, lat1: number, lon2: number, lat2: number): CoastPiece[] {
  if (Math.abs(lon1) > 179.999 && Math.abs(lon2) > 179.999) return []
  if (lat1 < -89.999 && lat2 < -89.999) return []
  if (Math.abs(lon2 - lon1) <= 180) return [[lon1, lat1, lon2, lat2]]
  const side = lon1 > lon2 ? 180 : -180
  const share = (side - lon1) / (lon2 + 2 * side - lon1)
  const cut = lat1 + share * (lat2 - lat1)
  return [[lon1, lat1, side, cut], [-side, cut, lon2, lat2]]
}

function addPiece(tiles: Map<number, CoastPiece[]>, piece: CoastPiece): void {
  const [lon1, lat1, lon2, lat2] = piece
  for (let row = Math.floor(Math.min(lat1, lat2)); row <= Math.floor(Math.max(lat1, lat2)); row++) {
    for (let column = Math.floor(Math.min(lon1, lon2)); column <= Math.floor(Math.max(lon1, lon2)); column++) {
      const key = tileKey(row, column)
      const tile = tiles.get(key)
      if (tile) tile.push(piece)
      else tiles.set(key, [piece])
    }
  }
}

function tileKey(row: number, column: number): number {
  return (row + 90) * 360 + ((((column + 180) % 360) + 360) % 360)
}

/** Pieces of coast whose tiles meet a box; east may be past 180. A piece may come more than once. */
export function* coastIn(box: { west: number; south: number; east: number; north: number }): Generator<CoastPiece> {
  const tiles = coastTiles()
  const columns = Math.min(359, Math.floor(box.east) - Math.floor(box.west))
  for (let row = Math.max(-90, Math.floor(box.south)); row <= Math.min(89, Math.floor(box.north)); row++) {
    for (let column = 0; column <= columns; column++) yield* tiles.get(tileKey(row, Math.floor(box.west) + column)) ?? []
  }
}

const radians = Math.PI / 180

/**
 * Distance in km from a point to the bundled land outline, its sides straight in longitude and latitude; 0 on land,
 * Infinity beyond `withinKm`. Degrees, any turn of the longitude. The nearest place is found in a plane laid at the
 * point (radii of curvature of WGS84 at the middle latitude; off by less than a thousandth within 50 km); the distance
 * to that place is the geodesic (Karney 2013). NaN for a point without a place.
 */
export function distanceToLandKm(longitude: number, latitude: number, withinKm: number): number {
  if (!Number.isFinite(longitude) || !Number.isFinite(latitude)) return NaN
  if (isLand(longitude, latitude)) return 0
  const lon = longitude - 360 * Math.floor((longitude + 180) / 360)
  const north = withinKm / 110
  const widest = Math.cos(Math.min(89.9, Math.abs(latitude) + north) * radians)
  const east = Math.min(180, withinKm / (111 * widest))
  const box = { west: lon - east, east: lon + east, south: latitude - north, north: latitude + north }
  let best: { away: number; lon: number; lat: number } | null = null
  for (const piece of coastIn(box)) {
    if (Math.min(piece[1], piece[3]) > box.north || Math.max(piece[1], piece[3]) < box.south) continue
    const found = nearestOn(piece, lon, latitude)
    if (!best || found.away < best.away) best = found
  }
  if (!best) return Infinity
  const km = geodesic.Geodesic.WGS84.Inverse(latitude, lon, best.lat, best.lon).s12! / 1000
  return km <= withinKm ? km : Infinity
}

function nearestOn([lon1, lat1, lon2, lat2]: CoastPiece, lon: number, lat: number): { away: number; lon: number; lat: number } {
  // The same coast counted from the other side of the 180th meridian.
  const turn = 360 * Math.round((lon - (lon1 + lon2) / 2) / 360)
  const [x1, y1] = inPlane(lon1 + turn - lon, lat1, lat)
  const [x2, y2] = inPlane(lon2 + turn - lon, lat2, lat)
  const [dx, dy] = [x2 - x1, y2 - y1]
  const length = dx * dx + dy * dy
  const t = length === 0 ? 0 : Math.max(0, Math.min(1, -(x1 * dx + y1 * dy) / length))
  return { away: Math.hypot(x1 + t * dx, y1 + t * dy), lon: lon1 + t * (lon2 - lon1), lat: lat1 + t * (lat2 - lat1) }
}

function inPlane(lonAway: number, lat: number, home: number): [x: number, y: number] {
  const middle = ((lat + home) / 2) * radians
  const w = 1 - eccentricitySquared * Math.sin(middle) ** 2
  const normal = semiMajorAxisM / Math.sqrt(w)
  const meridional = (normal * (1 - eccentricitySquared)) / w
  return [lonAway * radians * normal * Math.cos(middle), (lat - home) * radians * meridional]
}
