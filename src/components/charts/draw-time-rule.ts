import type uPlot from 'uplot'
import type { ChartInk } from './chart-ink'
import { hatchPattern } from './hatch-pattern'
import type { SeriesDays } from './series-days'

const thickness = 7
const gap = 6

/** The graduated rule under the chart: ink where the water was seen, the hatch of missing where it was not. */
export function drawTimeRule(u: uPlot, laid: SeriesDays, ink: ChartInk) {
  const { ctx, bbox } = u
  const ratio = bbox.width / Math.max(1, u.over.clientWidth)
  const top = bbox.top + bbox.height + gap * ratio
  const height = thickness * ratio
  ctx.save()
  ctx.fillStyle = hatchPattern(ctx, ink.paper, ink.ink3, ratio)
  ctx.fillRect(bbox.left, top, bbox.width, height)
  ctx.beginPath()
  ctx.rect(bbox.left, top, bbox.width, height)
  ctx.clip()
  ctx.fillStyle = ink.ink2
  for (const [from, to] of seenStretches(laid)) {
    const left = u.valToPos(from - 0.5, 'x', true)
    ctx.fillRect(left, top, Math.max(ratio / 2, u.valToPos(to + 0.5, 'x', true) - left), height)
  }
  ctx.restore()
  ctx.save()
  ctx.strokeStyle = ink.ink
  ctx.lineWidth = ratio
  ctx.strokeRect(bbox.left + ratio / 2, top + ratio / 2, bbox.width - ratio, height - ratio)
  ctx.restore()
}

function seenStretches(laid: SeriesDays): [number, number][] {
  const stretches: [number, number][] = []
  laid.days.forEach((day, i) => {
    if (laid.usable[i] == null) return
    const last = stretches[stretches.length - 1]
    if (last && last[1] === day - 1) last[1] = day
    else stretches.push([day, day])
  })
  return stretches
}
