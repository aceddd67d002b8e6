import type { ReportVariable } from '../../../shared/schemas/files'
import { dayWithYear } from '../../lib/dates'
import { unitWords } from '../../../shared/figure-text'
import { countWords, grouped, percent, threeDigits } from '../../lib/format'

export interface UnderstoodRow {
  item: string
  understood: string
  how: 'read' | 'worked out'
  note: string
  /** Figures and names of the file stand in the mono cut. */
  mono?: boolean
}

/** What was read from one variable, item by item, with how it is known. */
export function understoodRows(format: string, variable: ReportVariable, timeFrom?: string): UnderstoodRow[] {
  const { grid, times } = variable
  const rows: UnderstoodRow[] = [
    { item: 'Format', understood: formatWords(format), how: 'read', note: 'from its first bytes, not its name' },
    { item: 'Quantity', understood: variable.quantity, how: 'read', note: variable.longName ? `long name “${variable.longName}”` : 'from the name of the variable' },
    { item: 'Variable', understood: variable.name, how: 'read', note: variable.dimensions.map((one) => `${one.name} ${one.size}`).join(' × '), mono: true },
    unitRow(variable),
    { item: 'Grid', understood: `${grouped(grid.columns)} × ${grouped(grid.rows)} cells`, how: 'read', note: gridNote(variable), mono: true },
    { item: 'Time', understood: timeWords(variable), how: times.first ? 'read' : 'worked out', note: timeNote(times, timeFrom) },
    cellsRow(variable),
  ]
  const values = valueRow(variable)
  return values ? [...rows, values] : rows
}

const formats: Record<string, string> = { netcdf4: 'NetCDF-4', 'netcdf-classic': 'classic NetCDF', geotiff: 'GeoTIFF' }

export function formatWords(format: string): string {
  return formats[format] ?? format
}

function unitRow({ unit, fileUnit, conversion }: ReportVariable): UnderstoodRow {
  return {
    item: 'Unit',
    understood: unit ? unitWords(unit) : 'none',
    how: conversion ? 'worked out' : 'read',
    note: conversion ?? (fileUnit ? `units “${fileUnit}”` : 'the file names no unit'),
    mono: true,
  }
}

const placings: Record<string, string> = { axes: 'axes of latitude and longitude', curvilinear: 'latitude and longitude given cell by cell' }

function gridNote({ grid }: ReportVariable): string {
  const span = `${side(grid.south, 'S', 'N')} to ${side(grid.north, 'S', 'N')}, ${side(grid.west, 'W', 'E')} to ${side(grid.east, 'W', 'E')}`
  return [placings[grid.kind] ?? 'placed by a transform', span, grid.crs].filter(Boolean).join('; ')
}

function side(value: number, below: string, above: string): string {
  return `${threeDigits(Math.abs(value))}° ${value < 0 ? below : above}`
}

function timeWords({ times }: ReportVariable): string {
  const steps = countWords(times.count, 'step')
  if (!times.first) return steps
  const first = dayWithYear(times.first)
  const last = times.last ? dayWithYear(times.last) : first
  return first === last ? `${steps}, ${first}` : `${steps}, ${first} to ${last}`
}

function timeNote({ from, hasClock, first }: ReportVariable['times'], timeFrom: string | undefined): string {
  if (!first) return timeFrom === undefined ? 'the file names no time' : `the file names no time; it came from ${timeFrom}`
  return `${from}${hasClock ? '' : '; no clock time'}`
}

/** Before any flag hides a cell: what is kept then stands in a bar of its own. */
function cellsRow({ valid, cells, flags = [] }: ReportVariable): UnderstoodRow {
  const looked = `${valid === cells ? 'all' : `${grouped(valid)} of`} ${grouped(cells)} looked at in the first step`
  const note = `${looked}${flags.length > 0 ? ', whatever flags they carry' : ''}${valid < cells ? '; the rest is missing' : ''}`
  return { item: 'Cells with a value', understood: percent(cells > 0 ? valid / cells : 0), how: 'worked out', note, mono: true }
}

function valueRow({ min, median, max, unit }: ReportVariable): UnderstoodRow | undefined {
  if (min === null || max === null) return undefined
  return {
    item: 'Values of the first step',
    understood: `${threeDigits(min)} to ${threeDigits(max)}`,
    how: 'worked out',
    note: `${median === null ? '' : `median ${threeDigits(median)} `}${unitWords(unit)}`,
    mono: true,
  }
}
