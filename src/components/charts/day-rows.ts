import { dateOf } from '../../../shared/science/local-day'
import { type EventSpan, isInEvent } from './event-spans'
import type { SeriesDays } from './series-days'

export type DayState = 'unusual' | 'above the threshold' | 'usual' | 'not ready' | 'not seen'

export interface DayRow {
  day: string
  value: number | null
  timesUsual: number | null
  coverage: number | null
  layerId: number | null
  state: DayState
}

/** The days shown, newest first, as a table says them. */
export function dayRows(laid: SeriesDays, spans: readonly EventSpan[], from: number, to: number): DayRow[] {
  const first = laid.days[0] ?? 0
  const rows: DayRow[] = []
  const last = Math.min(to - first, laid.days.length - 1)
  for (let i = last; i >= Math.max(0, from - first); i -= 1) rows.push(dayRow(laid, spans, i))
  return rows
}

function dayRow(laid: SeriesDays, spans: readonly EventSpan[], i: number): DayRow {
  const day = laid.days[i] ?? 0
  const value = laid.usable[i] ?? laid.below[i] ?? null
  const usual = laid.usual[i] ?? null
  return {
    day: dateOf(day),
    value,
    timesUsual: value !== null && usual !== null && usual > 0 ? value / usual : null,
    coverage: laid.coverage[i] ?? null,
    layerId: laid.layerId[i] ?? null,
    state: stateOf(laid, spans, i, day),
  }
}

function stateOf(laid: SeriesDays, spans: readonly EventSpan[], i: number, day: number): DayState {
  const value = laid.usable[i]
  if (value == null) return 'not seen'
  const threshold = laid.threshold[i]
  const flagged = threshold != null && value > threshold
  if (flagged) return isInEvent(spans, day) ? 'unusual' : 'above the threshold'
  return laid.usual[i] == null ? 'not ready' : 'usual'
}
