import type { GridWindow } from '../../../shared/science/grid'
import type { GridSource, GridVariable } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { attachFlags, readFlags } from './cf-attach-flags'
import { CfAxes } from './cf-found-axes'
import { outsideRange, packingOf, unpackInPlace } from './cf-packing'
import { type Axis, type CellPlace, CellPlaces } from './cf-place'
import { coordinateOf, lookUp, roleOf } from './cf-roles'
import { isClimatological, layerTimes } from './cf-time'
import { checkDeclaredGrid } from './limits'
import { blockOf, find, type PlacedVariable, upright } from './placed-variable'
import { meaningOf } from './quantity'
import { numbersOf, plainAttributes, type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'
import { deepestSurface, isDepth, type SurfaceStep, surfaceStep } from './surface-level'
import { convertInPlace, describeConversion, validLimits } from './values'
import { checkWindow } from './window'

/** Gives a NetCDF file its meaning by the CF conventions. */
export function cfSource(file: RawNetcdf, fileName: string): GridSource {
  const warnings = [...file.warnings]
  const places = new CellPlaces(file)
  const found = new CfAxes(file)
  const helpers = helperNames(file)
  const placed: PlacedVariable[] = []
  let climatological: string | null = null
  let deep: string | null = null
  for (const raw of file.variables) {
    if (raw.type === null || raw.dimensions.length < 2 || helpers.has(raw.name)) continue
    const axes = axesOf(file, raw)
    const cells = places.of(raw, axes)
    if (!cells) continue
    const stepAxis = axes.findIndex((axis) => axis?.role === 'time')
    const surface = surfaceOf(file, raw, axes, [cells.rowAxis, cells.columnAxis, stepAxis])
    warnings.push(...surface.warnings)
    if (surface.deep !== null) {
      deep ??= surface.deep
      warnings.push(`${raw.name} was left out: ${surface.deep}`)
    }
    if (!surface.start) continue
    const time = axes[stepAxis]?.coordinate ?? scalarOf(file, raw, 'time')
    if (isClimatological(raw, time)) {
      climatological ??= raw.name
      warnings.push(`${raw.name} was left out: it is a climatology (several years folded into one).`)
      continue
    }
    const one = place(file, raw, cells, { start: surface.start, stepAxis: stepAxis < 0 ? null : stepAxis, time }, warnings)
    one.variable.axes = found.of(raw, axes)
    placed.push(one)
  }
  if (placed.length === 0) throw nothingPlaced(file, fileName, { climatological, deep })
  if (placed.every(({ variable }) => variable.times.length === 0)) {
    throw new LayerRefused('no-time', 'This file holds no time step: its time axis is empty.', { fileName, variables: placed.slice(0, 20).map(({ variable }) => variable.name) })
  }
  attachFlags(file, placed, warnings)

  return {
    format: file.format,
    variables: placed.map(({ variable }) => variable),
    globalAttributes: plainAttributes(file.attributes),
    warnings: [...new Set([...warnings, ...places.warnings])],
    readWindow: async (name, step, window) => readWindow(file, find(placed, name), step, window),
    readFlags: async (name, step, window, flagVariable) =>
      readFlags(file, placed, find(placed, name), step, window, flagVariable),
    readOutside: async (name, step, window) => readOutside(file, find(placed, name), step, window),
    close: () => file.close(),
  }
}

function axesOf(file: RawNetcdf, raw: RawVariable): (Axis | null)[] {
  return raw.dimensions.map(({ name }) => {
    const coordinate = coordinateOf(file, name)
    const role = coordinate && roleOf(coordinate)
    return role ? { role, coordinate } : null
  })
}

/** Where a variable's surface begins along its other dimensions; null when it has no single surface. */
function surfaceOf(
  file: RawNetcdf,
  raw: RawVariable,
  axes: readonly (Axis | null)[],
  known: readonly number[],
): { start: number[] | null; warnings: string[]; deep: string | null } {
  const start = raw.dimensions.map(() => 0)
  const warnings: string[] = []
  const others: string[] = []
  const levels: SurfaceStep[] = []
  for (const [index, { name, size }] of raw.dimensions.entries()) {
    if (known.includes(index)) continue
    const axis = axes[index]
    const surface = axis?.role === 'vertical' ? surfaceStep(file, axis.coordinate) : null
    if (surface) start[index] = surface.step
    else if (size !== 1) others.push(`${size} of ${name}`)
    if (surface?.at) levels.push(surface)
    if (surface && size > 1) warnings.push(`${raw.name} has ${size} levels; the one at the surface is read.`)
  }
  const lone = scalarOf(file, raw, 'vertical')
  // A height without a dimension may be that of the instrument.
  const alone = lone && isDepth(lone) ? surfaceStep(file, lone) : null
  if (alone?.at) levels.push(alone)
  const tooDeep = levels.find((level) => level.deep)
  if (tooDeep) {
    const deep = `its only level is ${tooDeep.at}, and Offing reads the surface, down to ${deepestSurface} m.`
    return { start: null, warnings: [], deep }
  }
  warnings.push(...levels.map(({ at }) => `${raw.name} is not at the surface: its only level is ${at}.`))
  if (others.length === 0) return { start, warnings, deep: null }
  const problem = `${raw.name} was left out: it has ${others.join(' and ')}, and Offing reads one surface at a time.`
  return { start: null, warnings: [problem], deep: null }
}

/** A single time or level may stand in a variable without dimensions, named by `coordinates`; a time also by being called so. */
function scalarOf(file: RawNetcdf, raw: RawVariable, role: 'time' | 'vertical'): RawVariable | null {
  const named = (textOf(raw.attributes, 'coordinates') ?? '').split(/\s+/).filter(Boolean)
  for (const name of role === 'time' ? [...named, 'time'] : named) {
    const variable = lookUp(file, raw, name)
    const size = variable?.dimensions.reduce((product, dimension) => product * dimension.size, 1)
    if (variable?.type && size === 1 && roleOf(variable) === role) return variable
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
  cells: CellPlace,
  { start, stepAxis, time }: { start: number[]; stepAxis: number | null; time: RawVariable | null },
  warnings: string[],
): PlacedVariable {
  const { rowAxis, columnAxis } = cells
  const size = (axis: number | null) => (axis === null ? 1 : raw.dimensions[axis]!.size)
  checkDeclaredGrid(raw.name, size(rowAxis), size(columnAxis), size(stepAxis))
  const grid = cells.grid()
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
  return { raw, variable, packing, meaning, rowAxis, columnAxis, stepAxis, start }
}

function readWindow(file: RawNetcdf, placed: PlacedVariable, step: number, window: GridWindow): Float64Array {
  checkWindow(placed.variable, step, window)
  const { start, count } = blockOf(placed, step, window)
  const block = file.read(placed.raw, start, count)
  unpackInPlace(block, placed.packing)
  convertInPlace(block, placed.meaning)
  return upright(placed, block, window)
}

function readOutside(file: RawNetcdf, placed: PlacedVariable, step: number, window: GridWindow): Uint8Array {
  checkWindow(placed.variable, step, window)
  const { start, count } = blockOf(placed, step, window)
  return upright(placed, outsideRange(file.read(placed.raw, start, count), placed.packing), window)
}

function nothingPlaced(file: RawNetcdf, fileName: string, { climatological, deep }: Record<'climatological' | 'deep', string | null>): LayerRefused {
  const facts = { fileName, variables: file.variables.slice(0, 50).map(({ name }) => name) }
  if (climatological !== null) {
    return new LayerRefused(
      'climatology',
      `${climatological} is a climatology (several years folded into one), not an observation.`,
      { ...facts, variable: climatological },
    )
  }
  if (deep !== null) return new LayerRefused('not-surface', `The file holds nothing of the sea’s surface: ${deep}`, facts)
  const fields = file.variables.filter(
    ({ type, dimensions }) => type !== null && dimensions.filter(({ size }) => size > 1).length >= 2,
  )
  if (fields.length === 0) {
    return new LayerRefused('no-grid', 'The file holds no variable on a latitude and longitude grid.', facts)
  }
  const roles = new Set(file.variables.map((variable) => roleOf(variable)))
  return new LayerRefused(
    'unknown-place',
    roles.has('latitude') && roles.has('longitude')
      ? 'The file gives latitudes and longitudes, but not on the dimensions of its grids, so nobody can tell where their cells are.'
      : roles.has('projected')
        ? 'The grids of this file lie on a map projection that it does not name, or that Offing does not know.'
        : 'The file holds grids, but not the latitudes and longitudes that say where they are.',
    { ...facts, fields: fields.slice(0, 20).map(({ name }) => name) },
  )
}
