import { Polygon } from 'react-leaflet'
import type { Region, RegionGeometry } from '../../../shared/schemas/regions'
import { boundsAround } from '../../components/map/bounds'
import { LayerTiles } from '../../components/map/layer-tiles'
import { outlinePane } from '../../components/map/panes'
import { latLngRings, RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap } from '../../components/map/sea-map'
import { SiteMark } from '../../components/map/site-mark'

/** The outline on the newest usable layer, as it stands in its sea. */
export default function OutlineMap({ region, old = null }: { region: Region; old?: RegionGeometry | null }) {
  const { geometry, standing, site } = region
  const bounds = boundsAround(old ? [geometry, old] : [geometry], 0.35)
  if (!bounds) return null
  return (
    <SeaMap label={`Outline of ${region.name}`} bounds={bounds} hatched={standing.view !== null} aspect={1.25}>
      {standing.view && <LayerTiles layerId={standing.view.layerId} />}
      <RegionOutlines regions={[{ id: region.id, name: region.name, geometry, state: standing.state }]} />
      {old && <Polygon positions={latLngRings(old)} pane={outlinePane} interactive={false} className="region-line region-line-old" fill={false} />}
      {site && <SiteMark latitude={site.latitude} longitude={site.longitude} />}
    </SeaMap>
  )
}
