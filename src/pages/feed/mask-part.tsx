import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense, useState } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import type { FeedMasks, GridMasks } from '../../../shared/schemas/masks'
import { useCan } from '../../api/auth'
import { feedMasksQuery, isMaking } from '../../api/masks'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { SectionHead } from '../../components/ui/page'
import { Progress } from '../../components/ui/progress'
import { Waiting } from '../../components/ui/waiting'
import { grouped } from '../../lib/format'
import { MakeMask } from './make-mask'
import { MaskFacts } from './mask-facts'
import { MaskMakingState } from './mask-making-state'
import { MaskVersions } from './mask-versions'

const MaskMap = lazy(() => import('./mask-map'))

type Masked = Pick<Feed, 'id' | 'name' | 'retired'>

/** Which cells of a feed are water: by what, since when, and what else there is to choose from. */
export function MaskPart({ feed }: { feed: Masked }) {
  const masks = useQuery(feedMasksQuery(feed.id))
  if (masks.data?.items.length === 0) return null
  return (
    <section>
      <SectionHead>Water mask</SectionHead>
      {masks.isPending && <Waiting lines={4} />}
      {masks.error && <Failure error={masks.error} onRetry={() => void masks.refetch()} />}
      {masks.data?.remaking && (
        <div className="grid gap-2 pt-3">
          <Progress {...masks.data.remaking} total={masks.data.remaking.total || 1} label={remakingWords[masks.data.remaking.state]} />
          <p className="text-small text-ink2">Until all of it is made anew its regions are not judged, and no alert is raised from this feed.{stands(masks.data.remaking.state) && ' An admin goes on with it among the jobs.'}</p>
        </div>
      )}
      <div className="grid gap-8">
        {masks.data?.items.map((grid) => (
          <GridPart key={grid.gridId} feed={feed} grid={grid} several={masks.data.items.length > 1} />
        ))}
      </div>
    </section>
  )
}

const remakingWords: Record<NonNullable<FeedMasks['remaking']>['state'], string> = {
  waiting: 'Making the history anew',
  running: 'Making the history anew',
  paused: 'Making the history anew, paused',
  cancelled: 'Making the history anew, stopped before its end',
  failed: 'Making the history anew, failed',
  done: 'History made anew',
}

const stands = (state: NonNullable<FeedMasks['remaking']>['state']) => state === 'paused' || state === 'cancelled' || state === 'failed'

function GridPart({ feed, grid, several }: { feed: Masked; grid: GridMasks; several: boolean }) {
  const [shownId, setShownId] = useState<number>()
  const [asking, setAsking] = useState(false)
  const mayMake = useCan('feed:confirm') && !feed.retired
  const inForce = grid.masks.find((mask) => mask.inForce)
  const shown = grid.masks.find((mask) => mask.id === shownId) ?? inForce
  if (!shown || !inForce) return null
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-4">
      {several && (
        <h3 className="pt-3 font-heading">
          Grid of <span className="fig">{grouped(grid.rows)}</span> rows, <span className="fig">{grouped(grid.columns)}</span> columns
        </h3>
      )}
      <MaskFacts mask={shown} cells={grid.rows * grid.columns} />
      <Suspense fallback={<Waiting lines={6} />}>
        <MaskMap grid={grid} mask={shown} />
      </Suspense>
      <MaskVersions feed={feed} grid={grid} inForce={inForce} shown={shown} onShow={setShownId} />
      {grid.making && <MaskMakingState making={grid.making} />}
      {mayMake && asking && <MakeMask feedId={feed.id} grid={grid} onDone={() => setAsking(false)} />}
      {mayMake && !asking && (
        <div>
          <Button size="small" disabled={isMaking(grid.making)} onClick={() => setAsking(true)}>
            Make a mask…
          </Button>
        </div>
      )}
    </div>
  )
}
