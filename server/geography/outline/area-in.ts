import { OutlineRefused } from './outline-refused'

/** What GeoJSON calls the parts of an area, before anything in it was looked at. */
export interface AreaAsSent {
  parts: unknown[]
}

/**
 * The one area of what was sent: a Polygon, a MultiPolygon, or a Feature, FeatureCollection or GeometryCollection with
 * one of them. Refuses anything else by what it is.
 */
export function areaIn(sent: unknown): AreaAsSent {
  const object = isObject(sent) ? sent : null
  const type = object?.['type']
  if (!object || typeof type !== 'string') throw new OutlineRefused('An outline is GeoJSON: a Polygon or a MultiPolygon.')
  if (type === 'Feature') return areaIn(object['geometry'] ?? refuseNothing())
  if (type === 'FeatureCollection') return theOne(object['features'], 'feature')
  if (type === 'GeometryCollection') return theOne(object['geometries'], 'geometry')
  if (type !== 'Polygon' && type !== 'MultiPolygon') throw new OutlineRefused(`An outline is a Polygon or a MultiPolygon, not a ${type.slice(0, 40)}: it encloses no water.`)
  const coordinates = object['coordinates']
  if (!Array.isArray(coordinates) || coordinates.length === 0) throw new OutlineRefused(`The ${type} has no coordinates.`)
  return { parts: type === 'Polygon' ? [coordinates] : (coordinates as unknown[]) }
}

function theOne(among: unknown, what: 'feature' | 'geometry'): AreaAsSent {
  const all = Array.isArray(among) ? (among as unknown[]) : []
  const word = what === 'feature' ? 'features' : 'geometries'
  if (all.length !== 1) throw new OutlineRefused(`One region has one outline; this collection holds ${all.length} ${word}. Import it to make several regions of it.`)
  return areaIn(all[0])
}

function refuseNothing(): never {
  throw new OutlineRefused('The feature has no geometry.')
}

export function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}
