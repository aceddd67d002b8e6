import { localSolarDay } from '../../shared/science/local-day'

const dayMs = 86_400_000

/** The day a layer's view belongs to: the local solar day of its instant; where there is no clock time, or a period, its date. */
export function viewDay(layer: { observedAt: number; endsAt: number | null; hasClock: boolean | number }, longitude: number): number {
  if (layer.endsAt !== null || !layer.hasClock) return Math.floor(layer.observedAt / dayMs)
  return localSolarDay(layer.observedAt, longitude)
}
