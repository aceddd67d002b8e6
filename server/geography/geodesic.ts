import geodesic from 'geographiclib-geodesic'
import { eccentricitySquared, semiMajorAxisM } from '../../shared/science/wgs84'

export type Place = readonly [longitude: number, latitude: number]

export interface Away {
  km: number
  /** Initial bearing in degrees from north, 0 up to 360; null at the same place. */
  bearing: number | null
}

const radians = Math.PI / 180

/** Geodesic on WGS84 from one place to another (Karney 2013), in km and degrees; any turn of the longitudes. */
export function awayFrom(from: Place, to: Place): Away {
  const { s12, azi1 } = geodesic.Geodesic.WGS84.Inverse(from[1], from[0], to[1], to[0])
  const km = s12! / 1000
  return { km, bearing: km === 0 ? null : (azi1! + 360) % 360 }
}

/** Chords order places as geodesics do but for the flattening, which moves none by this share of its distance. */
const chordSlack = 4e-3

/** The nearest of some places, by its position in the two lists; null for empty ones. Of equals the first. */
export function nearestOf(from: Place, longitudes: Float64Array, latitudes: Float64Array): { at: number; away: Away } | null {
  const [x, y, z] = inSpace(from)
  const chords = new Float64Array(longitudes.length)
  let least = Infinity
  for (let at = 0; at < chords.length; at++) {
    const [u, v, w] = inSpace([longitudes[at]!, latitudes[at]!])
    chords[at] = Math.sqrt((u - x) ** 2 + (v - y) ** 2 + (w - z) ** 2)
    if (chords[at]! < least) least = chords[at]!
  }
  let best: { at: number; away: Away } | null = null
  for (let at = 0; at < chords.length; at++) {
    if (!(chords[at]! <= least * (1 + chordSlack))) continue
    const away = awayFrom(from, [longitudes[at]!, latitudes[at]!])
    if (!best || away.km < best.away.km) best = { at, away }
  }
  return best
}

/** Earth-centred coordinates in metres of a place on the ellipsoid. */
function inSpace([longitude, latitude]: Place): [number, number, number] {
  const s = Math.sin(latitude * radians)
  const normal = semiMajorAxisM / Math.sqrt(1 - eccentricitySquared * s * s)
  const across = normal * Math.cos(latitude * radians)
  return [across * Math.cos(longitude * radians), across * Math.sin(longitude * radians), normal * (1 - eccentricitySquared) * s]
}

/** Weighted sum of the directions straight up from places (n-vectors, Gade 2010): blind to the seam and the poles. */
export class MiddleOf {
  private x = 0
  private y = 0
  private z = 0

  add([longitude, latitude]: Place, weight: number): this {
    const across = Math.cos(latitude * radians) * weight
    this.x += across * Math.cos(longitude * radians)
    this.y += across * Math.sin(longitude * radians)
    this.z += Math.sin(latitude * radians) * weight
    return this
  }

  join(other: MiddleOf): this {
    this.x += other.x
    this.y += other.y
    this.z += other.z
    return this
  }

  /** Null without places, or where they lie evenly round the globe. */
  place(): Place | null {
    const across = Math.hypot(this.x, this.y)
    if (!(Math.hypot(across, this.z) > 0)) return null
    return [Math.atan2(this.y, this.x) / radians, Math.atan2(this.z, across) / radians]
  }
}
