import type uPlot from 'uplot'
import type { ChartInk } from './chart-ink'
import type { EventSpan } from './event-spans'

/** The ground of events: ember tint, paler between the last usual view and the first flagged one. */
export function drawEvents(u: uPlot, spans: readonly EventSpan[], ink: ChartInk) {
  const { ctx, bbox } = u
  const lastDay = u.data[0][u.data[0].length - 1] ?? 0
  ctx.save()
  ctx.beginPath()
  ctx.rect(bbox.left, bbox.top, bbox.width, bbox.height)
  ctx.clip()
  ctx.fillStyle = ink.emberTint
  for (const span of spans) {
    const left = u.valToPos(span.first - 0.5, 'x', true)
    const right = u.valToPos((span.running ? lastDay : span.last) + 0.5, 'x', true)
    ctx.fillRect(left, bbox.top, Math.max(1, right - left), bbox.height)
    if (span.beganAfter >= span.first) continue
    const begin = u.valToPos(span.beganAfter + 0.5, 'x', true)
    ctx.globalAlpha = 0.5
    ctx.fillRect(begin, bbox.top, left - begin, bbox.height)
    ctx.globalAlpha = 1
  }
  ctx.restore()
}
