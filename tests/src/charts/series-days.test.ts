import { describe, expect, test } from 'vitest'
import type { Baseline, BloomEventItem, Series } from '../../../shared/schemas/series'
import { defaultRule } from '../../../shared/science/rule'
import { epochDayOf } from '../../../shared/science/local-day'
import { dayRows } from '../../../src/components/charts/day-rows'
import { dayWords } from '../../../src/components/charts/day-words'
import { eventSpans } from '../../../src/components/charts/event-spans'
import { joinedRuns } from '../../../src/components/charts/joined-runs'
import { nextIndex } from '../../../src/components/charts/next-index'
import { ruleThreshold } from '../../../src/components/charts/rule-threshold'
import { seriesDays } from '../../../src/components/charts/series-days'

const all = <T>(value: T): T[] => Array.from({ length: 366 }, () => value)
const slots = Array.from({ length: 366 }, (_, i) => i + 1)

function usual(change: Partial<Baseline['columns']> = {}): Baseline {
  return {
    regionId: 1, feedId: 1, version: 7, statistic: 'median', years: [2023, 2024, 2025], halfWidthDays: 5, smoothingDays: 1,
    columns: {
      dayOfYear: slots, p10: all(0.5), p25: all(0.8), p50: all(1.5), p75: all(2), p90: all(2.5), p95: all(2.8),
      meanLog10: all(0.1), sdLog10: all(0.2), n: all(33), years: all(3), ...change,
    },
  }
}

/** Seen on 1, 2 and 6 June; 4 June too little; no layer on 3 and 5 June. */
const series: Series = {
  regionId: 1, feedId: 1, unit: 'mg m-3',
  columns: {
    layerId: [1, 2, 4, 6],
    day: ['2026-06-01', '2026-06-02', '2026-06-04', '2026-06-06'],
    coverage: [0.8, 0.25, 0.1, 0.9],
    median: [1.2, 3.6, 9, 4.2],
  },
}
const event: BloomEventItem = {
  id: 5, regionId: 1, feedId: 1, ruleId: 1, ruleVersion: 1, phase: 'running', lastUnflaggedBefore: '2026-06-01', firstFlagged: '2026-06-02',
  lastFlagged: '2026-06-06', firstUnflaggedAfter: null, triggerDay: '2026-06-06', peakDay: '2026-06-06', peakValue: 4.2, peakTimesUsual: 2.8,
  severity: 'Minor', usableViews: 2, geometryVersion: 1, endedBecause: null, alertId: null,
}
const threshold = ruleThreshold(defaultRule(), usual())
const laid = seriesDays({ series, baseline: usual(), statistic: 'median', coverageFloor: 0.25, threshold, from: '2026-06-01', to: '2026-06-06' })

describe('a series laid out by day', () => {
  test('has every day of its span, and null where nothing was seen', () => {
    expect(laid.days).toHaveLength(6)
    expect(laid.usable).toEqual([1.2, 3.6, null, null, null, 4.2])
  })

  test('keeps a view below the coverage floor apart; one exactly at the floor is usable', () => {
    expect(laid.below).toEqual([null, null, null, 9, null, null])
  })

  test('takes what is usual from the date: 1 March is the same slot in a leap year and in another', () => {
    const p50 = all<number | null>(1)
    p50[60] = 7
    const parts = { series, statistic: 'median', coverageFloor: 0.25, threshold: null } as const
    for (const day of ['2024-03-01', '2025-03-01']) {
      expect(seriesDays({ ...parts, baseline: usual({ p50 }), from: day, to: day }).usual).toEqual([7])
    }
  })
})

describe('the line between views', () => {
  test('joins views no more than three days apart and breaks after that', () => {
    expect(joinedRuns([1, null, null, 2, null, null, null, 3])).toEqual([[0, 3], [7]])
  })

  test('is nothing where there is no view', () => expect(joinedRuns([null, null])).toEqual([]))
})

describe('the threshold', () => {
  test('is the highest of p90, times usual and floor, as the judge says', () => expect(threshold[151]).toBe(3))

  test('is missing where too little is usual to judge', () => {
    expect(ruleThreshold({ ...defaultRule(), minimumYears: 4 }, usual())[0]).toBeNull()
    expect(ruleThreshold(defaultRule(), null)[0]).toBeNull()
  })
})

describe('the table', () => {
  const rows = dayRows(laid, eventSpans([event]), epochDayOf('2026-06-01'), epochDayOf('2026-06-06'))

  test('says the days newest first with their states', () => {
    expect(rows.map((row) => [row.day.slice(-2), row.state])).toEqual([
      ['06', 'unusual'], ['05', 'not seen'], ['04', 'not seen'], ['03', 'not seen'], ['02', 'unusual'], ['01', 'usual'],
    ])
  })

  test('leaves the figures of a missing day missing, and gives a half-seen one its value', () => {
    expect(rows[1]).toMatchObject({ value: null, timesUsual: null, coverage: null })
    expect(rows[2]).toMatchObject({ value: 9, timesUsual: 6, coverage: 0.1 })
  })

  test('a value above the threshold outside an event is said as that', () => {
    expect(dayRows(laid, [], epochDayOf('2026-06-06'), epochDayOf('2026-06-06'))[0]?.state).toBe('above the threshold')
  })
})

describe('the readout', () => {
  test('tells value, times usual, what is usual and the share seen', () => {
    expect(dayWords(laid, epochDayOf('2026-06-06'), 'mg m-3')).toMatchObject({ day: '6 Jun 2026', times: '2.8 times usual', rest: '90 % seen' })
  })

  test('says a day without a layer is not seen, with no figure', () => {
    const words = dayWords(laid, epochDayOf('2026-06-03'), 'mg m-3')
    expect(words.rest).toBe('not seen')
    expect(words.value).toBeUndefined()
  })

  test('warns that a view below the floor is too little to judge', () => {
    expect(dayWords(laid, epochDayOf('2026-06-04'), 'mg m-3').rest).toBe('10 % seen, too little to judge')
  })
})

test('arrow keys go from view to view over the days not seen and stay at the ends', () => {
  const [from, to] = [epochDayOf('2026-06-01'), epochDayOf('2026-06-06')]
  expect(nextIndex('ArrowLeft', 5, laid, from, to)).toBe(3)
  expect(nextIndex('ArrowRight', 3, laid, from, to)).toBe(5)
  expect(nextIndex('ArrowRight', 5, laid, from, to)).toBe(5)
  expect(nextIndex('Home', 3, laid, from, to)).toBe(0)
  expect(nextIndex('a', 3, laid, from, to)).toBeNull()
})
