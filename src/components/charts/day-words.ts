import { dateOf } from '../../../shared/science/local-day'
import { dayWithYear } from '../../lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { percent, threeDigits, timesUsual } from '../../lib/format'
import type { SeriesDays } from './series-days'

export interface DayWords {
  day: string
  /** Undefined where the water was not seen. */
  value?: string
  times?: string
  usual?: string
  rest: string
}

/** One day of a chart in words: what was measured, what is usual, how much was seen. */
export function dayWords(laid: SeriesDays, day: number, unit: string | null): DayWords {
  const i = day - (laid.days[0] ?? 0)
  const value = laid.usable[i] ?? laid.below[i] ?? null
  const usual = laid.usual[i] ?? null
  const coverage = laid.coverage[i] ?? null
  const words: DayWords = { day: dayWithYear(dateOf(day)), rest: 'not seen' }
  if (usual !== null) words.usual = usualWords(laid, i, usual)
  if (value === null) return coverage === null ? words : { ...words, rest: coverage > 0 ? `no figure, ${percent(coverage)} of the water seen` : 'not seen' }
  words.value = `${threeDigits(value)} ${unitWords(unit)}`.trim()
  if (usual !== null && usual > 0) words.times = `${timesUsual(value / usual)} times usual`
  words.rest = `${percent(coverage ?? 0)} seen${laid.usable[i] == null ? ', too little to judge' : ''}`
  return words
}

function usualWords(laid: SeriesDays, i: number, usual: number): string {
  const [p10, p90] = [laid.p10[i], laid.p90[i]]
  const band = p10 != null && p90 != null ? ` (${threeDigits(p10)} to ${threeDigits(p90)})` : ''
  return `usual ${threeDigits(usual)}${band}`
}
