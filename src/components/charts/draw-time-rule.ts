import type uPlot from 'uplot'
import { dateOf } from '../../../shared/science/local-day'
import type { ChartInk } from './chart-ink'
import { dayWidth } from './draw-views'
import { hatchPattern } from './hatch-pattern'
import type { SeriesDays } from './series-days'

/** In CSS pixels. */
const gap = 6
const dayRuleHeight = 7
const monthRuleHeight = 13

/** Narrower days cannot be told apart; the rule then goes by months. */
const narrowestDay = 1.5

/**
 * The graduated rule under the chart, on the hatch of missing. Where days can be told apart: ink where the water was
 * seen. Else one segment a month, as high as the share of its days on which it was seen.
 */
export function drawTimeRule(u: uPlot, laid: SeriesDays, ink: ChartInk) {
  const { ctx, bbox } = u
  const ratio = bbox.width / Math.max(1, u.over.clientWidth)
  const byMonth = dayWidth(u) < narrowestDay
  const top = bbox.top + bbox.height + gap * ratio
  const height = (byMonth ? monthRuleHeight : dayRuleHeight) * ratio
  ctx.save()
  ctx.beginPath()
  ctx.rect(bbox.left, top, bbox.width, height)
  ctx.clip()
  ctx.fillStyle = hatchPattern(ctx, ink.paper, ink.ink3, ratio)
  ctx.fillRect(bbox.left, top, bbox.width, height)
  ctx.fillStyle = ink.ink2
  for (const { from, to, share } of byMonth ? months(laid) : seenStretches(laid)) {
    const left = u.valToPos(from - 0.5, 'x', true)
    const width = u.valToPos(to + 0.5, 'x', true) - left - (byMonth ? ratio : 0)
    ctx.fillRect(left, top + height * (1 - share), width, height * share)
  }
  ctx.setLineDash([])
  ctx.strokeStyle = ink.ink
  ctx.lineWidth = ratio
  ctx.strokeRect(bbox.left + ratio / 2, top + ratio / 2, bbox.width - ratio, height - ratio)
  ctx.restore()
}

interface Stretch {
  from: number
  to: number
  /** Of its days, those on which the water was seen. */
  share: number
}

function seenStretches(laid: SeriesDays): Stretch[] {
  const stretches: Stretch[] = []
  laid.days.forEach((day, i) => {
    if (laid.usable[i] == null) return
    const last = stretches[stretches.length - 1]
    if (last && last.to === day - 1) last.to = day
    else stretches.push({ from: day, to: day, share: 1 })
  })
  return stretches
}

function months(laid: SeriesDays): Stretch[] {
  const stretches: (Stretch & { seen: number })[] = []
  laid.days.forEach((day, i) => {
    let last = stretches[stretches.length - 1]
    if (!last || dateOf(day).endsWith('-01')) {
      last = { from: day, to: day, share: 0, seen: 0 }
      stretches.push(last)
    }
    last.to = day
    if (laid.usable[i] != null) last.seen += 1
    last.share = last.seen / (last.to - last.from + 1)
  })
  return stretches
}
