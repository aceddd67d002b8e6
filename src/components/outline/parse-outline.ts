import type { RegionGeometry } from '../../../shared/schemas/regions'
import { parsePosition, type Position } from './parse-position'
import { wound } from './wind'

export type ParsedOutline = { geometry: unknown; problem?: undefined } | { geometry?: undefined; problem: string }

/** An outline as typed or pasted: GeoJSON, or one corner a line as latitude and longitude. */
export function parseOutline(text: string): ParsedOutline {
  const trimmed = text.trim()
  if (trimmed === '') return { problem: 'Type or paste an outline first.' }
  return trimmed.startsWith('{') ? fromGeoJson(trimmed) : fromLines(trimmed)
}

function fromGeoJson(text: string): ParsedOutline {
  let read: unknown
  try {
    read = JSON.parse(text)
  } catch {
    return { problem: 'This starts like GeoJSON but is not complete; check the brackets at its end.' }
  }
  return fromObject(read)
}

function fromObject(read: unknown): ParsedOutline {
  if (!isObject(read)) return { problem: 'This is no GeoJSON outline.' }
  if (read['type'] === 'FeatureCollection') {
    const features = Array.isArray(read['features']) ? read['features'] : []
    if (features.length !== 1) return { problem: `One region has one outline; this collection holds ${features.length}.` }
    return fromObject(features[0])
  }
  if (read['type'] === 'Feature') return fromObject(read['geometry'])
  if (read['type'] === 'Polygon' || read['type'] === 'MultiPolygon') return { geometry: read }
  return { problem: `A region is a Polygon or MultiPolygon, not ${String(read['type'] ?? 'this')}.` }
}

function fromLines(text: string): ParsedOutline {
  const corners: Position[] = []
  for (const [index, line] of text.split(/\r?\n|;/).entries()) {
    if (line.trim() === '') continue
    const position = parsePosition(line)
    if (!position) return { problem: `Line ${index + 1} is no position: "${line.trim()}". Write 51.95, -10.70 or 51 57.0 N, 10 42.0 W.` }
    corners.push(position)
  }
  if (corners.length < 3) return { problem: `An outline needs at least three corners; there ${corners.length === 1 ? 'is 1' : `are ${corners.length}`}.` }
  return { geometry: polygonOf(corners) }
}

export function polygonOf(corners: readonly Position[]): RegionGeometry {
  const ring = corners.map(({ latitude, longitude }) => [longitude, latitude])
  const [first, last] = [ring[0], ring[ring.length - 1]]
  if (first && last && (first[0] !== last[0] || first[1] !== last[1])) ring.push([...first])
  return wound({ type: 'Polygon', coordinates: [ring] })
}

function isObject(value: unknown): value is Record<string, unknown> {
  return typeof value === 'object' && value !== null && !Array.isArray(value)
}
