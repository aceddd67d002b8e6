import { queryOptions } from '@tanstack/react-query'
import { feature } from 'topojson-client'
import type { GeometryCollection, Topology } from 'topojson-specification'
import fineUrl from 'world-atlas/land-10m.json?url'
import plainUrl from 'world-atlas/land-50m.json?url'
import { cutAtAntimeridian, type Ring } from './cut-at-antimeridian'

export interface LandRing {
  points: Ring
  west: number
  south: number
  east: number
  north: number
}

/** From this zoom the 50 m outline looks cut with scissors, and the 10 m one (826 kB gz) is worth its weight. */
export const fineFromZoom = 9

/** The coastline that ships with the program, by the fineness the zoom needs. */
export function coastQuery(fine: boolean) {
  return queryOptions({
    queryKey: ['coast', fine ? '10m' : '50m'],
    queryFn: ({ signal }) => fetchRings(fine ? fineUrl : plainUrl, signal),
    staleTime: Infinity,
    gcTime: Infinity,
  })
}

async function fetchRings(url: string, signal: AbortSignal): Promise<LandRing[]> {
  const reply = await fetch(url, { signal })
  if (!reply.ok) throw new Error('the coastline could not be fetched')
  return landRings((await reply.json()) as Topology<{ land: GeometryCollection }>)
}

export function landRings(topology: Topology<{ land: GeometryCollection }>): LandRing[] {
  return feature(topology, topology.objects.land)
    .features.flatMap(({ geometry }) => {
      if (geometry.type === 'Polygon') return geometry.coordinates
      return geometry.type === 'MultiPolygon' ? geometry.coordinates.flat() : []
    })
    .flatMap(cutAtAntimeridian)
    .map(boxed)
}

function boxed(points: Ring): LandRing {
  let [west, south, east, north] = [180, 90, -180, -90]
  for (const [longitude, latitude] of points) {
    west = Math.min(west, longitude)
    east = Math.max(east, longitude)
    south = Math.min(south, latitude)
    north = Math.max(north, latitude)
  }
  return { points, west, south, east, north }
}
