import type L from 'leaflet'
import 'leaflet/dist/leaflet.css'
import { useState, type ReactNode } from 'react'
import { MapContainer, Pane } from 'react-leaflet'
import { useWide } from '../../hooks/use-wide'
import { ChartFrame } from './chart-frame'
import { Coast } from './coast'
import { KeepInBounds } from './keep-in-bounds'
import { paneOrder } from './panes'
import { ScaleBar } from './scale-bar'
import './sea-map.css'

export type MapBounds = [southWest: [latitude: number, longitude: number], northEast: [latitude: number, longitude: number]]

interface Props {
  /** What the map shows, for those who hear it. */
  label: string
  bounds: MapBounds
  /** Hatch the ground: set where a layer is drawn, so that what it misses shows as missing. */
  hatched?: boolean
  /** Only the coastline, not the land: set where the cells themselves say what is land. */
  bareLand?: boolean
  /** Width over height of the map itself. */
  aspect?: number
  /** One finger or the mouse moves the map. On a phone two fingers do, so that the page can be scrolled past it. */
  draggable?: boolean
  scaleBar?: boolean
  onReady?: (map: L.Map) => void
  children?: ReactNode
}

/** A piece of sea in its graduated frame: coast, graticule, scale bar, and whatever is laid on it as children. */
export function SeaMap({ label, bounds, hatched = false, bareLand = false, aspect = 1.15, draggable, scaleBar = true, onReady, children }: Props) {
  const wide = useWide()
  const [frame, setFrame] = useState<HTMLElement | null>(null)
  return (
    <div role="region" aria-label={label} className="relative pb-6 pl-11 tab:pl-13">
      <div className="relative" style={{ aspectRatio: aspect }}>
        <div className="absolute inset-[7px]">
          <MapContainer
            bounds={bounds}
            boundsOptions={{ padding: [0, 0] }}
            className={`sea-map size-full ${hatched ? 'sea-map-hatched' : ''} ${bareLand ? 'sea-map-bare-land' : ''}`}
            zoomSnap={0}
            zoomDelta={0.5}
            minZoom={1}
            maxZoom={14}
            zoomAnimation={false}
            fadeAnimation={false}
            attributionControl={false}
            zoomControl={wide}
            scrollWheelZoom={false}
            dragging={draggable ?? wide}
            maxBounds={[
              [-85, -540],
              [85, 540],
            ]}
            ref={(map) => {
              if (map) onReady?.(map)
            }}
          >
            {Object.entries(paneOrder).map(([name, zIndex]) => (
              <Pane key={name} name={name} style={{ zIndex }} />
            ))}
            <KeepInBounds bounds={bounds} />
            <Coast />
            {children}
            {scaleBar && <ScaleBar />}
            {frame && <ChartFrame into={frame} />}
          </MapContainer>
          <div ref={setFrame} className="pointer-events-none absolute inset-0 z-[600]" />
        </div>
      </div>
    </div>
  )
}
