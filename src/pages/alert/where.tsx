import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense, useState } from 'react'
import type { Alert } from '../../../shared/schemas/alerts'
import { regionQuery } from '../../api/regions'
import { Choice } from '../../components/ui/choice'
import { Failure } from '../../components/ui/failure'
import { shortDay } from '../../lib/dates'

const MapPiece = lazy(() => import('./map-piece'))

/** The piece of sea it is about: the view it was judged by, or the newest. */
export function Where({ alert }: { alert: Alert }) {
  const { data: region, error, refetch } = useQuery(regionQuery(alert.regionId))
  const { evidence, latest } = alert
  const newer = latest && latest.layerId !== evidence.layerId ? latest : undefined
  const [layerId, setLayerId] = useState(String(evidence.layerId))
  return (
    <section aria-label="Where" className="grid content-start gap-3">
      <div className="flex flex-wrap items-end justify-between gap-3 tab:pl-13">
        <h2 className="text-lead">Where</h2>
        {newer && (
          <Choice
            label="View on the map"
            value={layerId}
            onChange={setLayerId}
            options={[
              { value: String(evidence.layerId), label: `judged, ${shortDay(evidence.day)}` },
              { value: String(newer.layerId), label: `newest, ${shortDay(newer.day)}` },
            ]}
          />
        )}
      </div>
      {error && !region && <Failure error={error} onRetry={() => void refetch()} />}
      {region && (
        <Suspense fallback={<div className="hatch aspect-[1.27] border border-rule2" role="status" aria-label="Map on its way" />}>
          <MapPiece region={region} layerId={Number(layerId)} />
        </Suspense>
      )}
    </section>
  )
}
