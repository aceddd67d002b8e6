import type { RegionGeometry } from '../../../shared/schemas/regions'

/** An outline as people type it: a corner a line, latitude first; GeoJSON where it has holes or several parts. */
export function outlineText(geometry: RegionGeometry): string {
  const [ring, ...holes] = geometry.type === 'Polygon' ? geometry.coordinates : []
  if (!ring || holes.length > 0) return JSON.stringify(geometry)
  return ring
    .slice(0, -1)
    .map(([longitude = 0, latitude = 0]) => `${latitude.toFixed(4)}, ${longitude.toFixed(4)}`)
    .join('\n')
}
