import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { compositeDay } from '../../../shared/science/composite-day'
import { dateOf } from '../../../shared/science/local-day'

const dayOf = (from: string, to: string) => dateOf(compositeDay(Date.parse(from), Date.parse(to)))

describe('a composite', () => {
  it('goes by the bin its middle lies in, however its ends are written', () => {
    expect(dayOf('2025-01-09', '2025-01-17')).toBe('2025-01-09')
    expect(dayOf('2025-01-09T00:00:00Z', '2025-01-16T23:59:59Z')).toBe('2025-01-09')
    expect(dayOf('2025-01-08T12:00:00Z', '2025-01-16T12:00:00Z')).toBe('2025-01-09')
    expect(dayOf('2025-02-01', '2025-03-01')).toBe('2025-02-01')
    expect(dayOf('2025-01-31T10:00:00Z', '2025-02-28T20:00:00Z')).toBe('2025-02-01')
    expect(dayOf('2025-06-10T00:00:00Z', '2025-06-11T00:00:00Z')).toBe('2025-06-10')
  })

  it('of a series without overlap has a view to itself; two in one bin overlap', () => {
    const dayMs = 86_400_000
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 40_000 }), fc.integer({ min: 1, max: 26 }), fc.integer({ min: 1, max: 60 }), (start, length, later) => {
        const day = compositeDay(start * dayMs, (start + length) * dayMs)
        const other = compositeDay((start + later) * dayMs, (start + later + length) * dayMs)
        if (later >= length) expect(other).toBeGreaterThan(day)
        if (other === day) expect(later).toBeLessThan(length)
      }),
    )
  })

  it('of a season or a year goes by its first date', () => {
    expect(dayOf('2025-03-01', '2025-06-01')).toBe('2025-03-01')
    expect(dayOf('2025-01-01', '2026-01-01')).toBe('2025-01-01')
  })

  it('cannot end before it begins', () => {
    expect(() => compositeDay(1, 0)).toThrow(RangeError)
  })
})
