import { TileLayer } from 'react-leaflet'
import { useTheme } from '../../hooks/use-theme'
import { cellPane } from './panes'
import { tileTemplate } from './tile-address'

/** The cells of one layer, as the server paints them: no smoothing, nothing where nothing was measured. */
export function LayerTiles({ layerId }: { layerId: number }) {
  const theme = useTheme()
  return <TileLayer key={`${layerId} ${theme}`} url={tileTemplate(layerId, theme)} pane={cellPane} className="map-cells" maxNativeZoom={14} keepBuffer={1} />
}
