import { isObject } from '../outline/area-in'
import { AreaFileRefused, areaName, mostAreas, type AreaFile, type FoundArea } from './area-file'

/** Areas of a GeoJSON text: every feature, or the geometry alone. */
export function areasOfGeojson(text: string, fileName: string): AreaFile {
  let read: unknown
  try {
    read = JSON.parse(text)
  } catch {
    throw new AreaFileRefused('The file starts like GeoJSON but cannot be read to its end; it may be cut off.')
  }
  if (!isObject(read) || typeof read['type'] !== 'string') throw new AreaFileRefused('The file is JSON, but not GeoJSON: it names no type.')
  refuseOtherCrs(read['crs'])
  const features = read['type'] === 'FeatureCollection' ? list(read['features']) : [read]
  return { format: 'GeoJSON', notes: [], areas: areasOfFeatures(features, fileName) }
}

export function areasOfFeatures(features: readonly unknown[], fileName: string): FoundArea[] {
  if (features.length === 0) throw new AreaFileRefused('The file holds no feature.')
  if (features.length > mostAreas) throw new AreaFileRefused(`The file holds ${features.length.toLocaleString('en-GB')} features; at most ${mostAreas} can be read at once.`)
  return features.map((feature, i) => {
    if (!isObject(feature) || feature['type'] !== 'Feature') return { name: areaName(null, null, fileName, i, features.length), ...polygonsOf(feature) }
    return { name: areaName(feature['properties'], feature['id'], fileName, i, features.length), ...polygonsOf(feature['geometry'] ?? feature) }
  })
}

/** The polygons of a collection are one area; points and lines beside them are labels. */
function polygonsOf(geometry: unknown): Omit<FoundArea, 'name'> {
  if (!isObject(geometry) || geometry['type'] !== 'GeometryCollection') return { geometry }
  const inside = list(geometry['geometries']).filter(isObject)
  const parts = inside.flatMap((one) => (one['type'] === 'Polygon' ? [one['coordinates']] : one['type'] === 'MultiPolygon' ? list(one['coordinates']) : []))
  if (parts.length === 0) return { geometry: inside[0] ?? geometry }
  const others = inside.some((one) => one['type'] !== 'Polygon' && one['type'] !== 'MultiPolygon')
  return { geometry: { type: 'MultiPolygon', coordinates: parts }, ...(others && { repairs: ['Points and lines beside the area were left out.'] }) }
}

function refuseOtherCrs(crs: unknown): void {
  const properties = isObject(crs) ? crs['properties'] : null
  const name = isObject(properties) && typeof properties['name'] === 'string' ? properties['name'] : null
  if (name === null || /CRS:?84$|EPSG:+(\d*:)?4326$/i.test(name)) return
  throw new AreaFileRefused(`The coordinates of this GeoJSON are in ${name.slice(0, 60)}. GeoJSON is longitude and latitude in WGS84 (RFC 7946, section 4): write it out so, or send a zipped shapefile with its .prj.`)
}

function list(value: unknown): unknown[] {
  return Array.isArray(value) ? (value as unknown[]) : []
}
