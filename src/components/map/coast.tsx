import { useQuery } from '@tanstack/react-query'
import L from 'leaflet'
import { useEffect, useState } from 'react'
import { useMap, useMapEvents } from 'react-leaflet'
import { coastQuery, fineFromZoom, type LandRing } from './coast-data'
import type { Ring } from './cut-at-antimeridian'
import { landPane } from './panes'

/** Land and its coastline, drawn from what ships. */
export function Coast() {
  const map = useMap()
  const [zoom, setZoom] = useState(() => map.getZoom())
  const [around, setAround] = useState(() => map.getBounds().pad(1))
  useMapEvents({
    moveend: () => {
      setZoom(map.getZoom())
      if (!around.contains(map.getBounds()) || map.getZoom() !== zoom) setAround(map.getBounds().pad(1))
    },
  })
  const plain = useQuery(coastQuery(false))
  const fine = useQuery({ ...coastQuery(true), enabled: zoom >= fineFromZoom })
  const rings = zoom >= fineFromZoom && fine.data ? fine.data : plain.data

  useEffect(() => {
    if (!rings) return
    // A map over the 180th meridian shows the land of the next turn too.
    const near = [-360, 0, 360].flatMap((turn) => rings.filter((ring) => meets(ring, around, turn)).map((ring) => ({ ring, turn })))
    const land = L.polygon(
      near.map(({ ring, turn }) => latLngs(ring.points, turn)),
      { pane: landPane, className: 'map-land', interactive: false, stroke: false, smoothFactor: 0.5 },
    ).addTo(map)
    const coast = L.polyline(near.flatMap(({ ring, turn }) => shoreLines(ring.points).map((line) => latLngs(line, turn))), {
      pane: landPane,
      className: 'map-coast',
      interactive: false,
      smoothFactor: 0.5,
    }).addTo(map)
    return () => {
      land.remove()
      coast.remove()
    }
  }, [map, rings, around])
  return null
}

function latLngs(points: Ring, turn: number): L.LatLngTuple[] {
  return points.map(([longitude, latitude]) => [latitude, longitude + turn])
}

function meets(ring: LandRing, bounds: L.LatLngBounds, turn: number): boolean {
  return ring.west + turn <= bounds.getEast() && ring.east + turn >= bounds.getWest() && ring.south <= bounds.getNorth() && ring.north >= bounds.getSouth()
}

/** The ring without the edges that only close it along the 180th meridian or at a pole: those are no coast. */
function shoreLines(points: Ring): Ring[] {
  const first = points[0]
  const closed = first ? [...points, first] : points
  const lines: Ring[] = [[]]
  closed.forEach((point, index) => {
    const before = closed[index - 1]
    if (before && artificial(before, point)) lines.push([])
    lines.at(-1)?.push(point)
  })
  return lines.filter((line) => line.length > 1)
}

function artificial(a: Ring[number], b: Ring[number]): boolean {
  const atEdge = (longitude: number) => Math.abs(longitude) > 179.999
  return (atEdge(a[0]) && atEdge(b[0])) || (a[1] < -89.9 && b[1] < -89.9)
}
