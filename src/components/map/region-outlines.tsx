import type { LatLngExpression } from 'leaflet'
import { Fragment } from 'react'
import { Polygon } from 'react-leaflet'
import type { RegionStateName } from '../../../shared/schemas/common'
import type { RegionGeometry } from '../../../shared/schemas/regions'
import { outlinePane } from './panes'

export interface OutlinedRegion {
  id: number
  name: string
  geometry: RegionGeometry
  state: RegionStateName
}

/** Outlines with their paper casing; the line tells the state, the plate beside it says it in words. */
export function RegionOutlines({ regions, onSelect }: { regions: readonly OutlinedRegion[]; onSelect?: (id: number) => void }) {
  const calmFirst = [...regions].sort((a, b) => Number(a.state === 'unusual') - Number(b.state === 'unusual'))
  return calmFirst.map((region) => {
    const positions = latLngRings(region.geometry)
    const state = region.state.replace(' ', '-')
    return (
      <Fragment key={`${region.id} ${region.state}`}>
        <Polygon positions={positions} pane={outlinePane} interactive={false} className={`region-casing region-casing-${state}`} fill={false} />
        <Polygon
          positions={positions}
          pane={outlinePane}
          interactive={onSelect !== undefined}
          className={`region-line region-line-${state}`}
          fillOpacity={0}
          eventHandlers={onSelect ? { click: () => onSelect(region.id) } : {}}
        />
      </Fragment>
    )
  })
}

/** GeoJSON's longitude first turned round; the repeated last point left out. */
export function latLngRings(geometry: RegionGeometry): LatLngExpression[][][] {
  const polygons = geometry.type === 'Polygon' ? [geometry.coordinates] : geometry.coordinates
  return polygons.map((rings) => rings.map((ring) => ring.slice(0, -1).map(([longitude = 0, latitude = 0]): [number, number] => [latitude, longitude])))
}
