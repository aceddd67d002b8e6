import { describe, expect, test } from 'vitest'
import { epochDayOf } from '../../../shared/science/local-day'
import { logTicks, thinnedLogTicks } from '../../../src/components/charts/log-ticks'
import { movedRange, namedRange, nameOf, yearRange, yearsOf } from '../../../src/components/charts/shown-range'
import { timeTicks } from '../../../src/components/charts/time-ticks'

describe('the value axis', () => {
  test('goes by 1, 2, 5 and takes its ends outward', () => expect(logTicks(0.3, 6)).toEqual([0.2, 0.5, 1, 2, 5, 10]))

  test('ends at a value that is a tick itself', () => expect(logTicks(0.1, 10)).toEqual([0.1, 0.2, 0.5, 1, 2, 5, 10]))

  test('keeps the decades where there is little room', () => expect(thinnedLogTicks(logTicks(0.1, 10), 4)).toEqual([0.1, 1, 10]))
})

describe('the time axis', () => {
  const labels = (from: string, to: string, room: number) => timeTicks(epochDayOf(from), epochDayOf(to), room).map((tick) => tick.label)

  test('shows months, the year at each January', () => {
    expect(labels('2025-11-10', '2026-02-20', 5)).toEqual(['Dec', 'Jan 2026', 'Feb'])
  })

  test('adds the middle of months where there is room', () => {
    expect(labels('2026-04-10', '2026-06-11', 12)).toEqual(['15', 'May', '15', 'Jun'])
  })

  test('shows years over ten years, every second one on a phone', () => {
    expect(labels('2016-01-01', '2026-06-11', 12)).toEqual(['2017', '2018', '2019', '2020', '2021', '2022', '2023', '2024', '2025', '2026'])
    expect(labels('2016-01-01', '2026-06-11', 5)).toEqual(['2017', '2019', '2021', '2023', '2025'])
  })
})

describe('the days shown', () => {
  const span = { from: '2016-01-01', to: '2026-06-11' }

  test('are 120 or 365 days to the newest, or all', () => {
    expect(namedRange('days', span)).toEqual({ from: '2026-02-12', to: '2026-06-11' })
    expect(namedRange('year', span)).toEqual({ from: '2025-06-12', to: '2026-06-11' })
    expect(nameOf(span, span)).toBe('all')
  })

  test('never reach past what there is', () => {
    expect(yearRange(2026, span).to).toBe('2026-06-11')
    expect(namedRange('year', { from: '2026-06-01', to: '2026-06-11' }).from).toBe('2026-06-01')
    expect(movedRange({ from: '2016-01-10', to: '2016-02-10' }, span, -1)).toEqual({ from: '2016-01-01', to: '2016-02-01' })
    expect(movedRange({ from: '2026-05-01', to: '2026-05-31' }, span, 1)).toEqual({ from: '2026-05-12', to: '2026-06-11' })
  })

  test('offer the years newest first', () => expect(yearsOf(span).slice(0, 2)).toEqual([2026, 2025]))
})
