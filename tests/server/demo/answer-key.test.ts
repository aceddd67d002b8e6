import { describe, expect, it } from 'vitest'
import { answerKey, lookAlikes } from '../../../server/seeders/demo/answer-key'
import { epochDay } from '../../../server/seeders/demo/days'
import { regions, scenarioDays } from '../../../server/seeders/demo/scenario'

describe('the answer key', () => {
  const key = answerKey()

  it('holds the past blooms of ten years, spread over the regions, and the two running now', () => {
    const blooms = key.filter(({ cause }) => cause === 'bloom')
    expect(blooms.length).toBeGreaterThanOrEqual(18)
    expect(new Set(blooms.map(({ region }) => region)).size).toBe(regions.length)
    const now = blooms.filter(({ to }) => to === scenarioDays.today).map(({ region }) => region)
    expect(now.sort()).toEqual(['mether', 'tarrow'])
    for (const { timesUsual } of blooms) expect(timesUsual).toBeGreaterThanOrEqual(2)
  })

  it('holds three chalky summers in Fennick Ground, each some weeks long', () => {
    const chalky = key.filter(({ cause }) => cause === 'chalky bloom')
    expect(chalky.map(({ region, from }) => [region, new Date(from * 86_400_000).getUTCFullYear()])).toEqual([
      ['fennick', 2019], ['fennick', 2022], ['fennick', 2025],
    ])
    for (const { from, to } of chalky) expect(to - from).toBeGreaterThan(10)
  })

  it('names the quiet region and the river only for their one or two true blooms', () => {
    expect(key.filter(({ region }) => region === 'hallin').length).toBe(1)
    expect(key.filter(({ region }) => region === 'corran').length).toBe(2)
  })

  it('keeps the plume apart: a few times a year, at the mouth only, never while a bloom of the key runs there', () => {
    const plumes = lookAlikes()
    expect(plumes.length / 10).toBeGreaterThan(2)
    expect(plumes.length / 10).toBeLessThan(5)
    expect(new Set(plumes.map(({ region }) => region))).toEqual(new Set(['corran']))
    const blooms = key.filter(({ region }) => region === 'corran')
    expect(plumes.some((plume) => blooms.some((bloom) => plume.from <= bloom.to && plume.to >= bloom.from))).toBe(false)
  })

  it('stops at the day asked for', () => {
    const last = epochDay('2020-01-01')
    expect(Math.max(...answerKey(last).map(({ to }) => to))).toBeLessThanOrEqual(last)
  })
})
