import L from 'leaflet'
import { Marker } from 'react-leaflet'

interface Mark {
  longitude: number
  latitude: number
  about: string
}

const ring = '<svg width="22" height="22" viewBox="0 0 22 22" aria-hidden="true"><circle cx="11" cy="11" r="8" fill="none" stroke="var(--paper)" stroke-width="5"/><circle cx="11" cy="11" r="8" fill="none" stroke="var(--ink)" stroke-width="2"/></svg>'
const square = '<svg width="22" height="22" viewBox="0 0 22 22" aria-hidden="true"><rect x="2.5" y="2.5" width="17" height="17" fill="var(--paper)" stroke="var(--ink)" stroke-width="2"/><path d="M6 6l10 10M16 6L6 16" stroke="var(--ink)" stroke-width="2"/></svg>'
const icons = { repaired: L.divIcon({ className: '', html: ring, iconSize: [22, 22], iconAnchor: [11, 11] }), fault: L.divIcon({ className: '', html: square, iconSize: [22, 22], iconAnchor: [11, 11] }) }

/** Places on an outline: rings where something was put right, a crossed square where it is wrong. */
export function PlaceMarks({ marks, kind }: { marks: readonly Mark[]; kind: keyof typeof icons }) {
  return marks.map(({ longitude, latitude, about }, i) => <Marker key={i} position={[latitude, longitude]} icon={icons[kind]} title={about} alt={about} keyboard={false} interactive={false} />)
}
