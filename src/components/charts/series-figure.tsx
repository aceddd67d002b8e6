import { useMemo, useState, type ReactNode } from 'react'
import { epochDayOf } from '../../../shared/science/local-day'
import { Button } from '../ui/button'
import { SectionHead } from '../ui/page'
import { dayRows } from './day-rows'
import { eventSpans } from './event-spans'
import { RangeChoice } from './range-choice'
import { SeriesChart, type SeriesChartProps } from './series-chart'
import { seriesDays } from './series-days'
import { SeriesLegend } from './series-legend'
import { SeriesTable } from './series-table'
import { type DayRange, namedRange, type RangeName } from './shown-range'

interface Props extends Omit<SeriesChartProps, 'from' | 'to' | 'onRange' | 'label'> {
  title: string
  csvHref: string
  /** What is shown at first. */
  first?: RangeName
  /** Offers other days; left out, the chart keeps to its span. */
  ranged?: boolean
  aside?: ReactNode
  /** Choices of feed and statistic, above the chart. */
  controls?: ReactNode
}

/** A chart with all that belongs to it: choice of days, key, table and file. */
export function SeriesFigure({ title, csvHref, first = 'year', ranged = true, aside, controls, ...chart }: Props) {
  const { span } = chart
  const [chosen, setChosen] = useState<DayRange | null>(null)
  const [asTable, setAsTable] = useState(false)
  const range = chosen ?? (ranged ? namedRange(first, span) : span)
  return (
    <section className="grid grid-cols-[minmax(0,1fr)] gap-3">
      <SectionHead
        aside={
          <span className="flex items-center gap-4" data-no-print>
            {aside}
            <Button kind="text" size="small" aria-expanded={asTable} onClick={() => setAsTable(!asTable)}>
              {asTable ? 'Hide table' : 'Table'}
            </Button>
            <a className="link font-strong" href={csvHref} download>
              CSV
            </a>
          </span>
        }
      >
        {title}
      </SectionHead>
      {(ranged || controls) && (
        <div className="flex flex-wrap items-center justify-between gap-x-6 gap-y-2">
          {ranged && <RangeChoice range={range} span={span} onChange={setChosen} />}
          {controls}
        </div>
      )}
      <SeriesChart {...chart} from={range.from} to={range.to} label={`${title}. Arrow keys go from view to view.`} onRange={(from, to) => setChosen({ from, to })} />
      <SeriesLegend unit={chart.series.unit} statistic={chart.statistic} threshold={chart.threshold !== null} />
      {asTable && <RangeTable {...chart} range={range} label={title} />}
    </section>
  )
}

function RangeTable({ range, label, ...chart }: Omit<SeriesChartProps, 'from' | 'to' | 'onRange'> & { range: DayRange }) {
  const { series, baseline, statistic, coverageFloor, threshold, events, span } = chart
  const rows = useMemo(() => {
    const laid = seriesDays({ series, baseline, statistic, coverageFloor, threshold, from: span.from, to: span.to })
    return dayRows(laid, eventSpans(events ?? []), epochDayOf(range.from), epochDayOf(range.to))
  }, [series, baseline, statistic, coverageFloor, threshold, events, span.from, span.to, range.from, range.to])
  return <SeriesTable key={`${range.from} ${range.to}`} rows={rows} unit={series.unit} label={label} />
}
