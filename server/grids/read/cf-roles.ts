import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

export type Role = 'latitude' | 'longitude' | 'time' | 'vertical' | 'projected'

const latitudeUnits = /^degrees?_?n(orth)?$/i
const longitudeUnits = /^degrees?_?e(ast)?$/i
const plainDegrees = /^deg(ree)?s?$/i
const projectedNames = /^(grid_(latitude|longitude)|projection_[xy]_(angular_)?coordinate)$/

/** What a coordinate variable stands for: units first, then standard_name, axis and well-known names (CF 4). */
export function roleOf(variable: RawVariable): Role | null {
  const { attributes } = variable
  const units = textOf(attributes, 'units')
  const standardName = textOf(attributes, 'standard_name')?.toLowerCase() ?? null
  const axis = textOf(attributes, 'axis')?.toUpperCase() ?? null
  const name = variable.name.slice(variable.name.lastIndexOf('/') + 1).toLowerCase()

  if (standardName !== null && projectedNames.test(standardName)) return 'projected'
  if (units !== null && latitudeUnits.test(units)) return 'latitude'
  if (units !== null && longitudeUnits.test(units)) return 'longitude'
  if (units !== null && /\bsince\b/i.test(units)) return standardName === null || standardName === 'time' ? 'time' : null
  const degreesOrNone = units === null || plainDegrees.test(units)
  if (degreesOrNone && (standardName === 'latitude' || /^(lat|lats|latitude)$/.test(name))) return 'latitude'
  if (degreesOrNone && (standardName === 'longitude' || /^(lon|lons|long|longitude)$/.test(name))) return 'longitude'
  if (standardName === 'time' || axis === 'T' || name === 'time') return 'time'
  if (axis === 'Z' || textOf(attributes, 'positive') !== null || /^(depth|height|level|lev|altitude)$/.test(name)) {
    return 'vertical'
  }
  if (axis === 'X' || axis === 'Y' || /^(m|km|metres?|meters?)$/i.test(units ?? '')) return 'projected'
  return null
}

/** The 1-D coordinate variable of a dimension: the one of the same name, else any other that lies on it alone. */
export function coordinateOf(file: RawNetcdf, dimension: string): RawVariable | null {
  const candidates = file.variables.filter(
    ({ dimensions, type }) => type !== null && dimensions.length === 1 && dimensions[0]!.name === dimension,
  )
  const named = candidates.find(({ name }) => name === dimension)
  if (named && roleOf(named)) return named
  const withRole = candidates.filter((candidate) => roleOf(candidate) !== null)
  return withRole.find((candidate) => roleOf(candidate) !== 'projected') ?? withRole[0] ?? named ?? null
}

/** Finds a variable that an attribute of another one names: in its own group first, then towards the root. */
export function lookUp(file: RawNetcdf, from: RawVariable, name: string): RawVariable | null {
  let group = from.name.slice(0, Math.max(0, from.name.lastIndexOf('/')))
  for (;;) {
    const path = group === '' ? name.replace(/^\/+/, '') : `${group}/${name}`
    const found = file.variables.find((variable) => variable.name === path)
    if (found) return found
    if (group === '') return null
    group = group.slice(0, Math.max(0, group.lastIndexOf('/')))
  }
}
