import L from 'leaflet'
import { Marker } from 'react-leaflet'

const diamond =
  '<svg width="22" height="22" viewBox="0 0 22 22" aria-hidden="true">' +
  '<path d="M11 2l9 9-9 9-9-9z" fill="var(--paper)" stroke="var(--ink)" stroke-width="1.6"/>' +
  '<circle cx="11" cy="11" r="2" fill="var(--ink)"/></svg>'

const icon = L.divIcon({ className: '', html: diamond, iconSize: [22, 22], iconAnchor: [11, 11] })

/** The place somebody answers for; given `onMove` it can be dragged there. */
export function SiteMark({ latitude, longitude, onMove }: { latitude: number; longitude: number; onMove?: (latitude: number, longitude: number) => void }) {
  return (
    <Marker
      position={[latitude, longitude]}
      icon={icon}
      title="site"
      alt="site"
      keyboard={false}
      interactive={onMove !== undefined}
      draggable={onMove !== undefined}
      eventHandlers={
        onMove
          ? {
              dragend: (event) => {
                const { lat, lng } = (event.target as L.Marker).getLatLng()
                onMove(lat, lng)
              },
            }
          : {}
      }
    />
  )
}
