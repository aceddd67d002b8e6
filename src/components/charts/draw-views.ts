import type uPlot from 'uplot'
import { threeDigits } from '../../lib/format'
import { type ChartInk, figuresFont } from './chart-ink'
import { type EventSpan, isInEvent } from './event-spans'
import { joinedRuns } from './joined-runs'
import type { SeriesDays } from './series-days'

interface Point {
  x: number
  y: number
}

/** Usable views as discs, joined only where they are near in time; views below the floor as rings. */
export function drawViews(u: uPlot, laid: SeriesDays, spans: readonly EventSpan[], ink: ChartInk) {
  const { ctx, bbox } = u
  const ratio = bbox.width / Math.max(1, u.over.clientWidth)
  const perDay = dayWidth(u)
  const [from, to] = shown(u, laid)
  const at = (i: number, value: number): Point => ({
    x: u.valToPos(laid.days[i] ?? 0, 'x', true),
    y: u.valToPos(value, 'y', true),
  })
  ctx.save()
  ctx.beginPath()
  ctx.rect(bbox.left, bbox.top - 6 * ratio, bbox.width, bbox.height + 6 * ratio)
  ctx.clip()
  ctx.setLineDash([])
  drawLines(ctx, laid.usable.slice(from, to + 1), (i, value) => at(from + i, value), ink.ink, ratio * (perDay < 2 ? 0.8 : 1.2))
  const radius = ratio * (perDay < 1 ? 0.9 : perDay < 3 ? 1.4 : perDay < 6 ? 2 : 2.4)
  for (let i = from; i <= to; i += 1) {
    const below = laid.below[i]
    if (below != null && perDay >= 1) ring(ctx, at(i, below), radius + 0.4 * ratio, ink, ratio)
    const usable = laid.usable[i]
    if (usable != null) disc(ctx, at(i, usable), radius, ink.ink)
  }
  for (let i = from; i <= to; i += 1) {
    const value = laid.usable[i]
    if (value == null || !isFlagged(laid, spans, i)) continue
    disc(ctx, at(i, value), radius + (perDay < 3 ? 0.8 : 2) * ratio, ink.ember)
  }
  ctx.restore()
  labelNewest(u, laid, spans, ink, ratio, at)
}

function shown(u: uPlot, laid: SeriesDays): [number, number] {
  const first = laid.days[0] ?? 0
  const last = laid.days.length - 1
  const from = Math.max(0, Math.floor((u.scales['x']?.min ?? first) - first) - 3)
  const to = Math.min(last, Math.ceil((u.scales['x']?.max ?? first + last) - first) + 3)
  return [from, to]
}

export function dayWidth(u: uPlot): number {
  const days = (u.scales['x']?.max ?? 1) - (u.scales['x']?.min ?? 0)
  return u.over.clientWidth / Math.max(1, days)
}

function isFlagged(laid: SeriesDays, spans: readonly EventSpan[], i: number): boolean {
  const value = laid.usable[i]
  const threshold = laid.threshold[i]
  return value != null && (threshold == null || value > threshold) && isInEvent(spans, laid.days[i] ?? 0)
}

function drawLines(
  ctx: CanvasRenderingContext2D,
  values: readonly (number | null)[],
  at: (i: number, value: number) => Point,
  colour: string,
  width: number,
) {
  ctx.strokeStyle = colour
  ctx.lineWidth = width
  ctx.lineJoin = 'round'
  ctx.beginPath()
  for (const run of joinedRuns(values)) {
    run.forEach((i, place) => {
      const { x, y } = at(i, values[i] ?? 0)
      if (place === 0) ctx.moveTo(x, y)
      else ctx.lineTo(x, y)
    })
  }
  ctx.stroke()
}

function disc(ctx: CanvasRenderingContext2D, { x, y }: Point, radius: number, colour: string) {
  ctx.fillStyle = colour
  ctx.beginPath()
  ctx.arc(x, y, radius, 0, 2 * Math.PI)
  ctx.fill()
}

function ring(ctx: CanvasRenderingContext2D, { x, y }: Point, radius: number, ink: ChartInk, ratio: number) {
  ctx.fillStyle = ink.paper
  ctx.strokeStyle = ink.ink2
  ctx.lineWidth = ratio
  ctx.beginPath()
  ctx.arc(x, y, radius, 0, 2 * Math.PI)
  ctx.fill()
  ctx.stroke()
}

/** The newest view carries its figure while it is part of an event. */
function labelNewest(
  u: uPlot,
  laid: SeriesDays,
  spans: readonly EventSpan[],
  ink: ChartInk,
  ratio: number,
  at: (i: number, value: number) => Point,
) {
  const i = laid.usable.findLastIndex((value) => value != null)
  const value = laid.usable[i]
  const day = laid.days[i] ?? 0
  if (value == null || dayWidth(u) < 2 || !isFlagged(laid, spans, i) || day > (u.scales['x']?.max ?? 0)) return
  const { x, y } = at(i, value)
  u.ctx.save()
  u.ctx.fillStyle = ink.ember
  u.ctx.font = `700 ${14 * ratio}px ${figuresFont}`
  u.ctx.textAlign = 'right'
  u.ctx.fillText(threeDigits(value), Math.min(x + 6 * ratio, u.bbox.left + u.bbox.width), y - 9 * ratio)
  u.ctx.restore()
}
