import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import type { Layer } from '../../../shared/schemas/layers'
import type { Region } from '../../../shared/schemas/regions'
import { layerPointQuery } from '../../api/layers'
import { boundsAround } from '../../components/map/bounds'
import { CellCross } from '../../components/map/cell-cross'
import { LayerTiles } from '../../components/map/layer-tiles'
import { Legend } from '../../components/map/legend'
import { PrefetchTiles } from '../../components/map/prefetch-tiles'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap, type MapBounds } from '../../components/map/sea-map'
import { useWide } from '../../hooks/use-wide'
import { dayWithYear } from '../../lib/dates'
import type { Place } from './map-address'

interface Props {
  day: string
  feed: Feed
  layerId: number | null
  layer: Layer | undefined
  regions: readonly Region[]
  /** Layers of the days next to this one. */
  next: readonly number[]
  at: Place | undefined
  onPick: (place: Place) => void
}

const world: MapBounds = [
  [-60, -170],
  [75, 170],
]

export default function LayerSea({ day, feed, layerId, layer, regions, next, at, onPick }: Props) {
  const wide = useWide()
  const bounds = useStill(boundsFor(layer, regions), regions)
  const point = useQuery({ ...layerPointQuery(layerId ?? 0, at ?? { latitude: 0, longitude: 0 }, false), enabled: layerId !== null && at !== undefined }).data
  const corners = at && point?.layerId === layerId ? point?.cell?.corners : undefined
  return (
    <>
      <SeaMap label={`${feed.name}, ${dayWithYear(day)}. Arrows move the map, Enter reads the cell in its middle.`} bounds={bounds} hatched aspect={wide ? 1.3 : 1.02}>
        {layerId !== null && <LayerTiles layerId={layerId} />}
        <PrefetchTiles layerIds={next} />
        {/* How a region stands today says nothing about the day on the map: all outlines are plain. */}
        <RegionOutlines regions={regions.map(({ id, name, geometry }) => ({ id, name, geometry, state: 'usual' }))} />
        <CellCross corners={corners} onPick={(latitude, longitude) => onPick({ latitude: rounded(latitude), longitude: rounded(longitude) })} />
      </SeaMap>
      <Legend layerId={layerId} feed={feed}>
        {layerId === null && 'No layer on this day.'}
      </Legend>
    </>
  )
}

/** A whole small grid; of a grid that spans the globe, the watched water. */
function boundsFor(layer: Layer | undefined, regions: readonly Region[]): MapBounds | undefined {
  if (!layer) return undefined
  const { west, south, east, north } = layer.grid
  const watched = boundsAround(regions.map((region) => region.geometry))
  if (east - west > 60 && watched) return watched
  return [
    [Math.max(-84, south), west],
    [Math.min(84, north), east],
  ]
}

/** What was shown stays while the next layer is on its way, and on days without one: the map never jumps by itself. */
function useStill(wanted: MapBounds | undefined, regions: readonly Region[]): MapBounds {
  const [kept, setKept] = useState(wanted)
  if (wanted && JSON.stringify(wanted) !== JSON.stringify(kept)) setKept(wanted)
  return wanted ?? kept ?? boundsAround(regions.map((region) => region.geometry)) ?? world
}

const rounded = (degrees: number): number => Number(degrees.toFixed(5))
