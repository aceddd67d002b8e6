import type { LayerTime } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { calendarNamed, dayMs, instantAfter } from './cf-calendar'
import { packingOf, unpackInPlace } from './cf-packing'
import { lookUp } from './cf-roles'
import { parseTimeUnits, type TimeUnits } from './cf-time-units'
import { coverageOf, periodTime } from './coverage-time'
import { plainAttributes, type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

const longestPeriodMs = 370 * dayMs

/** The times of a variable's steps, from its time axis, or from file-wide attributes when it has none. */
export function layerTimes(file: RawNetcdf, axis: RawVariable | null, name: string): LayerTime[] {
  const coverage = coverageOf(plainAttributes(file.attributes))
  if (axis === null) {
    if (coverage === null) return [{ observedAt: null, endsAt: null, hasClock: false, from: 'none' }]
    if (coverage.end === null) {
      return [{ observedAt: coverage.start, endsAt: null, hasClock: coverage.hasClock, from: 'global attribute' }]
    }
    refuseClimatology(coverage.start, coverage.end, name)
    return [periodTime(coverage.start, coverage.end, null, 'global attribute')]
  }

  const { instants, units, stored } = readInstants(file, axis)
  const bounds = readBounds(file, axis)
  // A date alone: whole days in a unit of days, and nothing else that speaks of a clock time. Midnight in seconds or
  // hours stays a clock time, since a geostationary sensor does look at midnight.
  const datesOnly = units.unitIsDay && stored.every(Number.isInteger)
  return instants.map((instant, step) => {
    const period = bounds?.[step]
    if (period && period[1] > period[0]) {
      refuseClimatology(period[0], period[1], name)
      return periodTime(period[0], period[1], instant, 'time axis')
    }
    const near = coverage?.end != null && instant >= coverage.start - dayMs && instant <= coverage.end + dayMs
    if (instants.length === 1 && coverage?.end != null && near) {
      refuseClimatology(coverage.start, coverage.end, name)
      const within = !datesOnly && instant >= coverage.start && instant <= coverage.end
      return periodTime(coverage.start, coverage.end, within ? instant : null, within ? 'time axis' : 'global attribute')
    }
    const observedAt = datesOnly ? Math.floor(instant / dayMs) * dayMs : instant
    return { observedAt, endsAt: null, hasClock: !datesOnly, from: 'time axis' }
  })
}

function readInstants(file: RawNetcdf, axis: RawVariable) {
  const unitText = textOf(axis.attributes, 'units')
  const units = unitText === null ? null : parseTimeUnits(unitText)
  if (!units) throw unknownTime(axis, `its unit "${unitText ?? 'none'}" is no length of time since a date`)
  const stored = readNumbers(file, axis, axis)
  if (units.reference.year <= 0) {
    throw new LayerRefused('climatology', `The times of ${axis.name} count from year 0, the mark of a climatology.`, {
      variable: axis.name,
      units: unitText,
    })
  }
  return { instants: toInstants(axis, units, stored), units, stored: Array.from(stored) }
}

function readNumbers(file: RawNetcdf, variable: RawVariable, axis: RawVariable): Float64Array {
  const values = file.read(variable, variable.dimensions.map(() => 0), variable.dimensions.map(({ size }) => size))
  unpackInPlace(values, packingOf(axis))
  return values
}

function toInstants(axis: RawVariable, units: TimeUnits, values: Float64Array): number[] {
  const calendarName = textOf(axis.attributes, 'calendar')
  const calendar = calendarNamed(calendarName)
  if (!calendar) throw unknownTime(axis, `its calendar "${calendarName}" is not one Offing can turn into dates`)
  return Array.from(values, (value) => {
    if (!Number.isFinite(value)) throw unknownTime(axis, 'it has missing values')
    const instant = instantAfter(calendar, units.reference, units.referenceMs, value * units.unitMs)
    if (instant === null || Math.abs(instant) > 8.64e15) {
      throw unknownTime(axis, `${value} falls on a date that does not exist (calendar ${calendar})`)
    }
    return Math.round(instant)
  })
}

function readBounds(file: RawNetcdf, axis: RawVariable): [number, number][] | null {
  const name = textOf(axis.attributes, 'bounds')
  const bounds = name === null ? null : lookUp(file, axis, name)
  const steps = axis.dimensions[0]?.size ?? 1
  const total = bounds?.dimensions.reduce((product, { size }) => product * size, 1)
  if (!bounds?.type || total !== 2 * steps) return null
  const unitText = textOf(bounds.attributes, 'units') ?? textOf(axis.attributes, 'units')
  const units = unitText === null ? null : parseTimeUnits(unitText)
  if (!units) return null
  const values = readNumbers(file, bounds, axis)
  if (values.some((value) => !Number.isFinite(value))) return null
  const instants = toInstants(axis, units, values)
  return Array.from({ length: steps }, (_, step) => [instants[2 * step]!, instants[2 * step + 1]!])
}

/** True when the variable or its time axis says that several years were folded into one (CF 7.4). */
export function isClimatological(variable: RawVariable, axis: RawVariable | null): boolean {
  if (axis && textOf(axis.attributes, 'climatology') !== null) return true
  return /\b(within|over) years\b/i.test(textOf(variable.attributes, 'cell_methods') ?? '')
}

function refuseClimatology(start: number, end: number, name: string): void {
  if (end - start <= longestPeriodMs) return
  throw new LayerRefused(
    'climatology',
    `${name} covers ${Math.round((end - start) / dayMs)} days in one step: a long-term average, not an observation.`,
    { variable: name, start: new Date(start).toISOString(), end: new Date(end).toISOString() },
  )
}

function unknownTime(axis: RawVariable, reason: string): LayerRefused {
  return new LayerRefused('unknown-time', `The time of the data cannot be told from ${axis.name}: ${reason}.`, {
    variable: axis.name,
    reason,
  })
}
