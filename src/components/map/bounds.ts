import type { RegionGeometry } from '../../../shared/schemas/regions'
import type { MapBounds } from './sea-map'

/** The box round some outlines with a margin, a share of its size. */
export function boundsAround(geometries: readonly RegionGeometry[], margin = 0.07): MapBounds | undefined {
  let [west, south, east, north] = [Infinity, Infinity, -Infinity, -Infinity]
  for (const geometry of geometries) {
    const polygons = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates
    for (const [longitude = 0, latitude = 0] of polygons.flat(2)) {
      west = Math.min(west, longitude)
      east = Math.max(east, longitude)
      south = Math.min(south, latitude)
      north = Math.max(north, latitude)
    }
  }
  if (west > east) return undefined
  const padX = Math.max(0.05, (east - west) * margin)
  const padY = Math.max(0.05, (north - south) * margin)
  return [
    [Math.max(-85, south - padY), west - padX],
    [Math.min(85, north + padY), east + padX],
  ]
}
