import { baselineDay, seasonalBaseline, type SeasonalBaseline } from './baseline'
import { foldEvents, type BloomEvent } from './events'
import { isUsable, judgeView } from './judge-view'
import { dayOfYear366, yearOf, type EpochDay } from './local-day'
import type { JudgeableView, JudgedView, RuleDefinition } from './rule'

export interface JudgeInput {
  /** Every view of one region and feed, in any order. */
  views: readonly JudgeableView[]
  rule: RuleDefinition
  /** Views after it are not looked at. */
  today: EpochDay
  /** Each year is judged by the years before it. */
  baselineYears?: 'earlier'
  halfWidthDays?: number
  smoothingDays?: number
}

export interface UsedBaseline {
  fromYear: number
  toYear: number
  columns: SeasonalBaseline
}

export interface Judgement {
  /** By day. */
  judged: JudgedView[]
  events: BloomEvent[]
  /** What the year of `today` is judged by; null when no earlier year has a view. */
  baseline: UsedBaseline | null
}

/** Baselines of the years before each year, made when first asked for; only usable views take part. */
function earlierBaselines(views: readonly JudgeableView[], input: JudgeInput): (year: number) => UsedBaseline | null {
  const { rule, halfWidthDays, smoothingDays } = input
  const days = Int32Array.from(views, (view) => view.day)
  const values = Float64Array.from(views, (view) => (isUsable(view, rule) ? view.statistics[rule.statistic]! : NaN))
  const first = views[0]
  const made = new Map<number, UsedBaseline | null>()
  return (year) => {
    if (!made.has(year)) {
      const fromYear = first ? yearOf(first.day) : year
      const toYear = year - 1
      const years = { fromYear, toYear }
      const settings = { days, values, ...years, halfWidthDays, smoothingDays }
      const columns = toYear < fromYear ? null : seasonalBaseline(settings)
      made.set(year, columns && { ...years, columns })
    }
    return made.get(year) ?? null
  }
}

/**
 * Judges a whole series: every view against what was usual in the years before its own, then the events as of `today`.
 * Pure; the order of views does not matter. Dates whose baseline rests on fewer than the rule's `minimumYears` are
 * 'not-ready'. Missing figures are null (see `judgeView`).
 */
export function judgeSeries(input: JudgeInput): Judgement {
  const { rule, today } = input
  const views = input.views.filter((view) => view.day <= today).sort((a, b) => a.day - b.day)
  const baselineOf = earlierBaselines(views, input)
  const judged = views.map((view) => {
    const used = baselineOf(yearOf(view.day))
    return judgeView(view, used && baselineDay(used.columns, dayOfYear366(view.day)), rule)
  })
  return { judged, events: foldEvents(judged, rule, today), baseline: baselineOf(yearOf(today)) }
}
