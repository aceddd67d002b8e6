import { describe, expect, it } from 'vitest'
import { dateOf, dayOfYear366, epochDayOf, firstDayOf, localSolarDay, yearOf } from '../../../shared/science/local-day'

const at = (iso: string, lon: number) => dateOf(localSolarDay(Date.parse(iso), lon))

describe('local solar days', () => {
  it('at Greenwich the day is the UTC day', () => {
    expect(at('2024-06-01T23:59:59Z', 0)).toBe('2024-06-01')
  })

  it('far east the next day has begun, far west the last one still runs', () => {
    expect(at('2024-06-01T13:00:00Z', 175)).toBe('2024-06-02')
    expect(at('2024-06-01T11:00:00Z', -175)).toBe('2024-05-31')
  })

  it('noon passes fall on their own day everywhere', () => {
    for (let lon = -179; lon < 180; lon += 7) {
      const noon = Date.parse('2024-06-15T12:00:00Z') - (lon / 15) * 3_600_000
      expect(dateOf(localSolarDay(noon, lon))).toBe('2024-06-15')
    }
  })

  it('190 east and 170 west are one place', () => {
    expect(at('2024-06-01T11:00:00Z', 190)).toBe(at('2024-06-01T11:00:00Z', -170))
  })
})

describe('calendar', () => {
  it('days and dates convert both ways, before 1970 too', () => {
    expect(epochDayOf('1970-01-01')).toBe(0)
    const dates = ['1969-12-31', '2000-02-29', '2024-12-31', '1900-03-01']
    expect(dates.map((date) => dateOf(epochDayOf(date)))).toEqual(dates)
    expect(firstDayOf(2024)).toBe(epochDayOf('2024-01-01'))
    expect(yearOf(-1)).toBe(1969)
  })

  it('what is no date is refused', () => {
    for (const text of ['2023-02-29', '2024-2-1', 'today', '2024-13-01']) {
      expect(() => epochDayOf(text)).toThrow(/is not a date/)
    }
  })

  it('1 March has one slot in every year', () => {
    const slot = (date: string) => dayOfYear366(epochDayOf(date))
    expect([slot('2023-02-28'), slot('2024-02-29'), slot('2023-03-01'), slot('2024-03-01')]).toEqual([59, 60, 61, 61])
    expect([slot('2023-12-31'), slot('2024-12-31'), slot('2100-03-01')]).toEqual([366, 366, 61])
  })
})
