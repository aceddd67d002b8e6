import { addDays } from '../../lib/dates'

export interface DayRange {
  from: string
  to: string
}

export type RangeName = 'days' | 'year' | 'all'

export function namedRange(name: RangeName, span: DayRange): DayRange {
  if (name === 'all') return span
  const from = addDays(span.to, name === 'days' ? -119 : -364)
  return { from: from > span.from ? from : span.from, to: span.to }
}

/** The name of a range, if it has one: none after days were chosen by dragging or by year. */
export function nameOf(range: DayRange, span: DayRange): RangeName | undefined {
  const names: RangeName[] = ['days', 'year', 'all']
  return names.find((name) => {
    const named = namedRange(name, span)
    return named.from === range.from && named.to === range.to
  })
}

export function yearRange(year: number, span: DayRange): DayRange {
  const from = `${year}-01-01`
  const to = `${year}-12-31`
  return { from: from > span.from ? from : span.from, to: to < span.to ? to : span.to }
}

export function yearsOf(span: DayRange): number[] {
  const first = Number(span.from.slice(0, 4))
  const last = Number(span.to.slice(0, 4))
  return Array.from({ length: last - first + 1 }, (_, i) => last - i)
}

/** The range moved by its own length, kept inside the span. */
export function movedRange(range: DayRange, span: DayRange, direction: -1 | 1): DayRange {
  const length = lengthOf(range)
  const from = addDays(range.from, direction * length)
  if (from < span.from) return { from: span.from, to: min(addDays(span.from, length - 1), span.to) }
  const to = addDays(range.to, direction * length)
  if (to > span.to) return { from: max(addDays(span.to, 1 - length), span.from), to: span.to }
  return { from, to }
}

function lengthOf({ from, to }: DayRange): number {
  return Math.round((Date.parse(`${to}T00:00Z`) - Date.parse(`${from}T00:00Z`)) / 86_400_000) + 1
}

const min = (a: string, b: string) => (a < b ? a : b)
const max = (a: string, b: string) => (a > b ? a : b)
