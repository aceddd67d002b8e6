import type { BloomEventItem } from '../../../shared/schemas/series'
import { epochDayOf } from '../../../shared/science/local-day'

/** An event on the time axis: the days it surely ran, and the days among which it may have begun. */
export interface EventSpan {
  id: number
  beganAfter: number
  first: number
  last: number
  running: boolean
}

export function eventSpans(events: readonly BloomEventItem[]): EventSpan[] {
  return events.map((event) => {
    const first = epochDayOf(event.firstFlagged)
    return {
      id: event.id,
      beganAfter: event.lastUnflaggedBefore ? epochDayOf(event.lastUnflaggedBefore) : first,
      first,
      last: epochDayOf(event.lastFlagged),
      running: event.phase === 'running',
    }
  })
}

export function isInEvent(spans: readonly EventSpan[], day: number): boolean {
  return spans.some((span) => day >= span.first && day <= span.last)
}
