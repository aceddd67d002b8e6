import type { FeedCount } from '../../../shared/schemas/outlines'
import { fewestWholeCells } from '../../../shared/science/whole-water'
import { grouped, percent } from '../../lib/format'
import { Table, Td, Th, Tr } from '../ui/table'

/** For each feed, how many whole water cells the outline holds, and how much of it lies by the shore. */
export function OutlineHolds({ feeds }: { feeds: readonly FeedCount[] }) {
  if (feeds.length === 0) return null
  return (
    <section aria-label="What each feed has in it" aria-live="polite" className="grid gap-2">
      <Table label="Whole water cells by feed">
        <thead>
          <tr>
            <Th>Feed</Th>
            <Th figures>Whole water cells</Th>
            <Th figures>Within a cell of land</Th>
          </tr>
        </thead>
        <tbody>
          {sameCounts(feeds).map(([feed, ...others]) => (
            <Tr key={feed.feedId}>
              <Td>
                {feed.name}
                {others.length > 0 && <span className="block text-fine text-ink2">the same in {others.map((other) => other.name).join('; ')}</span>}
                {feed.wholeCells < fewestWholeCells && <span className="block text-fine text-ink2">{tooSmall(feed, others.length)}</span>}
              </Td>
              <Td figures className={feed.wholeCells < fewestWholeCells ? 'font-strong' : ''}>
                {!feed.exact && <span className="text-ink2">about </span>}
                {grouped(feed.exact ? feed.wholeCells : Number(feed.wholeCells.toPrecision(2)))}
              </Td>
              <Td figures>{feed.nearLandShare !== null && percent(feed.nearLandShare)}</Td>
            </Tr>
          ))}
        </tbody>
      </Table>
    </section>
  )
}

/** Feeds on one grid hold the same; they share a row. */
function sameCounts(feeds: readonly FeedCount[]): [FeedCount, ...FeedCount[]][] {
  const groups = new Map<string, [FeedCount, ...FeedCount[]]>()
  for (const feed of feeds) {
    const key = JSON.stringify([feed.cells, feed.wholeCells, feed.waterAreaKm2])
    const group = groups.get(key)
    if (group) group.push(feed)
    else groups.set(key, [feed])
  }
  return [...groups.values()]
}

function tooSmall({ cells }: FeedCount, others: number): string {
  if (cells === 0) return others > 0 ? 'Their newest layers do not reach this water.' : 'Its newest layer does not reach this water.'
  return `Fewer than ${fewestWholeCells}: Offing will show the single cells, no percentiles, and raise nothing by itself.`
}
