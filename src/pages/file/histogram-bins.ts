import { ticksOf, type Tick } from '../../../shared/colouring'
import type { FoundHistogram } from '../../../shared/schemas/found'

export interface Bin {
  from: number
  to: number
  cells: number
}

/** The bins of a histogram by their edges, lowest first. */
export function binsOf({ scale, step, firstBin, counts }: FoundHistogram): Bin[] {
  // Edges by their whole number: 0.1 * 3 is not 0.3, and a twentieth of a decade has no short form.
  const edge = (at: number) => (scale === 'log10' ? Number((10 ** (at / Math.round(1 / step))).toPrecision(6)) : Number((at * step).toPrecision(12)))
  return counts.map((cells, i) => ({ from: edge(firstBin + i), to: edge(firstBin + i + 1), cells }))
}

/** Where a value stands along the histogram, 0..1. */
export function shareAlong({ scale, step, firstBin, counts }: FoundHistogram, value: number): number {
  const place = scale === 'log10' ? Math.log10(value) / step : value / step
  return Math.min(Math.max((place - firstBin) / counts.length, 0), 1)
}

export function axisTicks(histogram: FoundHistogram): Tick[] {
  const bins = binsOf(histogram)
  const [from, to] = [bins[0]?.from, bins.at(-1)?.to]
  if (from === undefined || to === undefined) return []
  return ticksOf({ ramp: 'sea', scale: histogram.scale === 'log10' ? 'log' : 'linear', from, to, rangeFrom: 'layer' })
}
