import { taiAheadOfUtc, utcFromTai } from './leap-seconds'

/** A date as a calendar writes it; month and day from 1. */
export interface CalendarDate {
  year: number
  month: number
  day: number
}

export type Calendar = 'standard' | 'proleptic_gregorian' | 'julian' | 'noleap' | 'all_leap' | '360_day' | 'utc' | 'tai'

const aliases: Record<string, Calendar> = {
  standard: 'standard', gregorian: 'standard', proleptic_gregorian: 'proleptic_gregorian', julian: 'julian',
  noleap: 'noleap', '365_day': 'noleap', all_leap: 'all_leap', '366_day': 'all_leap', '360_day': '360_day',
  utc: 'utc', tai: 'tai',
}

export const dayMs = 86_400_000

export function calendarNamed(name: string | null): Calendar | null {
  return name === null ? 'standard' : (aliases[name.trim().toLowerCase()] ?? null)
}

/**
 * The instant `elapsedMs` after a reference in a calendar, as epoch milliseconds.
 * standard, julian and proleptic_gregorian count real days; utc counts leap seconds too, and tai is the clock without
 * them, turned into UTC; the others count days of their own and the date they arrive at is taken as the date it names.
 * null when a date does not exist (5 October 1582 in standard, 30 February of a 360-day year on the real calendar, UTC
 * before 1972). Source: CF conventions 4.4.1.
 */
export function instantAfter(
  calendar: Calendar,
  reference: CalendarDate,
  referenceMs: number,
  elapsedMs: number,
): number | null {
  const ms = referenceMs + elapsedMs
  const days = Math.floor(ms / dayMs)
  const rest = ms - days * dayMs
  if (calendar === 'noleap' || calendar === 'all_leap' || calendar === '360_day') {
    const first = ownDayNumber(calendar, reference)
    if (first === null) return null
    const date = ownDate(calendar, first + days)
    const realDay = gregorianDay(date)
    return realDay === null ? null : realDay * dayMs + rest
  }
  if (calendar === 'utc' || calendar === 'tai') return atomic(calendar, reference, referenceMs, elapsedMs)
  const first = realDay(calendar, reference)
  return first === null ? null : (first + days) * dayMs + rest
}

function atomic(calendar: 'utc' | 'tai', reference: CalendarDate, referenceMs: number, elapsedMs: number): number | null {
  const first = gregorianDay(reference)
  if (first === null) return null
  const start = first * dayMs + referenceMs
  if (calendar === 'tai') return utcFromTai(start + elapsedMs)
  const ahead = taiAheadOfUtc(start)
  return ahead === null ? null : utcFromTai(start + 1000 * ahead + elapsedMs)
}

function realDay(calendar: Calendar, date: CalendarDate): number | null {
  if (calendar === 'proleptic_gregorian') return gregorianDay(date)
  if (calendar === 'julian') return julianDay(date)
  const order = date.year * 10_000 + date.month * 100 + date.day
  if (order >= 1582_10_15) return gregorianDay(date)
  return order <= 1582_10_04 ? julianDay(date) : null
}

/** Days since 1970-01-01 of a date of the Gregorian calendar. */
function gregorianDay({ year, month, day }: CalendarDate): number | null {
  const date = new Date(0)
  date.setUTCFullYear(year, month - 1, day)
  const same = date.getUTCFullYear() === year && date.getUTCMonth() === month - 1 && date.getUTCDate() === day
  return same ? date.getTime() / dayMs : null
}

/** Days since 1970-01-01 (Gregorian) of a date of the Julian calendar, by the usual day-number formula. */
function julianDay({ year, month, day }: CalendarDate): number | null {
  const leap = year % 4 === 0
  if (month < 1 || month > 12 || day < 1 || day > monthLengths(leap)[month - 1]!) return null
  const shift = Math.floor((14 - month) / 12)
  const y = year + 4800 - shift
  const m = month + 12 * shift - 3
  const dayNumber = day + Math.floor((153 * m + 2) / 5) + 365 * y + Math.floor(y / 4) - 32083
  return dayNumber - 2_440_588
}

function monthLengths(leap: boolean): number[] {
  return [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]
}

type OwnCalendar = 'noleap' | 'all_leap' | '360_day'

function ownLengths(calendar: OwnCalendar): number[] {
  return calendar === '360_day' ? Array<number>(12).fill(30) : monthLengths(calendar === 'all_leap')
}

function ownDayNumber(calendar: OwnCalendar, { year, month, day }: CalendarDate): number | null {
  const lengths = ownLengths(calendar)
  if (month < 1 || month > 12 || day < 1 || day > lengths[month - 1]!) return null
  const sum = (months: number[]) => months.reduce((total, length) => total + length, 0)
  return year * sum(lengths) + sum(lengths.slice(0, month - 1)) + day - 1
}

function ownDate(calendar: OwnCalendar, dayNumber: number): CalendarDate {
  const lengths = ownLengths(calendar)
  const yearLength = lengths.reduce((total, length) => total + length, 0)
  const year = Math.floor(dayNumber / yearLength)
  let rest = dayNumber - year * yearLength
  let month = 0
  while (rest >= lengths[month]!) rest -= lengths[month++]!
  return { year, month: month + 1, day: rest + 1 }
}
