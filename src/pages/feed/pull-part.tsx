import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import type { FeedPull } from '../../../shared/schemas/pulls'
import { sentenceOf } from '../../api/api-error'
import { useCan } from '../../api/auth'
import { pullQuery, usePullNow } from '../../api/pulls'
import { Button } from '../../components/ui/button'
import { Failure } from '../../components/ui/failure'
import { Message } from '../../components/ui/message'
import { SectionHead } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { DropPull } from './drop-pull'
import { PullForm } from './pull-form'
import { PullState } from './pull-state'

type Fetching = Pick<Feed, 'id' | 'name' | 'retired'>

/** What the feed fetches for itself. Admins set it; everybody sees how it goes. */
export function PullPart({ feed }: { feed: Fetching }) {
  const mayEdit = useCan('feed:edit') && !feed.retired
  const pull = useQuery(pullQuery(feed.id))
  if (pull.data && !pull.data.settings && !mayEdit) return null
  return (
    <section>
      <SectionHead>Fetches for itself</SectionHead>
      {pull.isPending && <Waiting lines={2} />}
      {pull.error && <Failure error={pull.error} onRetry={() => void pull.refetch()} />}
      {pull.data && <PullBody feed={feed} pull={pull.data} mayEdit={mayEdit} />}
    </section>
  )
}

function PullBody({ feed, pull, mayEdit }: { feed: Fetching; pull: FeedPull; mayEdit: boolean }) {
  const [changing, setChanging] = useState(false)
  const { settings } = pull
  return (
    <div className="grid gap-3">
      {pull.failing && (
        <div className="pt-3">
          <Message fault title={`The last ${pull.failuresInRow} fetches failed.`}>
            {pull.lastRun?.sentence}
          </Message>
        </div>
      )}
      {settings ? <PullState pull={pull} settings={settings} /> : <p className="pt-3 text-ink2">Nothing: its files are sent, or dropped into the watched folder.</p>}
      {mayEdit && changing && <PullForm feedId={feed.id} settings={settings} onDone={() => setChanging(false)} />}
      {mayEdit && !changing && (
        <div className="flex flex-wrap items-center gap-3">
          {settings && <FetchNow feedId={feed.id} running={pull.running} />}
          <Button size="small" onClick={() => setChanging(true)}>
            {settings ? 'Change what it fetches…' : 'Let it fetch…'}
          </Button>
          {settings && <DropPull feed={feed} />}
        </div>
      )}
    </div>
  )
}

function FetchNow({ feedId, running }: { feedId: number; running: boolean }) {
  const now = usePullNow(feedId)
  return (
    <>
      <Button size="small" disabled={running || now.isPending} onClick={() => now.mutate(undefined)}>
        {running ? 'Fetching…' : 'Fetch now'}
      </Button>
      {now.error && <Message fault>{sentenceOf(now.error)}</Message>}
    </>
  )
}
