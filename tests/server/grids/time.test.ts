import { describe, expect, it } from 'vitest'
import { calendarNamed, instantAfter } from '../../../server/grids/read/cf-calendar'
import { isClimatological, layerTimes } from '../../../server/grids/read/cf-time'
import { parseTimeUnits } from '../../../server/grids/read/cf-time-units'
import { coverageOf, parseInstant } from '../../../server/grids/read/coverage-time'
import { rawFile, rawVariable } from './raw-file'

const iso = (ms: number | null | undefined) => (ms == null ? null : new Date(ms).toISOString())

function instant(value: number, units: string, calendar = 'standard'): string | null {
  const parsed = parseTimeUnits(units)
  const named = calendarNamed(calendar)
  if (!parsed || !named) return null
  return iso(instantAfter(named, parsed.reference, parsed.referenceMs, Math.round(value * parsed.unitMs)))
}

/** Vectors printed in the CF conventions (4.4), as gathered in the project's reference values. */
describe('CF time', () => {
  it('gives the printed instant 1992-10-08 15:15:42.5', () => {
    expect(instant(1011.6359085648148, 'days since 1990-01-01')).toBe('1992-10-08T15:15:42.500Z')
  })

  it('takes an offset of -6 as six hours behind UTC', () => {
    expect(instant(0, 'days since 1992-10-08 09:15:42.5 -6')).toBe('1992-10-08T15:15:42.500Z')
    expect(instant(0, 'days since 1992-10-08 09:15:42.5-06')).toBe('1992-10-08T15:15:42.500Z')
  })

  it('reaches 29 February 2020 in the standard calendar and 1 March without leap days', () => {
    const units = 'days since 2020-02-28 23:10:00'
    expect(instant(1, units)).toBe('2020-02-29T23:10:00.000Z')
    expect(instant(1, units, 'noleap')).toBe('2020-03-01T23:10:00.000Z')
    expect(instant(1, units, '365_day')).toBe('2020-03-01T23:10:00.000Z')
  })

  it('names the same instant 1917-11-07 in the standard and 1917-10-25 in the Julian calendar', () => {
    expect(instant(0.5, 'days since 1917-10-25', 'julian')).toBe(instant(0.5, 'days since 1917-11-07'))
  })

  it('counts one day from 4 to 15 October 1582, and knows none between', () => {
    expect(instant(1, 'days since 1582-10-04')).toBe(instant(0, 'days since 1582-10-15'))
    expect(instant(0, 'days since 1582-10-10')).toBeNull()
    expect(instant(0, 'days since 1582-10-10', 'proleptic_gregorian')).toBe('1582-10-10T00:00:00.000Z')
  })

  it('puts a reference in year 1 two days apart in the mixed and the proleptic calendar', () => {
    expect(instant(738_000, 'days since 0001-01-01')).toBe('2021-07-28T00:00:00.000Z')
    expect(instant(738_000, 'days since 0001-01-01', 'proleptic_gregorian')).toBe('2021-07-30T00:00:00.000Z')
  })

  it('refuses dates that a calendar or the real year does not have', () => {
    expect(instant(0, 'days since 2025-02-29')).toBeNull()
    expect(instant(0, 'days since 2025-02-29', 'all_leap')).toBeNull()
    expect(instant(0, 'days since 2024-02-29', 'all_leap')).toBe('2024-02-29T00:00:00.000Z')
    expect(instant(0, 'days since 2025-01-31', '360_day')).toBeNull()
    expect(instant(59, 'days since 2025-01-01', '360_day')).toBeNull()
    expect(instant(60, 'days since 2025-01-01', '360_day')).toBe('2025-03-01T00:00:00.000Z')
  })

  it('counts leap seconds in utc, and turns tai into utc', () => {
    expect(instant(86_400, 'seconds since 2016-12-31', 'standard')).toBe('2017-01-01T00:00:00.000Z')
    expect(instant(86_399, 'seconds since 2016-12-31', 'utc')).toBe('2016-12-31T23:59:59.000Z')
    expect(instant(86_400.5, 'seconds since 2016-12-31', 'utc')).toBe('2016-12-31T23:59:59.999Z')
    expect(instant(86_401, 'seconds since 2016-12-31', 'utc')).toBe('2017-01-01T00:00:00.000Z')
    expect(instant(0, 'seconds since 2024-05-01 12:00:37', 'tai')).toBe('2024-05-01T12:00:00.000Z')
    // Satellite missions count from 1993, when TAI was 27 seconds ahead; in 2024 it was 37.
    expect(instant(988_675_210, 'seconds since 1993-01-01 00:00:27', 'tai')).toBe('2024-05-01T00:00:00.000Z')
    expect(instant(0, 'seconds since 1971-12-31', 'utc')).toBeNull()
    expect(instant(0, 'days since 1957-01-01', 'tai')).toBeNull()
  })

  it.each([
    ['seconds since 1970-01-01T00:00:00Z', 1000], ['sec since 1981-1-1 0:0:0', 1000], ['s since 1990-01-01', 1000],
    ['hours since 1900-01-01 00:00:0.0', 3_600_000], ['Days since 1950-01-01 00:00:00 UTC', 86_400_000],
    ['minutes since 2000-01-01 12', 60_000], ['msec since 2000-01-01', 1],
  ])('reads "%s"', (text, unitMs) => expect(parseTimeUnits(text)?.unitMs).toBe(unitMs))

  it.each(['months since 1990-01-01', 'years since 1990-01-01', 'days', 'days since launch', 'day of year'])(
    'does not rely on "%s"',
    (text) => expect(parseTimeUnits(text)).toBeNull(),
  )
})

const day = (text: string) => Date.parse(`${text}Z`)

function timesOf(values: number[], units: string, options: { bounds?: number[]; global?: Record<string, string> } = {}) {
  const axis = rawVariable('time', [['time', values.length]], { units, ...(options.bounds ? { bounds: 'b' } : {}) })
  const bounds = rawVariable('b', [['time', values.length], ['nv', 2]], {})
  const file = rawFile([axis, bounds], { time: values, b: options.bounds ?? [] }, options.global)
  return layerTimes(file, axis, 'chlor_a').map(({ observedAt, endsAt, hasClock, from }) => ({
    at: iso(observedAt), ends: iso(endsAt), hasClock, from,
  }))
}

describe('the times of layers', () => {
  it('are dates without a clock time when whole days are all the axis knows', () => {
    expect(timesOf([19844, 19845], 'days since 1970-01-01')).toMatchObject([
      { at: '2024-05-01T00:00:00.000Z', ends: null, hasClock: false },
      { at: '2024-05-02T00:00:00.000Z', ends: null, hasClock: false },
    ])
  })

  it('have a clock time when one step has a part of a day, and when midnight is counted in hours', () => {
    expect(timesOf([19844, 19844.5], 'days since 1970-01-01').map(({ hasClock }) => hasClock)).toEqual([true, true])
    expect(timesOf([0, 1], 'hours since 2024-05-01')[0]).toMatchObject({ at: '2024-05-01T00:00:00.000Z', hasClock: true })
  })

  it('are periods when bounds say so, and keep start and end', () => {
    expect(timesOf([19848], 'days since 1970-01-01', { bounds: [19844, 19852] })).toEqual([
      { at: '2024-05-01T00:00:00.000Z', ends: '2024-05-09T00:00:00.000Z', hasClock: false, from: 'time axis' },
    ])
  })

  it('are the date of the middle for a day that begins ten past and ends two hours late', () => {
    const global = { time_coverage_start: '2024-05-01T00:10:00.000Z', time_coverage_end: '2024-05-02T02:10:00.000Z' }
    expect(layerTimes(rawFile([], {}, global), null, 'chlor_a')).toEqual([
      { observedAt: day('2024-05-01T00:00'), endsAt: day('2024-05-02T02:10'), hasClock: false, from: 'global attribute' },
    ])
  })

  it('keep the clock time of a pass that took five minutes', () => {
    const global = { time_coverage_start: '20240501T104000Z', time_coverage_end: '20240501T104500Z' }
    expect(layerTimes(rawFile([], {}, global), null, 'chlor_a')[0]).toEqual({
      observedAt: day('2024-05-01T10:42:30'), endsAt: null, hasClock: true, from: 'global attribute',
    })
  })

  it('reach to the end of the last day when the file names it by date alone', () => {
    expect(coverageOf({ start_date: '2024-05-01', stop_date: '2024-05-08' })).toEqual({
      start: day('2024-05-01T00:00'), end: day('2024-05-09T00:00'), hasClock: false,
    })
  })

  it('are unknown when neither axis nor file tells', () => {
    expect(layerTimes(rawFile([], {}), null, 'chlor_a')).toEqual([
      { observedAt: null, endsAt: null, hasClock: false, from: 'none' },
    ])
  })

  it.each([
    ['missing values', () => timesOf([1, NaN], 'days since 1970-01-01'), 'unknown-time'],
    ['months', () => timesOf([1], 'months since 1970-01-01'), 'unknown-time'],
    ['a reference in year 0', () => timesOf([15], 'days since 0000-01-01'), 'climatology'],
    ['a step of twenty years', () => timesOf([1], 'days since 2000-01-01', { bounds: [0, 7305] }), 'climatology'],
  ])('are refused with %s', (_, read, code) => {
    expect(read).toThrow(expect.objectContaining({ code }))
  })

  it('know a climatology by its attribute and by its cell methods (CF 7.4)', () => {
    const axis = rawVariable('time', [['time', 4]], { climatology: 'climatology_bounds' })
    const methods = 'time: minimum within years time: mean over years'
    expect(isClimatological(rawVariable('chl', [], {}), axis)).toBe(true)
    expect(isClimatological(rawVariable('chl', [], { cell_methods: methods }), null)).toBe(true)
    expect(isClimatological(rawVariable('chl', [], { cell_methods: 'time: mean' }), null)).toBe(false)
  })
})

describe('an instant in an attribute', () => {
  it.each([
    ['2024-05-01T10:40:00Z', '2024-05-01T10:40:00.000Z', true], ['20240501T104000Z', '2024-05-01T10:40:00.000Z', true],
    ['2024-05-01 10:40:00+02:00', '2024-05-01T08:40:00.000Z', true], ['20240501', '2024-05-01T00:00:00.000Z', false],
    ['2024-05-01 UTC', '2024-05-01T00:00:00.000Z', false],
  ])('%s is understood', (text, wanted, hasClock) => {
    expect(iso(parseInstant(text)?.ms)).toBe(wanted)
    expect(parseInstant(text)?.hasClock).toBe(hasClock)
  })

  it.each(['2024-02-30', '2024-13-01', 'yesterday', '', '2024'])('"%s" is not', (text) => {
    expect(parseInstant(text)).toBeNull()
  })
})
