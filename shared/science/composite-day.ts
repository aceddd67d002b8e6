import { firstDayOf, yearOf, type EpochDay } from './local-day'

const dayMs = 86_400_000

/**
 * The day a composite's view goes by: the first day of the bin that holds the middle of its period (epoch milliseconds
 * UTC). Periods over 20 days go by calendar months; those over 4 by eights of days counted from 1 January, the last of
 * a year being shorter (common practice for ocean colour); shorter ones by their date. Composites that overlap by more
 * than half are one view, whichever came first. RangeError for a period that ends before it begins.
 */
export function compositeDay(startMs: number, endMs: number): EpochDay {
  if (!(endMs >= startMs)) throw new RangeError('A period ends after it begins.')
  const middle = Math.floor((startMs + endMs) / 2 / dayMs)
  const days = (endMs - startMs) / dayMs
  if (days > 20) {
    const date = new Date(middle * dayMs)
    return Date.UTC(date.getUTCFullYear(), date.getUTCMonth(), 1) / dayMs
  }
  if (days <= 4) return middle
  const newYear = firstDayOf(yearOf(middle))
  return newYear + 8 * Math.floor((middle - newYear) / 8)
}
