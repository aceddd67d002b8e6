import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judgeSeries } from '../../../shared/science/judge'
import { epochDayOf } from '../../../shared/science/local-day'
import { defaultRule } from '../../../shared/science/rule'
import { view, years } from './series'

const rule = defaultRule({ absoluteFloor: 0.5 })
const bloom = { '2023-06-10': 4, '2023-06-11': 9, '2023-06-12': 5 }
const views = years(2018, 2023, bloom)
const today = epochDayOf('2023-12-31')

describe('judging a series', () => {
  it('years without two years before them are not ready, later ones are judged', () => {
    const { judged } = judgeSeries({ views, rule, today })
    const statesOf = (from: string, to: string) => {
      const within = judged.filter(({ day }) => day >= epochDayOf(from) && day <= epochDayOf(to))
      return [...new Set(within.map(({ state }) => state))]
    }
    expect(statesOf('2018-01-01', '2019-12-31')).toEqual(['not-ready'])
    expect(statesOf('2020-01-01', '2022-12-31')).toEqual(['unflagged'])
  })

  it('a bloom becomes one event with its days and its peak', () => {
    const { events } = judgeSeries({ views, rule, today, baselineYears: 'earlier' })
    expect(events).toHaveLength(1)
    expect(events[0]).toMatchObject({
      phase: 'ended',
      firstFlagged: epochDayOf('2023-06-10'),
      triggerDay: epochDayOf('2023-06-11'),
      peakDay: epochDayOf('2023-06-11'),
      peakValue: 9,
      lastFlagged: epochDayOf('2023-06-12'),
    })
  })

  it('a bloom is judged by earlier years and never by itself', () => {
    const { baseline, judged } = judgeSeries({ views, rule, today })
    expect(baseline).toMatchObject({ fromYear: 2018, toYear: 2022 })
    expect(judged.find(({ day }) => day === epochDayOf('2023-06-11'))!.usual).toBeLessThan(1.3)
    const next = judgeSeries({ views: [...views, ...years(2024, 2024)], rule, today: epochDayOf('2024-06-01') })
    expect(next.baseline!.columns.p95[161]).toBeGreaterThan(baseline!.columns.p95[161]!)
  })

  it('on New Year the baseline takes in the year just over, before its first view', () => {
    expect(judgeSeries({ views, rule, today: epochDayOf('2024-01-01') }).baseline).toMatchObject({ toYear: 2023 })
  })

  it('views that are not usable stay out of what is usual', () => {
    const cloudy = views.map((item) => (item.day % 2 ? view(item.day, 500, { coverage: 0.1 }) : item))
    const { baseline } = judgeSeries({ views: cloudy, rule, today })
    expect(Math.max(...baseline!.columns.p95.map((value) => value ?? 0))).toBeLessThan(1.3)
  })

  it('no views make no events and no baseline', () => {
    expect(judgeSeries({ views: [], rule, today })).toEqual({ judged: [], events: [], baseline: null })
  })

  it('any order of arrival gives the same judgement', () => {
    const blooming = { '2022-03-01': 7, '2022-03-02': 6, '2022-03-03': 8 }
    const few = years(2018, 2022, blooming).filter(({ day }) => day % 3 > 0)
    const expected = judgeSeries({ views: few, rule, today })
    expect(expected.events).toHaveLength(1)
    fc.assert(
      fc.property(fc.nat(), (turn) => {
        const cut = turn % few.length
        const turned = [...few.slice(cut), ...few.slice(0, cut).reverse()]
        expect(judgeSeries({ views: turned, rule, today })).toEqual(expected)
      }),
      { seed: 21, numRuns: 10 },
    )
  })

  it('what is known later changes nothing that was judged before', () => {
    const middle = epochDayOf('2022-07-01')
    const then = judgeSeries({ views: views.filter(({ day }) => day <= middle), rule, today: middle })
    const now = judgeSeries({ views, rule, today: middle })
    expect(now).toEqual(then)
  })
})
