import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense, useState } from 'react'
import type { Region } from '../../../shared/schemas/regions'
import { patchesQuery, viewQuery } from '../../api/patches'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { SectionHead } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { PatchList } from '../../components/view/patch-list'
import { inUnit } from '../../components/view/patch-words'
import { ViewFigures } from '../../components/view/view-figures'
import { LevelField } from './level-field'
import { ViewSteps } from './view-steps'

const ViewMap = lazy(() => import('./view-map'))

/** One view of the region at a time: its patches on the map and in a list, and the figures of the day. */
export function ViewPart({ region, feedId }: { region: Region; feedId: number }) {
  const [chosen, setDay] = useState<string>()
  // Until somebody goes to a day, the one the region stands by, also when a newer one arrives.
  const day = chosen ?? region.standing.view?.day
  const [level, setLevel] = useState<number | undefined>()
  const [marked, setMarked] = useState(1)
  const shown = useQuery(viewQuery({ regionId: region.id, feedId, day, level }))
  const found = useQuery(patchesQuery({ regionId: region.id, feedId, day, level }))
  if (shown.error) return <Failure error={shown.error} onRetry={() => void shown.refetch()} />
  if (!shown.data) return <Waiting lines={6} />
  if (shown.data.last === null) return null
  const go = (to: string) => {
    setDay(to)
    setMarked(1)
  }
  const { unit } = shown.data
  return (
    <section aria-label="Patches of a view" className="grid grid-cols-[minmax(0,1fr)] gap-4">
      <SectionHead>Patches at or above {inUnit(shown.data.level.level, unit)}</SectionHead>
      <div className="flex flex-wrap items-end justify-between gap-x-9 gap-y-3">
        <ViewSteps shown={shown.data} day={day ?? shown.data.view?.day ?? shown.data.last} onChange={go} />
        <LevelField unit={unit} level={level} onChange={setLevel} />
      </div>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-6 desk:grid-cols-[minmax(0,1.25fr)_minmax(0,1fr)]">
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-3">
          {found.data?.view && (
            <Suspense fallback={<div className="hatch aspect-[1.27] border border-rule2" role="status" aria-label="Map on its way" />}>
              <ViewMap region={region} found={found.data} marked={marked} />
            </Suspense>
          )}
          {found.error && <Failure error={found.error} onRetry={() => void found.refetch()} />}
          {!found.data && !found.error && <Waiting lines={6} label="Waiting for the patches" />}
          {found.data && !found.data.view && <Empty title={found.data.sentence}>Go to a day with a view.</Empty>}
        </div>
        <div className="grid grid-cols-[minmax(0,1fr)] content-start gap-6">
          {found.data?.view && <PatchList found={found.data} marked={marked} onMark={setMarked} />}
          <ViewFigures shown={shown.data} />
        </div>
      </div>
    </section>
  )
}
