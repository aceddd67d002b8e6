import type { SeriesDays } from './series-days'

/** The day a key leads to: arrows by seen day, with Home and End; null where the key means nothing here. */
export function nextIndex(key: string, index: number | null, laid: SeriesDays, from: number, to: number): number | null {
  const first = laid.days[0] ?? 0
  const low = Math.max(0, from - first)
  const high = Math.min(laid.days.length - 1, to - first)
  if (key === 'Home') return low
  if (key === 'End') return high
  if (key !== 'ArrowLeft' && key !== 'ArrowRight') return null
  const step = key === 'ArrowLeft' ? -1 : 1
  let next = (index ?? high + 1) + step
  if (index === null && step === 1) next = low
  while (next >= low && next <= high) {
    if (laid.usable[next] != null || laid.below[next] != null) return next
    next += step
  }
  return index
}
