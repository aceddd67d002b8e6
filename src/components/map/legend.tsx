import { useQuery } from '@tanstack/react-query'
import type { ReactNode } from 'react'
import { colouringOf, type ColouredFeed, type Colouring } from '../../../shared/colouring'
import { unitWords } from '../../../shared/figure-text'
import { quantityWord } from '../../../shared/quantity-word'
import type { LayerLegend } from '../../../shared/schemas/layer-legend'
import { layerLegendQuery } from '../../api/layers'
import { daySpan } from '../../lib/dates'
import { HatchTile } from '../ui/hatch-pattern'
import { LegendScale } from './legend-scale'
import { missingWords, rangeWords } from './legend-words'

interface Props {
  /** The layer on the map; null when there is none. */
  layerId: number | null
  /** Whose colours to show while there is no layer, or it has not been looked at yet. */
  feed?: ColouredFeed | undefined
  children?: ReactNode
}

/** As wide as the map: the ramp of this quantity with its scale and unit, the layer's values over it, and what the hatch stands for. */
export function Legend({ layerId, feed, children }: Props) {
  const { data } = useQuery({ ...layerLegendQuery(layerId ?? 0), enabled: layerId !== null })
  const legend = layerId === null ? undefined : data
  const colouring = legend?.colouring ?? (feed && colouringOf(feed))
  const quantity = legend?.quantity ?? (feed && quantityWord(feed))
  const unit = legend ? legend.unit : feed?.unit
  return (
    <div className="pl-11 tab:pl-13">
      <div className="mx-[7px]">
        {colouring ? <LegendScale colouring={colouring} legend={legend} /> : <div className="h-10" />}
        <p className="mt-1 flex flex-wrap justify-between gap-x-6 gap-y-1 text-small text-ink2">
          <span>
            {quantity && <b className="font-heading text-ink">{quantity}</b>}
            {colouring && `, ${scaleWords(colouring, unit)}.`} {legend?.period && `${periodWords(legend.period)}. `}
            {children}
          </span>
          {layerId !== null && (
            <span>
              <HatchTile />
              missing: {legend ? missingWords(legend) : 'not seen'}
            </span>
          )}
        </p>
      </div>
    </div>
  )
}

function scaleWords(colouring: Colouring, unit: string | null | undefined): string {
  if (colouring.scale === 'screen') return 'a screen: yes or no'
  const words = [...(unit && unit !== '1' ? [unitWords(unit)] : []), colouring.scale === 'log' ? 'logarithmic' : 'linear', ...rangeWords(colouring)]
  return words.join(', ')
}

function periodWords({ from, to }: NonNullable<LayerLegend['period']>): string {
  // A period ends where the next one begins: midnight belongs to the day before.
  const last = new Date(Date.parse(to) - 1).toISOString()
  return `Composite of ${daySpan(from, last)} ${last.slice(0, 4)}`
}
