import type { CalendarDate } from './cf-calendar'
import { dayMs } from './cf-calendar'

/** "days since 1970-01-01 00:00:00" taken apart. Milliseconds count from midnight UTC of the reference date. */
export interface TimeUnits {
  unitMs: number
  unitIsDay: boolean
  reference: CalendarDate
  referenceMs: number
}

const units: [RegExp, number][] = [
  [/^(weeks?)$/, 7 * dayMs],
  [/^(days?|d)$/, dayMs],
  [/^(hours?|hrs?|h)$/, 3_600_000],
  [/^(minutes?|mins?)$/, 60_000],
  [/^(seconds?|secs?|s)$/, 1000],
  [/^(milliseconds?|millisecs?|msecs?|ms)$/, 1],
  [/^(microseconds?|microsecs?)$/, 1e-3],
  [/^(nanoseconds?|nanosecs?)$/, 1e-6],
]

const reference =
  /^([+-]?\d{1,4})-(\d{1,2})-(\d{1,2})(?:(?:\s+|t)(\d{1,2})(?::(\d{1,2})(?::(\d{1,2}(?:\.\d*)?))?)?)?\s*(z|utc|gmt|[+-]\d{1,2}(?::?\d{2})?)?$/

/** null when the text is no time unit, or one whose length varies (month, year): those are never relied on. */
export function parseTimeUnits(text: string): TimeUnits | null {
  const parts = /^\s*([a-z]+)\s+since\s+(.*?)\s*$/i.exec(text)
  if (!parts) return null
  const unitMs = units.find(([pattern]) => pattern.test(parts[1]!.toLowerCase()))?.[1]
  const match = reference.exec(parts[2]!.toLowerCase())
  if (unitMs === undefined || !match) return null
  const [hours, minutes, seconds] = [match[4], match[5], match[6]].map((part) => Number(part ?? 0))
  if (hours! > 24 || minutes! > 59 || seconds! >= 61) return null
  return {
    unitMs,
    unitIsDay: unitMs === dayMs,
    reference: { year: Number(match[1]), month: Number(match[2]), day: Number(match[3]) },
    referenceMs: hours! * 3_600_000 + minutes! * 60_000 + seconds! * 1000 - zoneMs(match[7]),
  }
}

function zoneMs(zone: string | undefined): number {
  const parts = zone === undefined ? null : /^([+-])(\d{1,2}):?(\d{2})?$/.exec(zone)
  if (!parts) return 0
  return (parts[1] === '-' ? -1 : 1) * (Number(parts[2]) * 60 + Number(parts[3] ?? 0)) * 60_000
}
