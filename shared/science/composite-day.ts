import { firstDayOf, yearOf, type EpochDay } from './local-day'

const dayMs = 86_400_000

/**
 * The day a composite's view goes by: the first day of the bin that holds the middle of its period (epoch milliseconds
 * UTC). Bins are as long as the composite, in whole days, counted from 1 January, the last of a year being shorter (common
 * practice for 8-day composites); calendar months for 27 to 32 days. Two composites of one length in one bin always overlap,
 * and of a series without overlap each has its own. Over 45 days a composite goes by its first date. RangeError for a period that
 * ends before it begins.
 */
export function compositeDay(startMs: number, endMs: number): EpochDay {
  if (!(endMs >= startMs)) throw new RangeError('A period ends after it begins.')
  const middle = Math.floor((startMs + endMs) / 2 / dayMs)
  const days = Math.max(1, Math.round((endMs - startMs) / dayMs))
  if (days > 45) return Math.floor(startMs / dayMs)
  if (days >= 27 && days <= 32) {
    const date = new Date(middle * dayMs)
    return Date.UTC(date.getUTCFullYear(), date.getUTCMonth(), 1) / dayMs
  }
  const newYear = firstDayOf(yearOf(middle))
  return newYear + days * Math.floor((middle - newYear) / days)
}
