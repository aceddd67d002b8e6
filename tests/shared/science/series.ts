import { epochDayOf } from '../../../shared/science/local-day'
import type { BaselineDay } from '../../../shared/science/baseline'
import type { JudgeableView, JudgedView } from '../../../shared/science/rule'

/** A view in which everything was seen and every statistic has one value. */
export function view(day: number, value: number, more: Partial<JudgeableView> = {}): JudgeableView {
  const statistics = { median: value, geometricMean: value, mean: value, p90: value }
  return { day, observedAt: day * 86_400_000, coverage: 1, wholeValid: 20, statistics, ...more }
}

/** A day on which `p50` is usual, the other percentiles spread round it. */
export function usualDay(p50: number, more: Partial<BaselineDay> = {}): BaselineDay {
  const spread = { p10: p50 / 2, p25: p50 / 1.4, p50, p75: p50 * 1.2, p90: p50 * 1.5, p95: p50 * 1.8 }
  return { ...spread, meanLog10: Math.log10(p50), sdLog10: 0.2, n: 60, years: 6, ...more }
}

/**
 * Judged views from a drawing, one letter a day from day 0: F flagged, u unflagged, `.` not seen, `?` not ready, a
 * blank for no view. A flagged view has the value and times usual 4.
 */
export function judged(drawing: string): JudgedView[] {
  const states = { F: 'flagged', u: 'unflagged', '.': 'not-seen', '?': 'not-ready' } as const
  return [...drawing].flatMap((letter, day) => {
    if (!(letter in states)) return []
    const state = states[letter as keyof typeof states]
    const value = state === 'flagged' ? 4 : state === 'not-seen' ? null : 1
    return [{ day, state, value, usual: 1, p10: 0.5, p90: 1.5, threshold: 2, timesUsual: value }]
  })
}

/** Daily views of whole years, calm at 1 except where `change` says otherwise. */
export function years(from: number, to: number, change: Record<string, number> = {}): JudgeableView[] {
  const changed = new Map(Object.entries(change).map(([date, value]) => [epochDayOf(date), value]))
  const [first, last] = [epochDayOf(`${from}-01-01`), epochDayOf(`${to}-12-31`)]
  return Array.from({ length: last - first + 1 }, (_, i) => {
    const day = first + i
    return view(day, changed.get(day) ?? 1 + 0.2 * Math.sin(day * 1.7))
  })
}
