import { useMemo } from 'react'
import type { RegionPatches } from '../../../shared/schemas/patches'
import type { Region } from '../../../shared/schemas/regions'
import { boundsAround } from '../../components/map/bounds'
import { LayerTiles } from '../../components/map/layer-tiles'
import { Legend } from '../../components/map/legend'
import { PatchLines } from '../../components/map/patch-lines'
import { RangeRings } from '../../components/map/range-rings'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap } from '../../components/map/sea-map'

interface Props {
  region: Region
  layerId: number
  /** Of the same day, once they are there. */
  found: RegionPatches | undefined
  marked: number
}

export default function MapPiece({ region, layerId, found, marked }: Props) {
  const { geometry, site } = region
  const bounds = useMemo(() => {
    const spot = site && ([site.longitude, site.latitude] as [number, number])
    return boundsAround(spot ? [geometry, { type: 'Polygon', coordinates: [[spot, spot, spot, spot]] }] : [geometry], 0.22)
  }, [geometry, site])
  if (!bounds) return null
  return (
    <>
      <SeaMap label={`Map of ${region.name}`} bounds={bounds} hatched aspect={1.27}>
        {(found?.view?.layerIds ?? [layerId]).map((id) => (
          <LayerTiles key={id} layerId={id} />
        ))}
        <RegionOutlines regions={[{ id: region.id, name: region.name, geometry, state: region.standing.state }]} />
        {found && <PatchLines patches={found.patches} marked={marked} />}
        {site && <RangeRings site={site} />}
      </SeaMap>
      <Legend layerId={layerId}>
        {site && 'Rings: distance from the site.'}
      </Legend>
    </>
  )
}
