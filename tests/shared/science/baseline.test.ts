import { describe, expect, it } from 'vitest'
import { baselineDay, seasonalBaseline } from '../../../shared/science/baseline'
import { circularMean } from '../../../shared/science/circular-mean'
import { dayOfYear366, epochDayOf } from '../../../shared/science/local-day'

function baselineOf(entries: [string, number][], fromYear: number, toYear: number, more = {}) {
  const days = Int32Array.from(entries, ([date]) => epochDayOf(date))
  const values = Float64Array.from(entries, ([, value]) => value)
  return seasonalBaseline({ days, values, fromYear, toYear, ...more })
}

const on = (baseline: ReturnType<typeof baselineOf>, date: string) =>
  baselineDay(baseline, dayOfYear366(epochDayOf(date)))

describe('what is usual', () => {
  it('pools the days round a date over the years', () => {
    const seen: [string, number][] = [['2020-06-10', 1], ['2021-06-12', 2], ['2022-06-14', 6], ['2022-06-16', 99]]
    const baseline = baselineOf(seen, 2020, 2022)
    expect(on(baseline, '2023-06-10')).toMatchObject({ p50: 2, n: 3, years: 3 })
    expect(on(baseline, '2023-06-15')).toMatchObject({ p50: 4, n: 4, years: 3 })
  })

  it('a date without values has no figures', () => {
    const baseline = baselineOf([['2020-06-10', 1]], 2020, 2022)
    const nothing = { p10: null, p50: null, p95: null, meanLog10: null, sdLog10: null, n: 0, years: 0 }
    expect(on(baseline, '2023-01-10')).toMatchObject(nothing)
    expect(baseline.dayOfYear).toHaveLength(366)
  })

  it('missing values and other years take no part', () => {
    const seen: [string, number][] = [['2020-06-10', NaN], ['2019-06-10', 5], ['2023-06-10', 7], ['2021-06-10', 3]]
    const baseline = baselineOf(seen, 2020, 2022)
    expect(on(baseline, '2023-06-10')).toMatchObject({ p50: 3, n: 1, years: 1, sdLog10: null })
  })

  it('reaches across New Year, within its years only', () => {
    const seen: [string, number][] = [['2019-12-30', 50], ['2020-12-30', 2], ['2021-01-02', 4], ['2022-01-01', 90]]
    const baseline = baselineOf(seen, 2020, 2021)
    expect(on(baseline, '2023-01-01')).toMatchObject({ n: 2, p50: 3, years: 1 })
    expect(on(baseline, '2023-12-31')).toMatchObject({ n: 2, p50: 3, years: 1 })
  })

  it('29 February lies between its neighbours, and its own values count for them', () => {
    const seen: [string, number][] = [['2020-02-28', 1], ['2020-02-29', 2], ['2020-03-01', 6]]
    const baseline = baselineOf(seen, 2020, 2020, { halfWidthDays: 0 })
    expect(on(baseline, '2024-02-29')).toMatchObject({ p50: 3.5, n: 1 })
    const wider = baselineOf([['2020-02-29', 2]], 2020, 2020, { halfWidthDays: 1 })
    expect(on(wider, '2023-02-28').n).toBe(1)
    expect(on(wider, '2023-03-01').n).toBe(1)
  })

  it('log10 figures take values above 0 and say sd with n - 1', () => {
    const five: [string, number][] = [0.5, 1, 2, 4, 8].map((value, i) => [`202${i}-06-10`, value])
    const day = on(baselineOf([...five, ['2025-06-10', 0]], 2020, 2025), '2026-06-10')
    expect(10 ** day.meanLog10!).toBeCloseTo(2, 12)
    expect(day.sdLog10).toBeCloseTo(0.4759702, 6)
    expect(day.n).toBe(6)
  })

  it('the order of the days does not matter', () => {
    const entries: [string, number][] = [['2020-06-10', 1], ['2021-06-12', 2], ['2020-06-08', 6], ['2021-01-01', 9]]
    expect(baselineOf([...entries].reverse(), 2020, 2021)).toEqual(baselineOf(entries, 2020, 2021))
  })

  it('no years give no figures rather than a fault', () => {
    expect(baselineOf([['2020-06-10', 1]], 2021, 2020).n.every((n) => n === 0)).toBe(true)
  })

  it('settings that make no sense are refused', () => {
    expect(() => baselineOf([], 2020, 2021, { smoothingDays: 2 })).toThrow(/odd number/)
    expect(() => baselineOf([], 2020, 2021, { halfWidthDays: -1 })).toThrow(/half width/)
    expect(() => baselineDay(baselineOf([], 2020, 2021), 0)).toThrow(/1 to 366/)
  })

  it('ten years of daily values give each date its eleven days of ten years', () => {
    const first = epochDayOf('2014-01-01')
    const days = Int32Array.from({ length: 3652 }, (_, i) => first + i)
    const values = Float64Array.from(days, (day) => 1 + ((day * 7919) % 997) / 997)
    expect(seasonalBaseline({ days, values, fromYear: 2014, toYear: 2023 }).n[100]).toBe(110)
  })
})

describe('the running mean round the year', () => {
  it('goes round the ends', () => {
    expect(circularMean([3, 6, 9, 0], 3)).toEqual([3, 6, 5, 4])
  })

  it('missing dates neither count nor gain a figure', () => {
    expect(circularMean([3, null, 9, 0], 3)).toEqual([1.5, null, 4.5, 4])
  })
})
