import { logTicks } from './log-ticks'
import type { Figures, SeriesDays } from './series-days'

export type Scale = 'log10' | 'linear'

/** Ends of the value axis for the days shown: all that is drawn, taken outward to a tick. */
export function valueRange(laid: SeriesDays, from: number, to: number, scale: Scale): [number, number] {
  let min = Infinity
  let max = -Infinity
  const take = (column: Figures) => {
    for (let i = from; i <= to; i += 1) {
      const value = column[i]
      if (value == null || (scale === 'log10' && value <= 0)) continue
      if (value < min) min = value
      if (value > max) max = value
    }
  }
  for (const column of [laid.usable, laid.below, laid.p10, laid.p90, laid.threshold]) take(column)
  if (min > max) return scale === 'log10' ? [0.1, 10] : [0, 1]
  if (scale === 'linear') return linearEnds(min, max)
  const ticks = logTicks(min, Math.max(max, min * 1.01))
  return [ticks[0] ?? min, ticks[ticks.length - 1] ?? max]
}

function linearEnds(min: number, max: number): [number, number] {
  const pad = (max - min || Math.abs(max) || 1) * 0.08
  return [min - pad, max + pad]
}
