import type { AxesGrid, GridWindow } from '../../../shared/science/grid'
import type { FlagCells } from '../flags'
import type { GridSource, GridVariable } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { axesGrid, type PlacedGrid } from './cf-axes'
import { ancillaryNames, filledMeanings, flagBlock, flagMeanings, saysGapFilled } from './cf-flags'
import { type Packing, packingOf, unpackInPlace } from './cf-packing'
import { coordinateOf, lookUp, type Role, roleOf } from './cf-roles'
import { isClimatological, layerTimes } from './cf-time'
import { checkDeclaredGrid } from './limits'
import { type Meaning, meaningOf } from './quantity'
import { numbersOf, plainAttributes, type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'
import { convertInPlace, describeConversion, validLimits } from './values'
import { checkWindow } from './window'

interface Placed {
  raw: RawVariable
  variable: GridVariable
  packing: Packing
  meaning: Meaning
  rowAxis: number
  columnAxis: number
  stepAxis: number | null
}

/** Gives a NetCDF file its meaning by the CF conventions. */
export function cfSource(file: RawNetcdf, fileName: string): GridSource {
  const warnings = [...file.warnings]
  const grids = new Map<string, PlacedGrid>()
  const helpers = helperNames(file)
  const placed: Placed[] = []
  let climatological: string | null = null
  for (const raw of file.variables) {
    if (raw.type === null || raw.dimensions.length < 2 || helpers.has(raw.name)) continue
    const axes = axesOf(file, raw)
    const rowAxis = axes.findIndex((axis) => axis?.role === 'latitude')
    const columnAxis = axes.findIndex((axis) => axis?.role === 'longitude')
    if (rowAxis < 0 || columnAxis < 0) continue
    const stepAxis = axes.findIndex((axis) => axis?.role === 'time')
    const others = raw.dimensions.filter(
      ({ size }, index) => ![rowAxis, columnAxis, stepAxis].includes(index) && size !== 1,
    )
    if (others.length > 0) {
      warnings.push(
        `${raw.name} was left out: it has ${others.map(({ name, size }) => `${size} of ${name}`).join(' and ')}, ` +
          'and Offing reads one surface at a time.',
      )
      continue
    }
    const time = axes[stepAxis]?.coordinate ?? scalarTime(file, raw)
    if (isClimatological(raw, time)) {
      climatological ??= raw.name
      warnings.push(`${raw.name} was left out: it is a climatology (several years folded into one).`)
      continue
    }
    placed.push(
      place(file, raw, { rowAxis, columnAxis, stepAxis: stepAxis < 0 ? null : stepAxis, time }, axes, grids, warnings),
    )
  }
  if (placed.length === 0) throw nothingPlaced(file, fileName, climatological)
  attachFlags(file, placed, warnings)

  return {
    format: file.format,
    variables: placed.map(({ variable }) => variable),
    globalAttributes: plainAttributes(file.attributes),
    warnings: [...new Set(warnings)],
    readWindow: async (name, step, window) => readWindow(file, find(placed, name), step, window),
    readFlags: async (name, step, window, flagVariable) =>
      readFlags(file, placed, find(placed, name), step, window, flagVariable),
    close: () => file.close(),
  }
}

/** Gives each variable the flags that its ancillary_variables name, or the only flag variable on its grid. */
function attachFlags(file: RawNetcdf, placed: Placed[], warnings: string[]): void {
  const flagged = placed.flatMap((candidate) => {
    const { meanings, problem } = flagMeanings(candidate.raw)
    if (problem) warnings.push(problem)
    return meanings ? [{ candidate, flags: { variable: candidate.raw.name, meanings } }] : []
  })
  for (const { raw, variable } of placed) {
    if (flagged.some(({ candidate }) => candidate.raw === raw)) continue
    const fitting = flagged.filter(
      ({ candidate: { variable: other, stepAxis } }) =>
        other.grid === variable.grid && (stepAxis === null || other.times.length === variable.times.length),
    )
    const named = new Set(ancillaryNames(raw).map((name) => lookUp(file, raw, name)?.name))
    const own = fitting.filter(({ flags }) => named.has(flags.variable))
    const chosen = own[0] ?? (fitting.length === 1 ? fitting[0] : undefined)
    if (chosen) variable.flags = chosen.flags
    const filled = (own.length ? own : fitting)
      .map(({ flags }) => ({ variable: flags.variable, meanings: filledMeanings(flags.meanings) }))
      .find(({ meanings }) => meanings.length > 0)
    if (filled) variable.gapFilled = filled
    else if (saysGapFilled(file, raw)) variable.gapFilled = { variable: null, meanings: [] }
  }
}

function readFlags(
  file: RawNetcdf,
  placed: Placed[],
  { variable }: Placed,
  step: number,
  window: GridWindow,
  flagVariable = variable.flags?.variable,
): FlagCells {
  const known = flagVariable !== undefined && [variable.flags?.variable, variable.gapFilled?.variable].includes(flagVariable)
  if (!known) throw new RangeError(`${variable.name} has no flags ${flagVariable ?? ''}`)
  const flags = find(placed, flagVariable)
  checkWindow(variable, step, window)
  const { start, count } = blockOf(flags, step, window)
  const block = flagBlock(file, flags.raw, start, count)
  if (flags.rowAxis < flags.columnAxis) return block
  const { raw, high, missing } = block
  return { raw: transpose(raw, window), high: high && transpose(high, window), missing: missing && transpose(missing, window) }
}

interface Axis {
  role: Role
  coordinate: RawVariable
}

function axesOf(file: RawNetcdf, raw: RawVariable): (Axis | null)[] {
  return raw.dimensions.map(({ name }) => {
    const coordinate = coordinateOf(file, name)
    const role = coordinate && roleOf(coordinate)
    return role ? { role, coordinate } : null
  })
}

/** A single time may stand in a variable without dimensions, named by `coordinates` or simply called time. */
function scalarTime(file: RawNetcdf, raw: RawVariable): RawVariable | null {
  const named = (textOf(raw.attributes, 'coordinates') ?? '').split(/\s+/).filter(Boolean)
  for (const name of [...named, 'time']) {
    const variable = lookUp(file, raw, name)
    const size = variable?.dimensions.reduce((product, dimension) => product * dimension.size, 1)
    if (variable?.type && size === 1 && roleOf(variable) === 'time') return variable
  }
  return null
}

/** Bounds and the like belong to other variables and are no layers. */
function helperNames(file: RawNetcdf): Set<string> {
  const names = new Set<string>()
  for (const variable of file.variables) {
    for (const attribute of ['bounds', 'climatology']) {
      const name = textOf(variable.attributes, attribute)
      const target = name === null ? null : lookUp(file, variable, name)
      if (target) names.add(target.name)
    }
  }
  return names
}

function place(
  file: RawNetcdf,
  raw: RawVariable,
  where: { rowAxis: number; columnAxis: number; stepAxis: number | null; time: RawVariable | null },
  axes: (Axis | null)[],
  grids: Map<string, PlacedGrid>,
  warnings: string[],
): Placed {
  const { rowAxis, columnAxis, stepAxis, time } = where
  const size = (axis: number | null) => (axis === null ? 1 : raw.dimensions[axis]!.size)
  checkDeclaredGrid(raw.name, size(rowAxis), size(columnAxis), size(stepAxis))
  const grid = sharedGrid(file, axes[rowAxis]!.coordinate, axes[columnAxis]!.coordinate, grids, warnings)
  const packing = packingOf(raw)
  const named = {
    name: raw.name,
    longName: textOf(raw.attributes, 'long_name'),
    standardName: textOf(raw.attributes, 'standard_name'),
    fileUnit: textOf(raw.attributes, 'units'),
  }
  const wavelength = numbersOf(raw.attributes, 'radiation_wavelength')[0] ?? numbersOf(raw.attributes, 'wavelength')[0]
  const meaning = meaningOf({ ...named, wavelengthAttribute: wavelength ?? null })
  for (const warning of [packing.warning, meaning.warning]) if (warning) warnings.push(warning)
  const variable: GridVariable = {
    ...named,
    unit: meaning.unit,
    conversion: describeConversion(packing.note, meaning),
    quantity: meaning.quantity,
    wavelengthNm: meaning.wavelengthNm,
    ...validLimits(packing.validMin, packing.validMax, meaning),
    grid,
    times: layerTimes(file, time, raw.name),
    attributes: plainAttributes(raw.attributes),
    dimensions: raw.dimensions.map((dimension) => ({ ...dimension })),
  }
  return { raw, variable, packing, meaning, rowAxis, columnAxis, stepAxis }
}

function sharedGrid(
  file: RawNetcdf,
  latitude: RawVariable,
  longitude: RawVariable,
  grids: Map<string, PlacedGrid>,
  warnings: string[],
): AxesGrid {
  const key = `${latitude.name}\0${longitude.name}`
  const known = grids.get(key)
  if (known) return known.grid
  const made = axesGrid(file, latitude, longitude)
  grids.set(key, made)
  warnings.push(...made.warnings)
  return made.grid
}

function readWindow(file: RawNetcdf, placed: Placed, step: number, window: GridWindow): Float64Array {
  const { raw, variable, rowAxis, columnAxis } = placed
  checkWindow(variable, step, window)
  const { start, count } = blockOf(placed, step, window)
  const block = file.read(raw, start, count)
  unpackInPlace(block, placed.packing)
  convertInPlace(block, placed.meaning)
  return rowAxis < columnAxis ? block : transpose(block, window)
}

function blockOf({ raw, rowAxis, columnAxis, stepAxis }: Placed, step: number, window: GridWindow) {
  const start = raw.dimensions.map(() => 0)
  const count = raw.dimensions.map(() => 1)
  start[rowAxis] = window.row
  count[rowAxis] = window.rows
  start[columnAxis] = window.column
  count[columnAxis] = window.columns
  if (stepAxis !== null) start[stepAxis] = step
  return { start, count }
}

function transpose<T extends Float64Array | Uint32Array | Uint8Array>(block: T, { rows, columns }: GridWindow): T {
  const turned = block.slice() as T
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) turned[row * columns + column] = block[column * rows + row]!
  }
  return turned
}

function find(placed: Placed[], name: string): Placed {
  const found = placed.find(({ variable }) => variable.name === name)
  if (!found) throw new RangeError(`the file has no gridded variable ${name}`)
  return found
}

function nothingPlaced(file: RawNetcdf, fileName: string, climatological: string | null): LayerRefused {
  const facts = { fileName, variables: file.variables.slice(0, 50).map(({ name }) => name) }
  if (climatological !== null) {
    return new LayerRefused(
      'climatology',
      `${climatological} is a climatology (several years folded into one), not an observation.`,
      { ...facts, variable: climatological },
    )
  }
  const fields = file.variables.filter(
    ({ type, dimensions }) => type !== null && dimensions.filter(({ size }) => size > 1).length >= 2,
  )
  if (fields.length === 0) {
    return new LayerRefused('no-grid', 'The file holds no variable on a latitude and longitude grid.', facts)
  }
  const curved = fields.some((variable) => ['latitude', 'longitude'].includes(roleOf(variable) ?? ''))
  return new LayerRefused(
    'unknown-place',
    curved
      ? 'The file gives latitude and longitude cell by cell (a swath or a curved grid), which Offing cannot place yet.'
      : 'The file holds grids, but not the latitudes and longitudes that say where they are.',
    { ...facts, fields: fields.slice(0, 20).map(({ name }) => name) },
  )
}
