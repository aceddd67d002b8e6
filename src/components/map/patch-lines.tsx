import L from 'leaflet'
import { Fragment } from 'react'
import { Marker, Polyline } from 'react-leaflet'
import type { Patch } from '../../../shared/schemas/patches'
import { outlinePane } from './panes'

/** Outlines of patches along the edges of their cells; the marked one is heavier and carries its number. */
export function PatchLines({ patches, marked }: { patches: readonly Patch[]; marked: number }) {
  // The marked one last, so that nothing is drawn over it.
  const inOrder = [...patches].sort((a, b) => Number(a.number === marked) - Number(b.number === marked))
  return inOrder.map((patch) => {
    const lines = patch.outline.coordinates.map((line) => line.map(([longitude, latitude]): [number, number] => [latitude, longitude]))
    const isMarked = patch.number === marked
    return (
      <Fragment key={`${patch.number} ${isMarked} ${patch.areaKm2} ${patch.greatest}`}>
        <Polyline positions={lines} pane={outlinePane} interactive={false} className={`patch-casing ${isMarked ? 'patch-casing-marked' : ''}`} />
        <Polyline positions={lines} pane={outlinePane} interactive={false} className={`patch-line ${isMarked ? 'patch-line-marked' : ''}`} />
        {isMarked && <Marker position={[patch.peak.latitude, beside(patch)]} icon={numberIcon(patch.number)} title={`patch ${patch.number}`} alt={`patch ${patch.number}`} keyboard={false} interactive={false} />}
      </Fragment>
    )
  })
}

/** The longitude of the greatest value in the turn of the globe its outline is drawn in. */
function beside({ peak, outline }: Patch): number {
  const drawn = outline.coordinates[0]?.[0]?.[0] ?? peak.longitude
  return peak.longitude + 360 * Math.round((drawn - peak.longitude) / 360)
}

function numberIcon(number: number): L.DivIcon {
  return L.divIcon({ className: 'patch-number', html: String(number), iconSize: [22, 20], iconAnchor: [11, 30] })
}
