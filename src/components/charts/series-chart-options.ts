import type uPlot from 'uplot'
import { type ChartInk, figuresFont } from './chart-ink'
import { drawEvents } from './draw-events'
import { drawTimeRule } from './draw-time-rule'
import { drawViews } from './draw-views'
import type { EventSpan } from './event-spans'
import { logTicks, thinnedLogTicks } from './log-ticks'
import type { SeriesDays } from './series-days'
import { timeTicks } from './time-ticks'
import { type Scale, valueRange } from './value-range'

export interface ChartParts {
  laid: SeriesDays
  spans: EventSpan[]
  scale: Scale
  width: number
  height: number
  ink: ChartInk
  onDay: (index: number | null) => void
  onRange: (from: number, to: number) => void
}

const nothing = () => null
const plain = { points: { show: false } } as const

export function seriesChartOptions(parts: ChartParts): uPlot.Options {
  const { laid, ink } = parts
  return {
    width: parts.width,
    height: parts.height,
    padding: [14, 10, 0, 0],
    legend: { show: false },
    cursor: { y: false, points: { show: false }, drag: { x: true, y: false, setScale: false, dist: 6 } },
    scales: {
      x: { time: false, range: (_, min, max) => [min, max] },
      y: { distr: parts.scale === 'log10' ? 3 : 1, range: (u) => shownRange(u, parts) },
    },
    axes: [timeAxis(ink), valueAxis(parts)],
    series: [
      {},
      { ...plain, width: 0 },
      { ...plain, width: 0 },
      { ...plain, stroke: () => ink.ink2, width: 1, dash: [1.5, 3] },
      { ...plain, stroke: () => ink.ember, width: 1.3, dash: [5, 3] },
      { ...plain, paths: nothing },
      { ...plain, paths: nothing },
    ],
    bands: [{ series: [1, 2], fill: () => ink.band }],
    hooks: {
      drawClear: [(u) => drawEvents(u, parts.spans, ink)],
      draw: [
        (u) => {
          drawViews(u, laid, parts.spans, ink)
          drawTimeRule(u, laid, ink)
        },
      ],
      setCursor: [(u) => parts.onDay((u.cursor.left ?? -1) < 0 ? null : (u.cursor.idx ?? null))],
      setSelect: [(u) => zoomToSelection(u, parts)],
    },
  }
}

export function chartData(laid: SeriesDays): uPlot.AlignedData {
  return [laid.days, laid.p90, laid.p10, laid.usual, laid.threshold, laid.usable, laid.below]
}

function shownRange(u: uPlot, { laid, scale }: ChartParts): [number, number] {
  const first = laid.days[0] ?? 0
  const last = laid.days.length - 1
  const from = Math.max(0, Math.ceil((u.scales['x']?.min ?? first) - first))
  const to = Math.min(last, Math.floor((u.scales['x']?.max ?? first + last) - first))
  return valueRange(laid, from, to, scale)
}

function zoomToSelection(u: uPlot, parts: ChartParts) {
  if (u.select.width <= 0) return
  const from = Math.ceil(u.posToVal(u.select.left, 'x') - 0.5)
  const to = Math.floor(u.posToVal(u.select.left + u.select.width, 'x') + 0.5)
  u.setSelect({ left: 0, top: 0, width: 0, height: 0 }, false)
  if (to > from) parts.onRange(from, to)
}

function timeAxis(ink: ChartInk): uPlot.Axis {
  const room = (u: uPlot) => Math.floor((u.width - 56) / 64)
  const ticks = (u: uPlot, min: number, max: number) => timeTicks(Math.ceil(min), Math.floor(max), room(u))
  return {
    size: 44,
    gap: 4,
    stroke: () => ink.ink3,
    font: `12px ${figuresFont}`,
    grid: { show: false },
    ticks: { show: true, size: 20, width: 1, stroke: () => ink.ink3 },
    splits: (u, _axis, min, max) => ticks(u, min, max).map((tick) => tick.day - 0.5),
    values: (u, splits) => {
      const labels = new Map(ticks(u, u.scales['x']?.min ?? 0, u.scales['x']?.max ?? 0).map((t) => [t.day - 0.5, t.label]))
      return splits.map((split) => labels.get(split) ?? '')
    },
  }
}

function valueAxis({ ink, scale, height }: ChartParts): uPlot.Axis {
  const room = Math.max(3, Math.floor((height - 60) / 26))
  const axis: uPlot.Axis = {
    size: 46,
    gap: 8,
    stroke: () => ink.ink3,
    font: `12px ${figuresFont}`,
    grid: { stroke: () => ink.rule, width: 1 },
    ticks: { show: false },
  }
  if (scale === 'linear') return axis
  return {
    ...axis,
    splits: (_u, _axis, min, max) => thinnedLogTicks(logTicks(min, max), room),
    values: (_u, splits) => splits.map((split) => String(split)),
    filter: (_u, splits) => splits,
  }
}
