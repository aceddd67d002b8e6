import { TileLayer } from 'react-leaflet'
import { endpoints } from '../../../shared/schemas/endpoints'
import { useTheme } from '../../hooks/use-theme'
import { cellPane } from './panes'

/** The cells of one water mask, as the server paints them. */
export function MaskTiles({ maskId }: { maskId: number }) {
  const theme = useTheme()
  const path = endpoints.maskTile.path.replace(':id', String(maskId)).replace(':z', '{z}').replace(':x', '{x}').replace(':y', '{y}')
  return <TileLayer key={`${maskId} ${theme}`} url={`/api${path}?theme=${theme}`} pane={cellPane} className="map-cells" maxNativeZoom={14} keepBuffer={1} />
}
