import { useState } from 'react'
import { useMap, useMapEvents } from 'react-leaflet'

export interface MapView {
  width: number
  height: number
  west: number
  east: number
  south: number
  north: number
  x: (longitude: number) => number
  y: (latitude: number) => number
}

/** The view of the map in pixels of its own box, new after each move. */
export function useMapView(): MapView {
  const map = useMap()
  const [, redraw] = useState(0)
  const next = () => redraw((count) => count + 1)
  useMapEvents({ move: next, zoomend: next, resize: next })
  const { x: width, y: height } = map.getSize()
  const bounds = map.getBounds()
  return {
    width,
    height,
    west: bounds.getWest(),
    east: bounds.getEast(),
    south: bounds.getSouth(),
    north: bounds.getNorth(),
    x: (longitude) => map.latLngToContainerPoint([0, longitude]).x,
    y: (latitude) => map.latLngToContainerPoint([latitude, 0]).y,
  }
}
