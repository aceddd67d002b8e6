import { useMemo } from 'react'
import { useNavigate } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Feed } from '../../../shared/schemas/feeds'
import type { Region } from '../../../shared/schemas/regions'
import { boundsAround } from '../../components/map/bounds'
import { LayerTiles } from '../../components/map/layer-tiles'
import { Legend } from '../../components/map/legend'
import { Plates, type PlateRegion } from '../../components/map/plates'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap, type MapBounds } from '../../components/map/sea-map'
import { useWide } from '../../hooks/use-wide'
import { standingWord } from '../../lib/standing'

const world: MapBounds = [
  [-60, -170],
  [75, 170],
]

interface Props {
  layerId: number | null
  regions: readonly Region[] | undefined
  feed: Feed | undefined
}

export default function MapOfDay({ layerId, regions = [], feed }: Props) {
  const wide = useWide()
  const navigate = useNavigate()
  const bounds = useMemo(() => boundsAround(regions.map((region) => region.geometry)) ?? world, [regions])
  const shown = regions.map((region): PlateRegion => {
    const { standing } = region
    return {
      id: region.id,
      name: region.name,
      geometry: region.geometry,
      state: standing.state,
      word: standingWord(standing),
      to: standing.alertId ? paths.alert.to({ id: standing.alertId }) : paths.region.to({ id: region.id }),
    }
  })
  return (
    <>
      <SeaMap label="Map of the watched water" bounds={bounds} hatched={layerId !== null} aspect={wide ? 1.15 : 1.08}>
        {layerId !== null && <LayerTiles layerId={layerId} />}
        <RegionOutlines regions={shown} onSelect={(id) => void navigate(paths.region.to({ id }))} />
        <Plates regions={shown} compact={!wide} />
      </SeaMap>
      <Legend layerId={layerId} feed={feed}>
        {layerId === null && 'No layer on this day.'}
      </Legend>
    </>
  )
}
