import { useQuery } from '@tanstack/react-query'
import { Link, useParams } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Feed } from '../../../shared/schemas/feeds'
import { useCan } from '../../api/auth'
import { feedQuery } from '../../api/feeds'
import { Age } from '../../components/ui/age'
import { Failure } from '../../components/ui/failure'
import { Mark } from '../../components/ui/mark'
import { Message } from '../../components/ui/message'
import { Page, SectionHead, Statement } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { LayerList } from '../layers/layer-list'
import { DeriveFeed } from './derive-feed'
import { FeedFacts } from './feed-facts'
import { FeedForm } from './feed-form'
import { MaskPart } from './mask-part'
import { PullPart } from './pull-part'
import { QualityForm } from './quality-form'
import { RetireFeed } from './retire-feed'

export function Component() {
  const id = Number(useParams()['id'])
  const feed = useQuery(feedQuery(id))
  return (
    <Page title={feed.data?.name ?? 'Feed'}>
      {feed.isPending && <Waiting lines={5} />}
      {feed.error && <Failure error={feed.error} onRetry={() => void feed.refetch()} />}
      {feed.data && <FeedParts key={id} feed={feed.data} />}
    </Page>
  )
}

function FeedParts({ feed }: { feed: Feed }) {
  const mayEdit = useCan('feed:edit')
  const mayDerive = useCan('feed:confirm') && feed.quantity === 'reflectance' && feed.derivedFrom === null && !feed.retired
  return (
    <>
      <Statement
        above={
          <Link className="link font-strong" to={paths.feeds.to()}>
            Feeds
          </Link>
        }
        detail={
          feed.newestLayerAt && (
            <>
              Newest layer <Age at={feed.newestLayerAt} old />.
            </>
          )
        }
      >
        {feed.silent ? (
          <span className="flex items-start gap-3">
            <Mark name="state-stale" size={28} className="mt-0.5 tab:mt-1.5" />
            <span>{feed.name} is silent.</span>
          </span>
        ) : (
          feed.name
        )}
      </Statement>
      {feed.retired && <Message title="This feed is retired.">Its layers stay; new files are not matched with it.</Message>}
      <div className="grid grid-cols-[minmax(0,1fr)] gap-x-9 gap-y-8 desk:grid-cols-[minmax(0,1.5fr)_minmax(0,1fr)]">
        <section className="grid grid-cols-[minmax(0,1fr)] content-start gap-3">
          <SectionHead>Layers</SectionHead>
          <LayerList feedId={feed.id} />
        </section>
        <div className="order-first grid grid-cols-[minmax(0,1fr)] content-start gap-8 desk:order-none">
          <FeedFacts feed={feed} />
          {feed.derivedFrom === null && <PullPart feed={feed} />}
          <MaskPart feed={feed} />
          {mayDerive && <DeriveFeed feed={feed} />}
          {mayEdit && <FeedForm key={feed.version} feed={feed} />}
          {mayEdit && <QualityForm key={`quality ${feed.version}`} feed={feed} />}
          {mayEdit && !feed.retired && <RetireFeed feed={feed} />}
        </div>
      </div>
    </>
  )
}
