import type { LayerTime } from '../grid-source'
import { dayMs } from './cf-calendar'

export interface Coverage {
  start: number
  /** null when the attributes give no end. */
  end: number | null
  /** False when the start is a date without a clock time. */
  hasClock: boolean
}

const pairs: [string, string[]][] = [
  ['time_coverage_start', ['time_coverage_end']],
  ['start_time', ['stop_time', 'end_time']],
  ['start_date', ['stop_date', 'end_date']],
  ['period_start_day', ['period_end_day']],
]

/** The period that file-wide attributes name, UTC. A date alone as its end means the whole of that day. */
export function coverageOf(attributes: Record<string, unknown>): Coverage | null {
  for (const [startName, endNames] of pairs) {
    const start = parseInstant(attributes[startName])
    if (!start) continue
    const end = endNames.map((name) => parseInstant(attributes[name])).find((instant) => instant !== null) ?? null
    const endMs = end === null ? null : end.ms + (end.hasClock ? 0 : dayMs)
    return { start: start.ms, end: endMs !== null && endMs > start.ms ? endMs : null, hasClock: start.hasClock }
  }
  return null
}

/** ISO 8601 in its long and compact forms; without an offset it is UTC. */
export function parseInstant(value: unknown): { ms: number; hasClock: boolean } | null {
  if (typeof value !== 'string' && typeof value !== 'number') return null
  const text = String(value).trim()
  const match =
    /^(\d{4})-?(\d{2})-?(\d{2})(?:[t ]?(\d{2}):?(\d{2})(?::?(\d{2}(?:\.\d*)?))?)?\s*(z|utc|gmt|[+-]\d{2}(?::?\d{2})?)?$/i.exec(
      text,
    )
  if (!match) return null
  const [year, month, day, hour, minute] = match.slice(1, 6).map((part) => Number(part ?? 0))
  const midnight = Date.UTC(year!, month! - 1, day)
  const date = new Date(midnight)
  if (date.getUTCMonth() !== month! - 1 || date.getUTCDate() !== day || hour! > 24 || minute! > 59) return null
  const zone = /^([+-])(\d{2}):?(\d{2})?$/.exec(match[7] ?? '')
  const offsetMinutes = zone ? (zone[1] === '-' ? -1 : 1) * (Number(zone[2]) * 60 + Number(zone[3] ?? 0)) : 0
  const ms = midnight + (hour! * 60 + minute! - offsetMinutes) * 60_000 + Math.round(Number(match[6] ?? 0) * 1000)
  return { ms, hasClock: match[4] !== undefined }
}

const shortestDayMs = 20 * 3_600_000
const longestDayMs = 36 * 3_600_000

/**
 * A period as a layer's time. Under 20 hours it is an observation with a clock time; about a day is that day's date
 * (the date of its middle, since daily files often begin shortly before or end shortly after midnight); longer
 * periods are composites.
 */
export function periodTime(start: number, end: number, at: number | null, from: string): LayerTime {
  const length = end - start
  const middle = start + length / 2
  if (length < shortestDayMs) {
    return { observedAt: Math.round(at ?? middle), endsAt: null, hasClock: true, from }
  }
  if (length <= longestDayMs) {
    return { observedAt: Math.floor(middle / dayMs) * dayMs, endsAt: end, hasClock: false, from }
  }
  return { observedAt: start, endsAt: end, hasClock: false, from }
}
