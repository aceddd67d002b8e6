import { compositeDay } from '../../shared/science/composite-day'
import { localSolarDay } from '../../shared/science/local-day'

const dayMs = 86_400_000

/** The day a layer's view belongs to: the local solar day of its instant, its date where there is no clock time, or of a composite the first day of its bin. */
export function viewDay(layer: { observedAt: number; endsAt: number | null; hasClock: boolean | number }, longitude: number): number {
  if (layer.endsAt !== null) return compositeDay(layer.observedAt, layer.endsAt)
  return layer.hasClock ? localSolarDay(layer.observedAt, longitude) : Math.floor(layer.observedAt / dayMs)
}

/** Layers of views on these days were observed between these instants: days begin elsewhere earlier, composites up to a month before or after. */
export function layersOfDays(days: readonly number[]): { from: number; to: number } {
  const [first, last] = days.reduce(([low, high], day) => [Math.min(low, day), Math.max(high, day)], [Infinity, -Infinity])
  return { from: (first - 31) * dayMs, to: (last + 32) * dayMs }
}
