import { circularMean } from './circular-mean'
import { firstDayOf, isLeapYear, type EpochDay } from './local-day'
import { quantileOfSorted } from './quantile'

export const percentileColumns = ['p10', 'p25', 'p50', 'p75', 'p90', 'p95'] as const
export const smoothedColumns = [...percentileColumns, 'meanLog10', 'sdLog10'] as const
export type SmoothedColumn = (typeof smoothedColumns)[number]

/** What is usual on one date. Null: too few values to say. */
export type BaselineDay = Record<SmoothedColumn, number | null> & {
  /** Values pooled. */
  n: number
  /** Years that gave at least one of them. */
  years: number
}

/** 366 entries a column; entry i is slot i + 1 of a leap year (see `dayOfYear366`). */
export type SeasonalBaseline = Record<SmoothedColumn, (number | null)[]> & {
  dayOfYear: number[]
  n: number[]
  years: number[]
}

export interface BaselineInput {
  /** Epoch days in any order; a day may come more than once. */
  days: Int32Array
  /** One a day; NaN is missing or not usable. */
  values: Float64Array
  /** First and last calendar year that take part. */
  fromYear: number
  toYear: number
  /** Days taken on each side of a date. */
  halfWidthDays?: number | undefined
  /** Length of the running mean over the finished columns, odd; 1 leaves them as they are. */
  smoothingDays?: number | undefined
}

const slots = 366
const leapSlot = 60
const shareOf = { p10: 0.1, p25: 0.25, p50: 0.5, p75: 0.75, p90: 0.9, p95: 0.95 } as const

/** The usable values of the years asked for, by day, so that a run of days is a run of the list. */
class ByDay {
  private readonly first: EpochDay
  private readonly start: Int32Array
  private readonly ordered: Float64Array

  constructor({ days, values, fromYear, toYear }: BaselineInput) {
    this.first = firstDayOf(fromYear)
    const span = firstDayOf(toYear + 1) - this.first
    const taken = [...days.keys()].filter(
      (i) => Number.isFinite(values[i]) && days[i]! >= this.first && days[i]! < this.first + span,
    )
    taken.sort((a, b) => days[a]! - days[b]!)
    this.ordered = Float64Array.from(taken, (i) => values[i]!)
    this.start = new Int32Array(span + 1)
    for (const i of taken) this.start[days[i]! - this.first + 1]!++
    for (let i = 1; i <= span; i++) this.start[i]! += this.start[i - 1]!
  }

  /** Values of the days from..to, both included; days outside the years asked for have none. */
  between(from: EpochDay, to: EpochDay): Float64Array {
    const clip = (place: number) => Math.min(Math.max(place, 0), this.start.length - 1)
    return this.ordered.subarray(this.start[clip(from - this.first)], this.start[clip(to + 1 - this.first)])
  }
}

function dayFigures(pool: Float64Array, years: number): BaselineDay {
  pool.sort()
  const logs = pool.filter((value) => value > 0).map(Math.log10)
  const mean = logs.reduce((sum, log) => sum + log, 0) / logs.length
  const squares = logs.reduce((sum, log) => sum + (log - mean) ** 2, 0)
  const at = (column: keyof typeof shareOf) => quantileOfSorted(pool, shareOf[column], 7)
  return {
    p10: at('p10'),
    p25: at('p25'),
    p50: at('p50'),
    p75: at('p75'),
    p90: at('p90'),
    p95: at('p95'),
    meanLog10: logs.length > 0 ? mean : null,
    sdLog10: logs.length > 1 ? Math.sqrt(squares / (logs.length - 1)) : null,
    n: pool.length,
    years,
  }
}

function betweenNeighbours(before: BaselineDay, after: BaselineDay): BaselineDay {
  const day = { n: Math.min(before.n, after.n), years: Math.min(before.years, after.years) } as BaselineDay
  for (const column of smoothedColumns) {
    const [a, b] = [before[column], after[column]]
    day[column] = a === null || b === null ? null : (a + b) / 2
  }
  return day
}

function pooled(byDay: ByDay, slot: number, fromYear: number, toYear: number, halfWidth: number): BaselineDay {
  const windows: Float64Array[] = []
  for (let year = fromYear; year <= toYear; year++) {
    const centre = firstDayOf(year) + slot - (slot > leapSlot && !isLeapYear(year) ? 2 : 1)
    const values = byDay.between(centre - halfWidth, centre + halfWidth)
    if (values.length > 0) windows.push(values)
  }
  const pool = new Float64Array(windows.reduce((sum, values) => sum + values.length, 0))
  let end = 0
  for (const values of windows) {
    pool.set(values, end)
    end += values.length
  }
  return dayFigures(pool, windows.length)
}

/**
 * What is usual by time of year. For each date the values of the `halfWidthDays` days on each side are pooled over
 * the years, across New Year too as long as the day lies within fromYear..toYear; percentiles are type 7; meanLog10 and
 * sdLog10 (n - 1) take values above 0. 29 February is the mean of its neighbours (its n and years the smaller of
 * theirs); last comes a circular running mean, in which dates without a figure neither count nor gain one.
 * A date without values has nulls; sdLog10 needs two. Source: Hobday et al. 2016, Prog. Oceanogr. 141:227-238.
 * RangeError for lists of different lengths, a negative half width, or an even smoothing length.
 */
export function seasonalBaseline(input: BaselineInput): SeasonalBaseline {
  const { days, values, fromYear, toYear, halfWidthDays = 5, smoothingDays = 1 } = input
  if (days.length !== values.length) throw new RangeError('Days and values of a baseline have one length.')
  if (!(Number.isInteger(halfWidthDays) && halfWidthDays >= 0 && halfWidthDays < 183)) {
    throw new RangeError(`A half width is a whole number of days below 183, not ${halfWidthDays}.`)
  }
  const byDay = new ByDay(input)
  const table: BaselineDay[] = []
  for (let slot = 1; slot <= slots; slot++) table.push(pooled(byDay, slot, fromYear, toYear, halfWidthDays))
  table[leapSlot - 1] = betweenNeighbours(table[leapSlot - 2]!, table[leapSlot]!)
  const smoothed = (column: SmoothedColumn) => circularMean(table.map((day) => day[column]), smoothingDays)
  return {
    dayOfYear: table.map((_, i) => i + 1),
    p10: smoothed('p10'),
    p25: smoothed('p25'),
    p50: smoothed('p50'),
    p75: smoothed('p75'),
    p90: smoothed('p90'),
    p95: smoothed('p95'),
    meanLog10: smoothed('meanLog10'),
    sdLog10: smoothed('sdLog10'),
    n: table.map((day) => day.n),
    years: table.map((day) => day.years),
  }
}

/** One date of a baseline; `slot` 1..366, else RangeError. */
export function baselineDay(baseline: SeasonalBaseline, slot: number): BaselineDay {
  const n = baseline.n[slot - 1]
  if (n === undefined) throw new RangeError(`A year has slots 1 to 366, not ${slot}.`)
  const day = { n, years: baseline.years[slot - 1]! } as BaselineDay
  for (const column of smoothedColumns) day[column] = baseline[column][slot - 1]!
  return day
}
