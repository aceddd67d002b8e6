import type { Position } from 'geojson'
import type { RegionGeometry } from '../../shared/schemas/regions'
import { cutAt180 } from './cut-at-180'

/** An outline as KML 2.2, one placemark, cut at the 180th meridian. */
export function outlineKml(name: string, description: string, geometry: RegionGeometry): string {
  const cut = cutAt180(geometry)
  const parts = cut.type === 'Polygon' ? [cut.coordinates] : cut.coordinates
  const polygons = parts.map(polygonKml).join('')
  const shape = parts.length === 1 ? polygons : `<MultiGeometry>${polygons}</MultiGeometry>`
  return (
    '<?xml version="1.0" encoding="UTF-8"?>\n' +
    `<kml xmlns="http://www.opengis.net/kml/2.2"><Document><Placemark><name>${escaped(name)}</name><description>${escaped(description)}</description>${shape}</Placemark></Document></kml>\n`
  )
}

function polygonKml([outer, ...holes]: Position[][]): string {
  const ring = (points: Position[]) => `<LinearRing><coordinates>${points.map(([lon, lat]) => `${lon},${lat}`).join(' ')}</coordinates></LinearRing>`
  return `<Polygon><outerBoundaryIs>${ring(outer!)}</outerBoundaryIs>${holes.map((hole) => `<innerBoundaryIs>${ring(hole)}</innerBoundaryIs>`).join('')}</Polygon>`
}

function escaped(text: string): string {
  // XML 1.0 has no way to write control characters.
  return text
    .replace(/[^\t\n\r\u0020-\uD7FF\uE000-\uFFFD\u{10000}-\u{10FFFF}]/gu, '')
    .replaceAll('&', '&amp;')
    .replaceAll('<', '&lt;')
    .replaceAll('>', '&gt;')
}
