import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense, useState } from 'react'
import { patchSentence } from '../../../shared/patch-text'
import type { Alert } from '../../../shared/schemas/alerts'
import { patchesQuery, viewQuery } from '../../api/patches'
import { regionQuery } from '../../api/regions'
import { Choice } from '../../components/ui/choice'
import { Failure } from '../../components/ui/failure'
import { PatchList } from '../../components/view/patch-list'
import { ViewFigures } from '../../components/view/view-figures'
import { shortDay } from '../../lib/dates'

const MapPiece = lazy(() => import('./map-piece'))

/** The piece of sea it is about: the view it was judged by, or the newest, with the patches in it. */
export function Where({ alert }: { alert: Alert }) {
  const { data: region, error, refetch } = useQuery(regionQuery(alert.regionId))
  const { evidence, latest, regionId, feedId } = alert
  const newer = latest && latest.layerId !== evidence.layerId ? latest : undefined
  const [shown, setShown] = useState<'judged' | 'newest'>('judged')
  const [marked, setMarked] = useState(1)
  const view = shown === 'newest' && newer ? newer : evidence
  const found = useQuery(patchesQuery({ regionId, feedId, day: view.day }))
  const figures = useQuery(viewQuery({ regionId, feedId, day: view.day })).data
  const patches = found.data?.view?.day === view.day ? found.data : undefined
  return (
    <section aria-label="Where" className="grid grid-cols-[minmax(0,1fr)] content-start gap-3">
      <div className="flex flex-wrap items-end justify-between gap-3 tab:pl-13">
        <h2 className="text-lead">Where</h2>
        {newer && (
          <Choice
            label="View on the map"
            value={shown}
            onChange={(next) => {
              setShown(next)
              setMarked(1)
            }}
            options={[
              { value: 'judged', label: `judged, ${shortDay(evidence.day)}` },
              { value: 'newest', label: `newest, ${shortDay(newer.day)}` },
            ]}
          />
        )}
      </div>
      {error && !region && <Failure error={error} onRetry={() => void refetch()} />}
      {region && (
        <Suspense fallback={<div className="hatch aspect-[1.27] border border-rule2" role="status" aria-label="Map on its way" />}>
          <MapPiece region={region} layerId={view.layerId} found={patches} marked={marked} />
        </Suspense>
      )}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-5 tab:pl-13">
        <h3 className="text-body font-heading">Patches on {shortDay(view.day)}</h3>
        {evidence.largestPatch && <p>When it was judged: {patchSentence(evidence.largestPatch, evidence.unit)}</p>}
        {found.error && !patches && <Failure error={found.error} onRetry={() => void found.refetch()} />}
        {patches && <PatchList found={patches} marked={marked} onMark={setMarked} />}
        {figures?.view?.day === view.day && <ViewFigures shown={figures} />}
      </div>
    </section>
  )
}
