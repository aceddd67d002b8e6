import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { judgeView } from '../../../shared/science/judge-view'
import { defaultRule, type RuleDefinition, type RuleTest } from '../../../shared/science/rule'
import { usualDay, view } from './series'

const rule = defaultRule()
const state = (value: number, usual: number, more: Partial<RuleDefinition> = {}) =>
  judgeView(view(1, value), usualDay(usual), { ...rule, ...more }).state

describe('judging a view by the default rule', () => {
  it('twice usual, above the seasonal 90th percentile and above the floor is flagged', () => {
    expect(judgeView(view(7, 4), usualDay(1), rule)).toEqual({
      day: 7,
      state: 'flagged',
      value: 4,
      usual: 1,
      p10: 0.5,
      p90: 1.5,
      threshold: 2,
      timesUsual: 4,
    })
  })

  it('at least twice usual means twice is enough', () => {
    expect([state(2, 1), state(1.999, 1)]).toEqual(['flagged', 'unflagged'])
  })

  it('a level on the floor is not above it', () => {
    expect([state(1, 0.2), state(1.001, 0.2)]).toEqual(['unflagged', 'flagged'])
  })

  it('the threshold is the part of the rule that gives way last', () => {
    expect(judgeView(view(1, 3), usualDay(1, { p90: 3.5 }), rule)).toMatchObject({ state: 'unflagged', threshold: 3.5 })
    expect(judgeView(view(1, 3), usualDay(0.1), rule)).toMatchObject({ threshold: 1 })
    expect(judgeView(view(1, 3), usualDay(5), rule)).toMatchObject({ threshold: 10 })
  })

  it('a region under the coverage floor is not seen, however high its value', () => {
    const seen = (more: object) => judgeView(view(1, 50, more), usualDay(1), rule).state
    expect(seen({ coverage: 0.249 })).toBe('not-seen')
    expect(seen({ coverage: 0.25 })).toBe('flagged')
    expect(seen({ coverage: null })).toBe('not-seen')
    expect(seen({ wholeValid: 4 })).toBe('not-seen')
    expect(seen({ statistics: { median: null } })).toBe('not-seen')
  })

  it('a view not seen still says what would have been unusual', () => {
    const found = judgeView(view(1, 50, { coverage: 0, statistics: { median: null } }), usualDay(1), rule)
    expect(found).toMatchObject({ value: null, threshold: 2, usual: 1, timesUsual: null })
  })

  it('without a baseline, or one of too few years, it is not ready and never called usual', () => {
    expect(judgeView(view(1, 0.1), null, rule)).toMatchObject({ state: 'not-ready', usual: null, threshold: null })
    expect(judgeView(view(1, 50), usualDay(1, { years: 1 }), rule)).toMatchObject({ state: 'not-ready', p90: null })
    expect(judgeView(view(1, 50), usualDay(1, { p90: null }), rule).state).toBe('not-ready')
    expect(judgeView(view(1, 50), usualDay(1, { p50: 0 }), rule).state).toBe('not-ready')
  })
})

describe('other rules', () => {
  it('a level alone needs no baseline', () => {
    const level: RuleDefinition = { ...rule, test: { kind: 'above-level', level: 3 } }
    expect(judgeView(view(1, 3.1), null, level)).toMatchObject({ state: 'flagged', threshold: 3, timesUsual: null })
  })

  it('any part of "any" flags, from the lowest threshold on', () => {
    const test: RuleTest = { kind: 'any', of: [{ kind: 'above-level', level: 3 }, { kind: 'times-usual', atLeast: 2 }] }
    expect(judgeView(view(1, 3.5), usualDay(2), { ...rule, test })).toMatchObject({ state: 'flagged', threshold: 3 })
  })

  it('each percentile reads its own column', () => {
    const day = usualDay(1)
    for (const percentile of [10, 25, 50, 75, 90, 95] as const) {
      const found = judgeView(view(1, 9), day, { ...rule, test: { kind: 'above-percentile', percentile } })
      expect(found.threshold).toBe(day[`p${percentile}`])
    }
  })

  it('another statistic is judged by its own value', () => {
    const views = view(1, 0, { statistics: { median: 0.1, p90: 9 } })
    expect(judgeView(views, usualDay(1), { ...rule, statistic: 'p90' })).toMatchObject({ state: 'flagged', value: 9 })
  })

  it('a departure is a power of ten of usual, and its level is the geometric mean', () => {
    const departure: RuleDefinition = { ...rule, statistic: 'departure' }
    const usual = usualDay(1, { p10: -0.2, p50: 0.01, p90: 0.2 })
    const seen = (value: number, geometricMean: number) =>
      judgeView(view(1, 0, { statistics: { departure: value, geometricMean } }), usual, departure)
    expect(seen(0.31, 1.2)).toMatchObject({ state: 'flagged', usual: 0, threshold: Math.log10(2) })
    expect(seen(0.31, 0.9).state).toBe('unflagged')
    expect(seen(0.3, 5).state).toBe('unflagged')
    expect(seen(1, 5).timesUsual).toBe(10)
  })

  it('a test of no parts says nothing', () => {
    expect(state(50, 1, { test: { kind: 'all', of: [] } })).toBe('not-ready')
  })
})

describe('tightening', () => {
  const positive = fc.double({ min: 0.01, max: 50, noNaN: true })

  it('a view at its threshold or above flags, one below does not', () => {
    fc.assert(
      fc.property(positive, positive, positive, (value, usual, floor) => {
        const found = judgeView(view(1, value), usualDay(usual), defaultRule({ absoluteFloor: floor }))
        if (found.state === 'flagged') expect(value).toBeGreaterThanOrEqual(found.threshold!)
        else expect(value).toBeLessThanOrEqual(found.threshold!)
      }),
      { seed: 3 },
    )
  })

  it('a tighter rule never flags what a looser one leaves', () => {
    const share = fc.double({ min: 0, max: 1, noNaN: true })
    const tightness = fc.record({ floor: positive, times: positive, coverage: share })
    type Tightness = { floor: number; times: number; coverage: number }
    const ruleOf = ({ floor, times, coverage }: Tightness): RuleDefinition => ({
      ...rule,
      coverageFloor: coverage,
      test: { kind: 'all', of: [{ kind: 'above-level', level: floor }, { kind: 'times-usual', atLeast: times }] },
    })
    fc.assert(
      fc.property(positive, positive, share, tightness, tightness, (value, usual, coverage, a, b) => {
        const tight = ruleOf({
          floor: Math.max(a.floor, b.floor),
          times: Math.max(a.times, b.times),
          coverage: Math.max(a.coverage, b.coverage),
        })
        const seen = view(1, value, { coverage })
        if (judgeView(seen, usualDay(usual), tight).state !== 'flagged') return
        expect(judgeView(seen, usualDay(usual), ruleOf(a)).state).toBe('flagged')
      }),
      { seed: 5, numRuns: 500 },
    )
  })
})
