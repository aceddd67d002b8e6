import { useEffect, useEffectEvent, useId, useMemo, useRef, useState, type KeyboardEvent } from 'react'
import uPlot from 'uplot'
import 'uplot/dist/uPlot.min.css'
import { dateOf, epochDayOf } from '../../../shared/science/local-day'
import type { BloomEventItem } from '../../../shared/schemas/series'
import { useTheme } from '../../hooks/use-theme'
import { readChartInk } from './chart-ink'
import { DayReadout } from './day-readout'
import { eventSpans } from './event-spans'
import { nextIndex } from './next-index'
import { chartData, seriesChartOptions } from './series-chart-options'
import { type SeriesParts, seriesDays } from './series-days'
import type { Scale } from './value-range'

export interface SeriesChartProps extends Omit<SeriesParts, 'from' | 'to'> {
  /** All that is laid out, whatever is shown of it. */
  span: { from: string; to: string }
  /** What is shown. */
  from: string
  to: string
  events?: BloomEventItem[]
  scale?: Scale
  height?: number
  /** What the chart is, for those who hear it. */
  label: string
  /** Called when days are chosen by dragging over the chart. */
  onRange?: (from: string, to: string) => void
}

const noEvents: BloomEventItem[] = []

/** Figures of a region by day against what is usual: the canvas, its keys, and the readout of one day. */
export function SeriesChart(props: SeriesChartProps) {
  const { series, baseline, statistic, coverageFloor, threshold, span, scale = 'log10', height = 320 } = props
  const events = props.events ?? noEvents
  const frame = useRef<HTMLDivElement>(null)
  const plot = useRef<uPlot | null>(null)
  const theme = useTheme()
  const readout = useId()
  const [index, setIndex] = useState<number | null>(null)

  const laid = useMemo(
    () => seriesDays({ series, baseline, statistic, coverageFloor, threshold, from: span.from, to: span.to }),
    [series, baseline, statistic, coverageFloor, threshold, span.from, span.to],
  )
  const spans = useMemo(() => eventSpans(events), [events])
  const from = epochDayOf(props.from)
  const to = epochDayOf(props.to)

  const showDays = useEffectEvent((u: uPlot) => u.setScale('x', { min: from - 0.5, max: to + 0.5 }))
  const chooseRange = useEffectEvent((first: number, last: number) => props.onRange?.(dateOf(first), dateOf(last)))

  useEffect(() => {
    const element = frame.current
    if (!element) return
    const ink = readChartInk()
    const width = () => Math.max(200, element.clientWidth)
    const onRange = (first: number, last: number) => chooseRange(first, last)
    const parts = { laid, spans, scale, height, ink, width: width(), onDay: setIndex, onRange }
    const u = new uPlot(seriesChartOptions(parts), chartData(laid), element)
    plot.current = u
    showDays(u)
    const size = new ResizeObserver(() => u.setSize({ width: width(), height }))
    size.observe(element)
    return () => {
      size.disconnect()
      plot.current = null
      u.destroy()
    }
  }, [laid, spans, scale, height, theme])

  useEffect(() => plot.current?.setScale('x', { min: from - 0.5, max: to + 0.5 }), [from, to])

  function moveByKey(event: KeyboardEvent) {
    const next = nextIndex(event.key, index, laid, from, to)
    const u = plot.current
    if (next === null || !u) return
    event.preventDefault()
    u.setCursor({ left: u.valToPos(laid.days[next] ?? 0, 'x'), top: 10 })
  }

  const shownDay = laid.days[index ?? -1] ?? to
  return (
    <div>
      <DayReadout id={readout} laid={laid} day={shownDay} unit={series.unit} />
      <div
        ref={frame}
        role="slider"
        tabIndex={0}
        aria-label={props.label}
        aria-valuemin={from}
        aria-valuemax={to}
        aria-valuenow={shownDay}
        aria-valuetext={dateOf(shownDay)}
        aria-describedby={readout}
        onKeyDown={moveByKey}
        className="select-none [&_.u-cursor-x]:border-ink! [&_.u-select]:bg-ink/10!"
        style={{ height }}
      />
    </div>
  )
}
