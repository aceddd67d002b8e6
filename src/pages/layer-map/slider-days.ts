import { addDays, daysBetween } from '../../lib/dates'

/** The days a slider shows at once: the calendar month of a day, or on a wide page the two months it falls in. */
export function daysAround(day: string, months: 1 | 2): string[] {
  const [year = 1970, month = 1] = day.split('-').map(Number)
  const first = months === 1 ? month : month - ((month - 1) % 2)
  const from = new Date(Date.UTC(year, first - 1, 1)).toISOString().slice(0, 10)
  const end = new Date(Date.UTC(year, first - 1 + months, 1)).toISOString().slice(0, 10)
  return Array.from({ length: daysBetween(from, end) }, (_, i) => addDays(from, i))
}

/** Keeps a day within the first and last of a feed. */
export function within(day: string, first: string, last: string): string {
  return day < first ? first : day > last ? last : day
}

const steps: Record<string, number> = { ArrowLeft: -1, ArrowDown: -1, ArrowRight: 1, ArrowUp: 1, PageUp: -28, PageDown: 28 }

/** Where a key leads from a day: an arrow a day, with shift a week, page keys four weeks, Home and End to the ends. */
export function dayByKey(key: string, shift: boolean, day: string, first: string, last: string): string | undefined {
  if (key === 'Home') return first
  if (key === 'End') return last
  const step = steps[key]
  if (step === undefined) return undefined
  return within(addDays(day, shift && Math.abs(step) === 1 ? step * 7 : step), first, last)
}
