import { useQuery } from '@tanstack/react-query'
import { useMemo, useState } from 'react'
import type { Region } from '../../../shared/schemas/regions'
import { feedsQuery } from '../../api/feeds'
import { singleCellsQuery } from '../../api/regions'
import { rulesQuery } from '../../api/rules'
import { baselineQuery, eventsQuery, seriesCsvHref, seriesQuery } from '../../api/series'
import { ruleThreshold } from '../../components/charts/rule-threshold'
import type { Statistic } from '../../components/charts/series-days'
import { SeriesFigure } from '../../components/charts/series-figure'
import { Empty } from '../../components/ui/empty'
import { Failure } from '../../components/ui/failure'
import { Waiting } from '../../components/ui/waiting'
import { useNow } from '../../hooks/use-now'
import { useWide } from '../../hooks/use-wide'
import { localDay } from '../../lib/dates'
import { activeDefinition } from './active-definition'
import { FeedAndStatistic } from './feed-and-statistic'

/** Ten years of one feed over this region, in one statistic, against what is usual. */
export default function SeriesPart({ region }: { region: Region }) {
  const feeds = useQuery(feedsQuery())
  const rules = useQuery(rulesQuery(region.id))
  const [chosenFeed, setFeed] = useState<number | null>(null)
  const [chosenStatistic, setStatistic] = useState<Statistic | null>(null)
  const feedId = chosenFeed ?? region.standing.feedId ?? feeds.data?.items[0]?.id
  const cells = useQuery({ ...singleCellsQuery(region.id, feedId ?? 0), enabled: feedId !== undefined && region.standing.progress === null })
  const failed = feeds.error ?? rules.error
  if (failed) return <Failure error={failed} />
  if (!feeds.data || !rules.data) return <Waiting lines={6} />
  if (feedId === undefined) return <Empty title="No feed yet.">A series begins with the first file that is read.</Empty>
  const definition = activeDefinition(rules.data.items, feedId)
  const judged = definition?.statistic ?? 'median'
  // Of a region with few cells no median is said.
  const statistic = chosenStatistic ?? (cells.data?.few && judged !== 'geometricMean' ? 'mean' : judged)
  return (
    <Chart
      region={region}
      feedId={feedId}
      feed={feeds.data.items.find((one) => one.id === feedId)}
      statistic={statistic}
      definition={definition?.statistic === statistic ? definition : undefined}
      coverageFloor={definition?.coverageFloor ?? region.standing.coverageFloor}
      controls={
        <FeedAndStatistic feeds={feeds.data.items} feedId={feedId} onFeed={setFeed} statistic={statistic} onStatistic={setStatistic} />
      }
    />
  )
}

interface ChartProps {
  region: Region
  feedId: number
  feed: { name: string; scale: 'log10' | 'linear' } | undefined
  statistic: Statistic
  /** Only where the rule judges the statistic on show. */
  definition: ReturnType<typeof activeDefinition>
  coverageFloor: number
  controls: React.ReactNode
}

function Chart({ region, feedId, feed, statistic, definition, coverageFloor, controls }: ChartProps) {
  const series = useQuery(seriesQuery({ regionId: region.id, feedId, statistic }))
  const baseline = useQuery(baselineQuery({ regionId: region.id, feedId, statistic }))
  const events = useQuery(eventsQuery({ regionId: region.id, feedId }))
  const wide = useWide()
  const today = localDay(useNow(3_600_000), region.timeZone)
  const usual = baseline.data && baseline.data.version !== null ? baseline.data : null
  const threshold = useMemo(() => (definition && baseline.isFetched ? ruleThreshold(definition, usual) : null), [definition, usual, baseline.isFetched])
  if (series.isPending) return <Waiting lines={6} />
  if (series.error) return <Failure error={series.error} onRetry={() => void series.refetch()} />
  const first = series.data.columns.day?.[0]
  if (first === undefined) {
    return (
      <>
        {controls}
        <Empty title="No view yet.">This feed has no layer over this region, or its history is still being read.</Empty>
      </>
    )
  }
  const last = series.data.columns.day?.at(-1) ?? today
  return (
    <SeriesFigure
      key={feedId}
      title={`${feed?.name ?? 'Series'} in ${region.name}`}
      csvHref={seriesCsvHref(region.id, feedId)}
      series={series.data}
      baseline={usual}
      statistic={statistic}
      coverageFloor={coverageFloor}
      threshold={threshold}
      events={events.data?.items.filter((event) => event.geometryVersion === region.geometryVersion)}
      scale={feed?.scale}
      span={{ from: first, to: last > today ? last : today }}
      first={wide ? 'all' : 'year'}
      controls={controls}
      height={360}
    />
  )
}
