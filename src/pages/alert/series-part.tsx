import { useQuery } from '@tanstack/react-query'
import { lazy, Suspense } from 'react'
import { Link } from 'react-router-dom'
import { paths } from '../../../shared/paths'
import { baselineStatistics, type Baseline } from '../../../shared/schemas/series'
import type { Alert } from '../../../shared/schemas/alerts'
import { rulesQuery } from '../../api/rules'
import { baselineQuery, seriesCsvHref, seriesQuery } from '../../api/series'
import { Failure } from '../../components/ui/failure'
import { SectionHead } from '../../components/ui/page'
import { Waiting } from '../../components/ui/waiting'
import { useNow } from '../../hooks/use-now'
import { useWide } from '../../hooks/use-wide'
import { addDays } from '../../lib/dates'
import { alertThreshold } from './alert-threshold'

const SeriesFigure = lazy(() => import('../../components/charts/series-figure').then((module) => ({ default: module.SeriesFigure })))

type Statistic = Baseline['statistic']

/** The four months that lead to it, in the statistic it was judged by. */
export function SeriesPart({ alert }: { alert: Alert }) {
  const wide = useWide()
  const now = useNow(3_600_000)
  const { regionId, feedId, evidence, event, regionName } = alert
  const statistic = statisticOf(evidence.statistic)
  const days = wide ? 120 : 40
  const to = alert.closedAt?.slice(0, 10) ?? new Date(now).toISOString().slice(0, 10)
  const span = { from: addDays(to, -days), to }
  const series = useQuery(seriesQuery({ regionId, feedId, statistic, ...span }))
  const baseline = useQuery(baselineQuery({ regionId, feedId, statistic }))
  const rules = useQuery(rulesQuery(regionId))
  const title = `Chlorophyll in ${regionName}, ${days} days`
  if (series.error && !series.data) {
    return (
      <section className="grid gap-3">
        <SectionHead>{title}</SectionHead>
        <Failure error={series.error} onRetry={() => void series.refetch()} />
      </section>
    )
  }
  if (!series.data || baseline.isPending || rules.isPending) return <Waiting lines={5} label="Waiting for the series" />
  return (
    <Suspense fallback={<Waiting lines={5} label="The chart is on its way" />}>
      <SeriesFigure
        title={title}
        csvHref={seriesCsvHref(regionId, feedId)}
        ranged={false}
        aside={
          <Link className="link font-strong" to={paths.region.to({ id: regionId })}>
            Whole series
          </Link>
        }
        series={series.data}
        baseline={baseline.data ?? null}
        statistic={statistic}
        coverageFloor={evidence.coverageFloor}
        threshold={alertThreshold(rules.data?.items, event, baseline.data ?? null)}
        span={span}
        events={[event]}
        height={wide ? 300 : 240}
      />
    </Suspense>
  )
}

function statisticOf(name: string): Statistic {
  return baselineStatistics.find((statistic) => statistic === name) ?? 'median'
}
