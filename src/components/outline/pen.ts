import L from 'leaflet'
import '@geoman-io/leaflet-geoman-free'
import '@geoman-io/leaflet-geoman-free/dist/leaflet-geoman.css'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { latLngRings } from '../map/region-outlines'
import { outlinePane } from '../map/panes'
import './pen.css'
import { wound } from './wind'

/** What the drawing library can do for its own tool bar and gives no other name to. */
interface PolygonTool {
  _finishShape: () => void
  _removeLastVertex: () => void
}

function polygonTool(map: L.Map): PolygonTool {
  return (map.pm.Draw as unknown as { Polygon: PolygonTool }).Polygon
}

export interface Pen {
  onDrawn: (geometry: RegionGeometry) => void
  /** Corners so far, longitude first. */
  onCorners: (corners: [number, number][]) => void
}

/** Corner marks are for the pointer; they have no name to be called by. For the keyboard there is the outline as text. */
function silenceMark({ layer }: L.LayerEvent): void {
  const element = layer instanceof L.Marker ? layer.getElement() : undefined
  if (!element?.classList.contains('marker-icon')) return
  element.removeAttribute('role')
  element.removeAttribute('tabindex')
  element.setAttribute('aria-hidden', 'true')
}

/** Each tap or click puts a corner; the first corner, Enter or `finish` closes the outline. Returns how to stop. */
export function startDrawing(map: L.Map, pen: Pen): () => void {
  const begun = ({ workingLayer }: { workingLayer: L.Layer }) => {
    const tell = () => pen.onCorners(cornersOf(workingLayer))
    workingLayer.on('pm:vertexadded', tell)
    workingLayer.on('pm:vertexremoved', tell)
  }
  const created = ({ layer }: { layer: L.Layer }) => {
    layer.remove()
    if (layer instanceof L.Polygon) pen.onDrawn(geometryOf(layer))
  }
  map.on('layeradd', silenceMark)
  map.on('pm:drawstart', begun)
  map.on('pm:create', created)
  map.pm.enableDraw('Polygon', {
    snappable: false,
    tooltips: false,
    finishOnEnter: true,
    continueDrawing: false,
    templineStyle: { className: 'pen-line', interactive: false },
    hintlineStyle: { className: 'pen-hint', interactive: false },
    pathOptions: { className: 'pen-line', fill: false },
  })
  return () => {
    map.off('layeradd', silenceMark)
    map.off('pm:drawstart', begun)
    map.off('pm:create', created)
    map.pm.disableDraw('Polygon')
  }
}

export function finishDrawing(map: L.Map): void {
  polygonTool(map)._finishShape()
}

export function takeBackLastCorner(map: L.Map): void {
  polygonTool(map)._removeLastVertex()
}

/** The outline; given `onChange`, with corners to drag and small marks between them for new ones. Returns how to take it away. */
export function showOutline(map: L.Map, geometry: RegionGeometry, onChange?: (geometry: RegionGeometry) => void): () => void {
  const casing = L.polygon(latLngRings(geometry), { pane: outlinePane, className: 'region-casing', interactive: false, fill: false, pmIgnore: true })
  const line = L.polygon(latLngRings(geometry), { pane: outlinePane, className: 'pen-line', fill: false })
  map.on('layeradd', silenceMark)
  casing.addTo(map)
  line.addTo(map)
  if (onChange) line.pm.enable({ snappable: false, allowSelfIntersection: true, draggable: false, removeLayerBelowMinVertexCount: false })
  line.on('pm:edit', () => onChange?.(geometryOf(line)))
  return () => {
    map.off('layeradd', silenceMark)
    line.pm.disable()
    line.remove()
    casing.remove()
  }
}

function geometryOf(layer: L.Polygon): RegionGeometry {
  return wound(layer.toGeoJSON(6).geometry)
}

function cornersOf(layer: L.Layer): [number, number][] {
  if (!(layer instanceof L.Polyline)) return []
  const points = (layer.getLatLngs() as unknown[]).flat(2) as L.LatLng[]
  return points.map(({ lng, lat }) => [lng, lat])
}
