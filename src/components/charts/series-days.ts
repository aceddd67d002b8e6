import type { Baseline, Series } from '../../../shared/schemas/series'
import { dayOfYear366, epochDayOf } from '../../../shared/science/local-day'

export type Statistic = Baseline['statistic']
export type Figures = (number | null)[]

/** A series laid out on every day of its span; a day without a view is null in every column. */
export interface SeriesDays {
  days: number[]
  layerId: Figures
  coverage: Figures
  /** Views at or above the coverage floor. */
  usable: Figures
  /** Views below the floor: shown, never judged. */
  below: Figures
  p10: Figures
  usual: Figures
  p90: Figures
  threshold: Figures
}

export interface SeriesParts {
  series: Series
  baseline: Baseline | null
  statistic: Statistic
  coverageFloor: number
  /** By day of year, 366 long, as the baseline's columns. */
  threshold: Figures | null
  from: string
  to: string
}

export function seriesDays(parts: SeriesParts): SeriesDays {
  const first = epochDayOf(parts.from)
  const length = Math.max(1, epochDayOf(parts.to) - first + 1)
  const laid: SeriesDays = {
    days: Array.from({ length }, (_, i) => first + i),
    layerId: blank(length),
    coverage: blank(length),
    usable: blank(length),
    below: blank(length),
    p10: blank(length),
    usual: blank(length),
    p90: blank(length),
    threshold: blank(length),
  }
  layBaseline(laid, parts)
  layViews(laid, parts)
  return laid
}

function blank(length: number): Figures {
  return new Array<number | null>(length).fill(null)
}

function layBaseline(laid: SeriesDays, { baseline, threshold }: SeriesParts) {
  laid.days.forEach((day, i) => {
    const slot = dayOfYear366(day) - 1
    laid.p10[i] = baseline?.columns.p10[slot] ?? null
    laid.usual[i] = baseline?.columns.p50[slot] ?? null
    laid.p90[i] = baseline?.columns.p90[slot] ?? null
    laid.threshold[i] = threshold?.[slot] ?? null
  })
}

function layViews(laid: SeriesDays, { series, statistic, coverageFloor }: SeriesParts) {
  const first = laid.days[0] ?? 0
  const values = series.columns[statistic] ?? []
  series.columns.day?.forEach((day, row) => {
    const i = epochDayOf(day) - first
    if (i < 0 || i >= laid.days.length) return
    const coverage = series.columns.coverage?.[row] ?? null
    laid.layerId[i] = series.columns.layerId?.[row] ?? null
    laid.coverage[i] = coverage
    const into = (coverage ?? 0) >= coverageFloor ? laid.usable : laid.below
    into[i] = values[row] ?? null
  })
}
