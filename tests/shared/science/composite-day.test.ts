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
    expect(dayOf('2025-06-10', '2025-06-13')).toBe('2025-06-11')
  })

  it('of the last days of a year has the shorter bin to itself', () => {
    expect(dayOf('2025-12-27', '2026-01-01')).toBe('2025-12-27')
    expect(dayOf('2024-12-26', '2025-01-01')).toBe('2024-12-26')
  })

  it('of eight days lies in a bin that begins at most eight days before its middle', () => {
    fc.assert(
      fc.property(fc.integer({ min: 0, max: 40_000 }), fc.integer({ min: 5, max: 20 }), (start, length) => {
        const day = compositeDay(start * 86_400_000, (start + length) * 86_400_000)
        const middle = Math.floor(start + length / 2)
        expect(middle - day).toBeGreaterThanOrEqual(0)
        expect(middle - day).toBeLessThan(8)
      }),
    )
  })

  it('cannot end before it begins', () => {
    expect(() => compositeDay(1, 0)).toThrow(RangeError)
  })
})
