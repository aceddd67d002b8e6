import { useQuery } from '@tanstack/react-query'
import { unitWords } from '../../../shared/figure-text'
import type { Layer } from '../../../shared/schemas/layers'
import { layerLegendQuery, layerPointQuery } from '../../api/layers'
import { figure } from '../../lib/format'
import { yesOrNo } from './cell-words'
import type { Place } from './map-address'

/** On a phone the cell stands below the map, out of sight while the thumb is at the slider: its figures in one line there. */
export function CellLine({ layer, at }: { layer: Layer | undefined; at: Place | undefined }) {
  if (!layer || !at) return null
  return <Line layer={layer} at={at} />
}

function Line({ layer, at }: { layer: Layer; at: Place }) {
  const read = useQuery(layerPointQuery(layer.id, at, false)).data
  const usual = useQuery(layerPointQuery(layer.id, at, true)).data?.usual
  const screen = useQuery(layerLegendQuery(layer.id)).data?.colouring.scale === 'screen'
  if (!read) return <p className="text-small text-ink2 tab:hidden">Reading the cell</p>
  const words = (value: number) => (screen ? yesOrNo(value) : figure(value))
  const unit = read.unit && !screen ? ` ${unitWords(read.unit)}` : ''
  return (
    <p aria-hidden className="fig text-small tab:hidden">
      {read.row === null ? 'outside the layer' : read.value === null ? 'missing' : <b className="font-heading">{words(read.value)}{unit}</b>}
      {read.row !== null && usual && `; usual here ${usual.median === null ? 'not known' : `${words(usual.median)}${unit}`}`}
    </p>
  )
}
