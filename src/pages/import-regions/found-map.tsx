import L from 'leaflet'
import { Marker } from 'react-leaflet'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import type { ImportedArea } from '../../../shared/schemas/outlines'
import { useDrawingGround } from '../../components/region-form/use-drawing-ground'
import { boundsAround } from '../../components/map/bounds'
import { LayerTiles } from '../../components/map/layer-tiles'
import { PlaceMarks } from '../../components/map/place-marks'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap } from '../../components/map/sea-map'

/** The areas of a file where they lie: ticked ones drawn through, others dotted; rings where something was put right. */
export default function FoundMap({ items, ticked }: { items: readonly ImportedArea[]; ticked: readonly boolean[] }) {
  const ground = useDrawingGround(undefined, undefined)
  const found = items.flatMap((item, i) => (item.found ? [{ ...item.found, name: item.name, place: i }] : []))
  const faults = items.flatMap(({ refusal }) => (refusal?.place ? [{ ...refusal.place, about: refusal.sentence }] : []))
  const pointsAsOutlines = faults.map(({ longitude, latitude }): RegionGeometry => ({ type: 'Polygon', coordinates: [[[longitude, latitude]]] }))
  const bounds = boundsAround([...found.map((one) => one.geometry), ...pointsAsOutlines], 0.3) ?? ground.bounds
  // What the map is drawn on is settled when it is first shown.
  if (!ground.ready) return <div className="hatch aspect-[1.2] opacity-60" />
  return (
    <SeaMap label="Map of the areas in the file" bounds={bounds} hatched={ground.layerId !== undefined} aspect={1.2}>
      {ground.layerId !== undefined && <LayerTiles layerId={ground.layerId} />}
      <RegionOutlines regions={found.map(({ name, place, geometry }) => ({ id: place, name, geometry, state: ticked[place] ? 'usual' : 'not ready' }))} />
      {found.map(({ place, geometry }) => (
        <Marker key={place} position={firstCorner(geometry)} icon={numberIcon(place + 1)} keyboard={false} interactive={false} alt="" />
      ))}
      <PlaceMarks kind="repaired" marks={found.flatMap((one) => one.marks)} />
      <PlaceMarks kind="fault" marks={faults} />
    </SeaMap>
  )
}

/** The number of an area in the list, at its northernmost corner. */
function firstCorner(geometry: RegionGeometry): [number, number] {
  const rings = geometry.type === 'Polygon' ? geometry.coordinates : geometry.coordinates.flat()
  const [lon = 0, lat = 0] = rings.flat().reduce((best, point) => (point[1]! > best[1]! ? point : best))
  return [lat, lon]
}

function numberIcon(number: number): L.DivIcon {
  return L.divIcon({ className: '', html: `<span class="fig bg-paper text-ink px-1 text-fine border border-ink">${number}</span>`, iconSize: [24, 18], iconAnchor: [12, 22] })
}
