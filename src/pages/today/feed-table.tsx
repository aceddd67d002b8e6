import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import type { Feed } from '../../../shared/schemas/feeds'
import { Mark } from '../../components/ui/mark'
import { Waiting } from '../../components/ui/waiting'
import { ageWords } from '../../lib/age'
import { dayWords } from '../../lib/dates'

/** What the picture of today is made from, and how old it is: the feeds that judge a region, and whichever fell silent. */
export function FeedTable({ feeds, watched }: { feeds: readonly Feed[] | undefined; watched: ReadonlySet<number> }) {
  if (!feeds) return <Waiting />
  const inUse = feeds.filter((feed) => !feed.retired)
  const shown = inUse.filter((feed) => watched.has(feed.id) || feed.silent)
  const others = inUse.length - shown.length
  return (
    <table aria-label="Feeds" className="w-full self-start text-small">
      <thead>
        <tr className="border-b border-ink text-left text-fine text-ink3">
          <th className="py-2 pr-3 font-text">Feed</th>
          <th className="py-2 pr-3 font-text">Stage</th>
          <th className="py-2 text-right font-text">Newest layer</th>
        </tr>
      </thead>
      <tbody>
        {shown.map((feed) => (
          <tr key={feed.id} className="border-b border-rule">
            <td className="py-2 pr-3">
              <Link to={paths.feed.to({ id: feed.id })} className="hover:text-accent">
                {feed.name}
              </Link>
            </td>
            <td className="py-2 pr-3 text-ink2">
              {feed.silent && feed.newestLayerAt ? (
                <span className="flex items-center gap-1.5 text-ink">
                  <Mark name="state-stale" size={16} />
                  silent since {dayWords(feed.newestLayerAt)}
                </span>
              ) : (
                feed.stage
              )}
            </td>
            <td className="fig py-2 text-right whitespace-nowrap">{feed.newestAgeHours === null ? 'no layer yet' : `${ageWords(feed.newestAgeHours)} old`}</td>
          </tr>
        ))}
      </tbody>
      {others > 0 && (
        <tfoot>
          <tr>
            <td colSpan={3} className="py-2 text-ink2">
              <Link to={paths.feeds.to()} className="link">
                {others} more {others === 1 ? 'feed' : 'feeds'}
              </Link>
            </td>
          </tr>
        </tfoot>
      )}
    </table>
  )
}
