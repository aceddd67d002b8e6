import type L from 'leaflet'
import { useState } from 'react'
import { useMapEvents } from 'react-leaflet'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { useWide } from '../../hooks/use-wide'
import type { RepairMark } from '../../../shared/schemas/outlines'
import { LayerTiles } from '../map/layer-tiles'
import { PlaceMarks } from '../map/place-marks'
import { type OutlinedRegion, RegionOutlines } from '../map/region-outlines'
import { type MapBounds, SeaMap } from '../map/sea-map'
import { SiteMark } from '../map/site-mark'
import { Button } from '../ui/button'
import { OutlinePen } from './outline-pen'
import { finishDrawing, takeBackLastCorner } from './pen'
import type { Position } from './parse-position'

interface Props {
  bounds: MapBounds
  geometry: RegionGeometry | null
  drawing: boolean
  onDrawing: (drawing: boolean) => void
  onGeometry: (geometry: RegionGeometry) => void
  corners: number
  onCorners: (corners: [number, number][]) => void
  /** True while the next tap puts the site. */
  siting: boolean
  site: Position | undefined
  onSite: (site: Position) => void
  others: readonly OutlinedRegion[]
  layerId: number | undefined
  /** Where something was put right, and where the outline is wrong. */
  repaired?: readonly RepairMark[]
  fault?: RepairMark | undefined
}

/** The sea to draw on: what was seen there last, the other regions, and the outline being made. */
export default function DrawMap(props: Props) {
  const [map, setMap] = useState<L.Map | null>(null)
  const { geometry, drawing, corners } = props
  const wide = useWide()
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-2">
      <div className={props.siting ? '[&_.leaflet-container]:cursor-crosshair' : ''}>
        <SeaMap label="Map to draw the outline on" bounds={props.bounds} hatched={props.layerId !== undefined} aspect={wide ? 1.2 : 0.85} onReady={setMap}>
          {props.layerId !== undefined && <LayerTiles layerId={props.layerId} />}
          <RegionOutlines regions={props.others} />
          <OutlinePen
            geometry={geometry}
            drawing={drawing}
            editable={!props.siting}
            onCorners={props.onCorners}
            onChange={props.onGeometry}
            onDrawn={(made) => {
              props.onGeometry(made)
              props.onDrawing(false)
            }}
          />
          <PlaceMarks kind="repaired" marks={props.repaired ?? []} />
          {props.fault && <PlaceMarks kind="fault" marks={[props.fault]} />}
          {props.siting && <SiteTap onSite={props.onSite} />}
          {props.site && <SiteMark {...props.site} onMove={(latitude, longitude) => props.onSite({ latitude, longitude })} />}
        </SeaMap>
      </div>
      <div className="flex flex-wrap items-center gap-3 pl-11 tab:pl-13">
        {drawing ? (
          <>
            <Button disabled={corners < 3 || !map} onClick={() => map && finishDrawing(map)}>
              Close the outline
            </Button>
            <Button kind="text" disabled={corners < 2 || !map} onClick={() => map && takeBackLastCorner(map)}>
              Take back the last corner
            </Button>
            {geometry && (
              <Button kind="text" onClick={() => props.onDrawing(false)}>
                Keep the old outline
              </Button>
            )}
          </>
        ) : (
          <Button onClick={() => props.onDrawing(true)}>{geometry ? 'Draw it anew' : 'Draw the outline'}</Button>
        )}
      </div>
    </div>
  )
}

function SiteTap({ onSite }: { onSite: (site: Position) => void }) {
  useMapEvents({ click: ({ latlng }) => onSite({ latitude: latlng.lat, longitude: latlng.lng }) })
  return null
}
