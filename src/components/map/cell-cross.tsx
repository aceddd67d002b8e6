import type { LeafletKeyboardEvent } from 'leaflet'
import { useEffect, useState } from 'react'
import { Polygon, useMap, useMapEvents } from 'react-leaflet'
import { outlinePane } from './panes'

interface Props {
  /** Corners of the cell that is read, longitude first. */
  corners: readonly (readonly [number, number])[] | undefined
  onPick: (latitude: number, longitude: number) => void
}

/** Reads cells off a map: by a click, or by Enter under the cross that stands in the middle while the map has the keyboard. */
export function CellCross({ corners, onPick }: Props) {
  const map = useMap()
  const [byKeyboard, setByKeyboard] = useState(false)
  useMapEvents({
    click: ({ latlng }) => onPick(latlng.lat, latlng.lng),
    keydown: ({ originalEvent }: LeafletKeyboardEvent) => {
      // Buttons on the map have an Enter of their own.
      if (originalEvent.key !== 'Enter' || originalEvent.target !== map.getContainer()) return
      originalEvent.preventDefault()
      const { lat, lng } = map.getCenter()
      onPick(lat, lng)
    },
  })
  useEffect(() => {
    const focused = () => setByKeyboard(map.getContainer().matches(':focus-visible'))
    const left = () => setByKeyboard(false)
    map.on('focus', focused).on('blur', left)
    return () => {
      map.off('focus', focused).off('blur', left)
    }
  }, [map])
  return (
    <>
      {corners && (
        <>
          <Polygon positions={corners.map(([lon, lat]): [number, number] => [lat, lon])} pane={outlinePane} interactive={false} fill={false} className="cell-casing" />
          <Polygon positions={corners.map(([lon, lat]): [number, number] => [lat, lon])} pane={outlinePane} interactive={false} fill={false} className="cell-line" />
        </>
      )}
      {byKeyboard && (
        <svg aria-hidden className="pointer-events-none absolute top-1/2 left-1/2 z-[640] -translate-1/2" width="41" height="41" viewBox="0 0 41 41">
          <path d="M20.5 1v14M20.5 26v14M1 20.5h14M26 20.5h14" stroke="var(--paper)" strokeWidth="5" />
          <path d="M20.5 1v14M20.5 26v14M1 20.5h14M26 20.5h14" stroke="var(--ink)" strokeWidth="2" />
        </svg>
      )}
    </>
  )
}
