import { useMemo } from 'react'
import type { RegionPatches } from '../../../shared/schemas/patches'
import type { Region } from '../../../shared/schemas/regions'
import { boundsAround } from '../../components/map/bounds'
import { LayerTiles } from '../../components/map/layer-tiles'
import { Legend } from '../../components/map/legend'
import { PatchLines } from '../../components/map/patch-lines'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap } from '../../components/map/sea-map'
import { SiteMark } from '../../components/map/site-mark'
import { dayWithYear } from '../../lib/dates'

/** The layers of one view with the patches found in it. */
export default function ViewMap({ region, found, marked }: { region: Region; found: RegionPatches; marked: number }) {
  const { geometry, site } = region
  const bounds = useMemo(() => boundsAround([geometry], 0.12), [geometry])
  const { view } = found
  if (!bounds || !view) return null
  return (
    <>
      <SeaMap label={`Patches in ${region.name} on ${dayWithYear(view.day)}`} bounds={bounds} hatched aspect={1.27}>
        {view.layerIds.map((layerId) => (
          <LayerTiles key={layerId} layerId={layerId} />
        ))}
        {/* How the region stands today says nothing about the day on the map. */}
        <RegionOutlines regions={[{ id: region.id, name: region.name, geometry, state: 'usual' }]} />
        <PatchLines patches={found.patches} marked={marked} />
        {site && <SiteMark latitude={site.latitude} longitude={site.longitude} />}
      </SeaMap>
      <Legend layerId={view.layerIds[0] ?? null}>{site && 'Diamond: the site.'}</Legend>
    </>
  )
}
