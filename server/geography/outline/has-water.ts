import type { Position } from 'geojson'
import { coastIn } from '../coast'
import { isLand } from '../land'
import { inPolygon } from './in-ring'

const latticeSteps = 24
const mostEdgePoints = 2_000

/**
 * Whether an outline holds any water of the bundled coastline: at a corner, along its edges, on a lattice over it, or
 * because a coast runs through it.
 */
export function hasWater(parts: readonly Position[][][], box: { west: number; south: number; east: number; north: number }): boolean {
  const isWater = ([lon = NaN, lat = NaN]: Position) => !isLand(lon, lat)
  if (parts.some(([outer]) => outer!.some(isWater))) return true
  const inside = (point: Position) => parts.some((rings) => inPolygon(rings, point))
  for (let i = 0; i < latticeSteps; i++) {
    for (let j = 0; j < latticeSteps; j++) {
      const point = [box.west + ((i + 0.5) / latticeSteps) * (box.east - box.west), box.south + ((j + 0.5) / latticeSteps) * (box.north - box.south)]
      if (isWater(point) && inside(point)) return true
    }
  }
  if (pointsAlong(parts).some(isWater)) return true
  for (const [lon, lat] of coastIn(box)) {
    const turned = lon + 360 * Math.round(((box.west + box.east) / 2 - lon) / 360)
    if (inside([turned, lat])) return true
  }
  return false
}

function pointsAlong(parts: readonly Position[][][]): Position[] {
  const rings = parts.map(([outer]) => outer!)
  const edges = rings.reduce((sum, ring) => sum + ring.length - 1, 0)
  const steps = Math.max(1, Math.floor(mostEdgePoints / edges))
  return rings.flatMap((ring) =>
    ring.slice(1).flatMap((to, i) => {
      const from = ring[i]!
      return Array.from({ length: steps }, (_, s) => from.map((value, axis) => value + ((s + 0.5) / steps) * (to[axis]! - value)))
    }),
  )
}
