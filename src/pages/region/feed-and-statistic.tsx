import { useId } from 'react'
import type { Feed } from '../../../shared/schemas/feeds'
import { type Statistic } from '../../components/charts/series-days'
import { statistics, statisticWords } from '../../components/charts/statistic-words'

interface Props {
  feeds: readonly Feed[]
  feedId: number
  onFeed: (id: number) => void
  statistic: Statistic
  onStatistic: (statistic: Statistic) => void
}

const select = 'min-h-11 max-w-64 border-b border-accent bg-transparent pr-2 text-body font-strong text-accent tab:min-h-9'

/** Which feed, and which one figure of each view. */
export function FeedAndStatistic({ feeds, feedId, onFeed, statistic, onStatistic }: Props) {
  const feedLabel = useId()
  const statisticLabel = useId()
  return (
    <div className="flex flex-wrap items-center gap-x-5 gap-y-2" data-no-print>
      <span className="flex items-center gap-2">
        <label htmlFor={feedLabel} className="text-small text-ink2">
          Feed
        </label>
        <select id={feedLabel} className={select} value={feedId} onChange={(event) => onFeed(Number(event.target.value))}>
          {feeds.map((feed) => (
            <option key={feed.id} value={feed.id}>
              {feed.name}
              {feed.retired && ' (retired)'}
            </option>
          ))}
        </select>
      </span>
      <span className="flex items-center gap-2">
        <label htmlFor={statisticLabel} className="text-small text-ink2">
          Statistic
        </label>
        <select id={statisticLabel} className={select} value={statistic} onChange={(event) => onStatistic(event.target.value as Statistic)}>
          {statistics.map((one) => (
            <option key={one} value={one}>
              {statisticWords(one)}
            </option>
          ))}
        </select>
      </span>
    </div>
  )
}
