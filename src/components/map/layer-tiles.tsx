import { TileLayer } from 'react-leaflet'
import { endpoints } from '../../../shared/schemas/endpoints'
import { useTheme } from '../../hooks/use-theme'
import { cellPane } from './panes'

/** The cells of one layer, as the server paints them: no smoothing, nothing where nothing was measured. */
export function LayerTiles({ layerId }: { layerId: number }) {
  const theme = useTheme()
  const path = endpoints.layerTile.path.replace(':id', String(layerId)).replace(':z', '{z}').replace(':x', '{x}').replace(':y', '{y}')
  return <TileLayer key={`${layerId} ${theme}`} url={`/api${path}?theme=${theme}`} pane={cellPane} className="map-cells" maxNativeZoom={14} keepBuffer={1} />
}
