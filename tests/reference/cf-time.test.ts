import { readFileSync } from 'node:fs'
import { describe, expect, it } from 'vitest'
import { calendarNamed, instantAfter } from '../../server/grids/read/cf-calendar'
import { packingOf, unpackInPlace } from '../../server/grids/read/cf-packing'
import { cfSource } from '../../server/grids/read/cf-source'
import { parseTimeUnits } from '../../server/grids/read/cf-time-units'
import { rawFile, rawVariable } from '../server/grids/raw-file'

interface Climatology {
  units: string
  time: number[]
  bounds: number[][]
  cell_methods?: string
}

const cf = JSON.parse(readFileSync(new URL('./values/cf-conventions.json', import.meta.url).pathname, 'utf8')) as {
  time: [
    { units: string; datetime: string; value: number }, { equal: string[] },
    { units: string; value: number; standard: string; noleap: string }, { same_instant: { standard: string; julian: string } },
    { interval: [string, string]; days: number }, { utc: string; tai: string; leap_seconds_1972_to_2026: number },
  ]
  climatology_7_9: Climatology
  climatology_7_10: Climatology
  packing: { scale: number; offset: number; fill?: number; valid?: [number, number]; check: { packed: number; value: number }[] }[]
}

function at(value: number, units: string, calendar: string): number {
  const { unitMs, reference, referenceMs } = parseTimeUnits(units)!
  return instantAfter(calendarNamed(calendar)!, reference, referenceMs, Math.round(value * unitMs))!
}

const since = (date: string, calendar: string) => at(0, `days since ${date}`, calendar)

describe('times as the CF conventions print them', () => {
  const [printed, offset, leapDay, sameInstant, gap, atomic] = cf.time

  it('section 4.4.2: a date with a fraction of a second', () => {
    expect(new Date(at(printed.value, printed.units, 'standard')).toISOString()).toBe(new Date(printed.datetime).toISOString())
  })

  it('a zone of -06 is six hours behind', () => {
    const [a, b] = offset.equal.map((date) => since(date, 'standard'))
    expect(a).toBe(b)
  })

  it.each(['standard', 'noleap'] as const)('one day after 28 February 2020 in %s', (calendar) => {
    expect(at(leapDay.value, leapDay.units, calendar)).toBe(Date.parse(`${leapDay[calendar].replace(' ', 'T')}Z`))
  })

  it('the same instant in the standard and the Julian calendar', () => {
    expect(since(sameInstant.same_instant.julian, 'julian')).toBe(since(sameInstant.same_instant.standard, 'standard'))
  })

  it('the day between 4 and 15 October 1582', () => {
    const [from, to] = gap.interval
    expect((since(to, 'standard') - since(from, 'standard')) / 86_400_000).toBe(gap.days)
  })

  it('UTC and TAI at the beginning of 1972, and the leap seconds since', () => {
    expect(since(atomic.tai, 'tai')).toBe(since(atomic.utc, 'utc'))
    const seconds = (Date.UTC(2026, 0, 1) - Date.UTC(1972, 0, 1)) / 1000 + atomic.leap_seconds_1972_to_2026
    expect(at(seconds, `seconds since ${atomic.utc}`, 'utc')).toBe(Date.UTC(2026, 0, 1))
    expect(at(seconds, `seconds since ${atomic.tai}`, 'tai')).toBe(Date.UTC(2026, 0, 1))
  })
})

describe('climatologies as the CF conventions print them', () => {
  const open = ({ units, time, bounds, cell_methods: methods }: Climatology, attribute: 'climatology' | 'bounds') => () =>
    cfSource(
      rawFile(
        [
          rawVariable('time', [['time', time.length]], { units, [attribute]: 'time_extent' }),
          rawVariable('time_extent', [['time', time.length], ['nv', 2]]),
          rawVariable('lat', [['lat', 2]], { units: 'degrees_north' }), rawVariable('lon', [['lon', 2]], { units: 'degrees_east' }),
          rawVariable('chlor_a', [['time', time.length], ['lat', 2], ['lon', 2]], {
            units: 'mg m-3', ...(methods === undefined ? {} : { cell_methods: methods }),
          }),
        ],
        { time, time_extent: bounds.flat(), lat: [1, 2], lon: [1, 2], chlor_a: [] },
      ),
      'climatology.nc',
    )

  it.each(['climatology_7_9', 'climatology_7_10'] as const)('%s is recognised and not taken for an observation', (name) => {
    expect(open(cf[name], 'climatology')).toThrow('chlor_a is a climatology (several years folded into one), not an observation.')
  })

  it('is recognised by its length even when the file calls its periods plain bounds', () => {
    const { cell_methods: _, ...plain } = cf.climatology_7_10
    expect(open(plain, 'bounds')).toThrow('in one step: a long-term average, not an observation.')
  })

  it('is told from a composite of a month, which stays', () => {
    const month: Climatology = { units: 'days since 2024-01-01', time: [15], bounds: [[0, 31]], cell_methods: 'time: mean' }
    const [variable] = open(month, 'bounds')().variables
    expect(variable!.times).toEqual([
      { observedAt: Date.UTC(2024, 0, 1), endsAt: Date.UTC(2024, 1, 1), hasClock: false, from: 'time axis' },
    ])
  })
})

describe('packing', () => {
  it.each(cf.packing)('scale $scale and offset $offset', ({ scale, offset, fill, valid, check }) => {
    const attributes = { scale_factor: scale, add_offset: offset, ...(fill === undefined ? {} : { _FillValue: fill }), ...(valid ? { valid_range: valid } : {}) }
    const variable = rawVariable('v', [['x', 1]], attributes, 'i2')
    if (valid) variable.attributes = new Map([...variable.attributes, ['valid_range', { type: 'i2', value: valid }]])
    const values = Float64Array.from(check, ({ packed }) => packed)
    unpackInPlace(values, packingOf(variable))
    check.forEach(({ value }, i) => expect(values[i]).toBeCloseTo(value, 12))
  })
})
