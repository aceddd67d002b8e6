import { useMemo } from 'react'
import type { Region } from '../../../shared/schemas/regions'
import { boundsAround } from '../../components/map/bounds'
import { LayerTiles } from '../../components/map/layer-tiles'
import { Legend } from '../../components/map/legend'
import { RangeRings } from '../../components/map/range-rings'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap } from '../../components/map/sea-map'

export default function MapPiece({ region, layerId }: { region: Region; layerId: number }) {
  const { geometry, site } = region
  const bounds = useMemo(() => {
    const spot = site && ([site.longitude, site.latitude] as [number, number])
    return boundsAround(spot ? [geometry, { type: 'Polygon', coordinates: [[spot, spot, spot, spot]] }] : [geometry], 0.22)
  }, [geometry, site])
  if (!bounds) return null
  return (
    <>
      <SeaMap label={`Map of ${region.name}`} bounds={bounds} hatched aspect={1.27}>
        <LayerTiles layerId={layerId} />
        <RegionOutlines regions={[{ id: region.id, name: region.name, geometry, state: region.standing.state }]} />
        {site && <RangeRings site={site} />}
      </SeaMap>
      <Legend layerId={layerId}>
        {site && 'Rings: distance from the site.'}
      </Legend>
    </>
  )
}
