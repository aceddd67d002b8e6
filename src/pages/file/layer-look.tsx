import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { useCan } from '../../api/auth'
import { layerQuery } from '../../api/layers'
import { regionsQuery } from '../../api/regions'
import { LayerTiles } from '../../components/map/layer-tiles'
import { Legend } from '../../components/map/legend'
import { RegionOutlines } from '../../components/map/region-outlines'
import { SeaMap, type MapBounds } from '../../components/map/sea-map'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'
import { layerTime } from '../layers/layer-time'
import { SuspectDialog } from './suspect-dialog'

/** One layer as it was read: cells stay cells, and what is missing stays hatched. */
export default function LayerLook({ layerId }: { layerId: number }) {
  const layer = useQuery(layerQuery(layerId))
  const regions = useQuery(regionsQuery()).data?.items.filter((region) => !region.retired) ?? []
  const mayMark = useCan('layer:suspect')
  const [marking, setMarking] = useState(false)
  if (layer.error) return <Failure error={layer.error} />
  if (!layer.data) return <div className="hatch aspect-[1.2] opacity-60" />
  const { grid, suspect } = layer.data
  const bounds: MapBounds = [
    [Math.max(-84, grid.south), grid.west],
    [Math.min(84, grid.north), grid.east],
  ]
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] content-start gap-2">
      <SectionHead ruled={false} aside={<span className="fig">{layerTime(layer.data)}</span>}>
        Quick look
      </SectionHead>
      <SeaMap label={`Layer of ${layerTime(layer.data)}`} bounds={bounds} hatched aspect={1.25}>
        <LayerTiles layerId={layerId} />
        <RegionOutlines regions={regions.map(({ id, name, geometry, standing }) => ({ id, name, geometry, state: standing.state }))} />
      </SeaMap>
      <Legend layerId={layerId} />
      {suspect && (
        <Message title={`Marked suspect by ${suspect.by}.`}>
          {suspect.note} Its days are judged without it.
        </Message>
      )}
      {mayMark && (
        <div>
          <Button kind="text" size="small" onClick={() => setMarking(true)}>
            {suspect ? 'Take the suspicion back' : 'Mark this layer suspect'}
          </Button>
        </div>
      )}
      {marking && <SuspectDialog layer={layer.data} onClose={() => setMarking(false)} />}
    </section>
  )
}
