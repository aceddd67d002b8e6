import { dateOf, firstDayOf, yearOf } from '../../../shared/science/local-day'

const months = ['Jan', 'Feb', 'Mar', 'Apr', 'May', 'Jun', 'Jul', 'Aug', 'Sep', 'Oct', 'Nov', 'Dec']

export interface TimeTick {
  day: number
  label: string
}

/** Ticks of a time axis in day numbers, with no more labels than there is room for. */
export function timeTicks(from: number, to: number, room: number): TimeTick[] {
  const days = to - from
  if (days > 900) return yearTicks(from, to, room)
  const starts = monthStarts(from, to)
  const every = Math.max(1, Math.ceil(starts.length / Math.max(2, room)))
  const ticks = starts.filter((start) => monthIndex(start) % every === 0).map((day) => ({ day, label: monthLabel(day) }))
  return starts.length * 2 <= room ? withMiddles(ticks, from, to) : ticks
}

function yearTicks(from: number, to: number, room: number): TimeTick[] {
  const first = yearOf(from) + 1
  const last = yearOf(to)
  const every = Math.max(1, Math.ceil((last - first + 1) / Math.max(2, room)))
  const ticks: TimeTick[] = []
  for (let year = first; year <= last; year += every) {
    ticks.push({ day: firstDayOf(year), label: String(year) })
  }
  return ticks
}

function monthStarts(from: number, to: number): number[] {
  const starts: number[] = []
  for (let day = from; day <= to; day += 1) if (dateOf(day).endsWith('-01')) starts.push(day)
  return starts
}

function monthIndex(day: number): number {
  return Number(dateOf(day).slice(5, 7)) - 1
}

function monthLabel(day: number): string {
  const index = monthIndex(day)
  return index === 0 ? `Jan ${yearOf(day)}` : (months[index] ?? '')
}

function withMiddles(ticks: TimeTick[], from: number, to: number): TimeTick[] {
  const middles: TimeTick[] = []
  for (let day = from; day <= to; day += 1) if (dateOf(day).endsWith('-15')) middles.push({ day, label: '15' })
  return [...ticks, ...middles].sort((a, b) => a.day - b.day)
}
