import { useQuery } from '@tanstack/react-query'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Feed } from '../../../shared/schemas/feeds'
import { feedsQuery } from '../../api/feeds'
import { Age } from '../../components/ui/age'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Mark } from '../../components/ui/mark'
import { Page, Statement } from '../../components/ui/page'
import { Table, Td, Th, Tr } from '../../components/ui/table'
import { Waiting } from '../../components/ui/waiting'
import { dayWords } from '../../lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { countAtHead, grouped } from '../../lib/format'

export function Component() {
  const feeds = useQuery(feedsQuery())
  const items = feeds.data?.items ?? []
  const live = items.filter((feed) => !feed.retired)
  const silent = live.filter((feed) => feed.silent)
  return (
    <Page title="Feeds">
      <Statement detail={live.length > 0 && silent.length > 0 ? silent.map((feed) => feed.name).join(', ') : undefined}>
        {sentence(live.length, silent.length)}
      </Statement>
      {feeds.isPending && <Waiting lines={4} />}
      {feeds.error && <Failure error={feeds.error} onRetry={() => void feeds.refetch()} />}
      {feeds.isSuccess && items.length === 0 && (
        <Empty title="No feed yet.">Send a file in the room of layers; the feed it belongs to is proposed from what it holds.</Empty>
      )}
      {items.length > 0 && (
        <Table label="Feeds">
          <thead>
            <tr>
              <Th>Feed</Th>
              <Th className="hidden tab:table-cell">Quantity</Th>
              <Th className="hidden desk:table-cell">Unit</Th>
              <Th>Stage</Th>
              <Th className="hidden tab:table-cell">Version</Th>
              <Th figures className="hidden tab:table-cell">
                Layers
              </Th>
              <Th figures>Newest layer</Th>
            </tr>
          </thead>
          <tbody>
            {items.map((feed) => (
              <FeedRow key={feed.id} feed={feed} />
            ))}
          </tbody>
        </Table>
      )}
    </Page>
  )
}

function sentence(live: number, silent: number): string {
  if (live === 0) return 'Feeds'
  if (silent === 0) return live === 1 ? 'One feed, and it speaks.' : `${countAtHead(live)} feeds, none of them silent.`
  return `${countAtHead(silent)} of ${countAtHead(live).toLowerCase()} ${live === 1 ? 'feed' : 'feeds'} ${silent === 1 ? 'is' : 'are'} silent.`
}

function FeedRow({ feed }: { feed: Feed }) {
  return (
    <Tr>
      <Td>
        <Link className="link text-body font-strong" to={paths.feed.to({ id: feed.id })}>
          {feed.name}
        </Link>
        {feed.retired && <span className="block text-fine text-ink2">retired</span>}
      </Td>
      <Td className="hidden tab:table-cell">{feed.quantity}</Td>
      <Td className="hidden desk:table-cell">{unitWords(feed.unit)}</Td>
      <Td>
        {feed.silent && feed.newestLayerAt ? (
          <span className="inline-flex items-center gap-2">
            <Mark name="state-stale" size={16} /> silent since {dayWords(feed.newestLayerAt)}
          </span>
        ) : (
          feed.stage
        )}
      </Td>
      <Td className="fig hidden tab:table-cell">{feed.processingVersion}</Td>
      <Td figures className="hidden tab:table-cell">
        {grouped(feed.layers)}
      </Td>
      <Td figures>{feed.newestLayerAt && <Age at={feed.newestLayerAt} old />}</Td>
    </Tr>
  )
}
