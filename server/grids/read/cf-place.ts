import type { Grid } from '../../../shared/science/grid'
import { axesGrid } from './cf-axes'
import { lookUp, type Role, roleOf } from './cf-roles'
import { curvedGrid } from './curved-grid'
import { type Mapping, mappingOf } from './grid-mapping'
import { checkPlaces } from './place-check'
import { projectedGrid } from './projected-grid'
import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

export interface Axis {
  role: Role
  coordinate: RawVariable
}

export interface CellPlace {
  rowAxis: number
  columnAxis: number
  /** Makes the grid, or refuses it; called once for all variables on the same coordinates. */
  grid(): Grid
}

/** Which dimensions of a variable are its rows and columns, and where their cells are. */
export class CellPlaces {
  private readonly grids = new Map<string, Grid>()
  readonly warnings: string[] = []

  constructor(private readonly file: RawNetcdf) {}

  /** Null for a variable that lies on no grid, or on one that the file gives no place. */
  of(raw: RawVariable, axes: readonly (Axis | null)[]): CellPlace | null {
    return this.onAxes(axes) ?? this.onPlane(raw, axes) ?? this.cellByCell(raw)
  }

  private once(key: readonly RawVariable[], make: () => Grid): Grid {
    const name = key.map((variable) => variable.name).join('\0')
    const grid = this.grids.get(name) ?? make()
    this.grids.set(name, grid)
    return grid
  }

  private onAxes(axes: readonly (Axis | null)[]): CellPlace | null {
    const [rowAxis, columnAxis] = [indexOf(axes, 'latitude'), indexOf(axes, 'longitude')]
    if (rowAxis < 0 || columnAxis < 0) return null
    const [latitude, longitude] = [axes[rowAxis]!.coordinate, axes[columnAxis]!.coordinate]
    return {
      rowAxis,
      columnAxis,
      grid: () =>
        this.once([latitude, longitude], () => {
          const { grid, warnings } = axesGrid(this.file, latitude, longitude)
          this.warnings.push(...warnings)
          return grid
        }),
    }
  }

  private onPlane(raw: RawVariable, axes: readonly (Axis | null)[]): CellPlace | null {
    const mapping = this.mappingFor(raw)
    if (!mapping || mapping.mapping.kind === 'degrees') return null
    const plane = mapping.mapping
    const [rowAxis, columnAxis] = [planeAxis(axes, 'y'), planeAxis(axes, 'x')]
    if (rowAxis < 0 || columnAxis < 0) return null
    const [y, x] = [axes[rowAxis]!.coordinate, axes[columnAxis]!.coordinate]
    const aside = this.cellByCell(raw)
    return {
      rowAxis,
      columnAxis,
      grid: () =>
        this.once([y, x, mapping.variable], () => {
          const grid = projectedGrid(this.file, y, x, plane, this.warnings)
          checkPlaces(grid, raw.name)
          if (aside && aside.rowAxis === rowAxis && aside.columnAxis === columnAxis) {
            checkPlaces(grid, raw.name, this.file, aside.latitude, aside.longitude)
          }
          return grid
        }),
    }
  }

  private mappingFor(raw: RawVariable): { variable: RawVariable; mapping: Mapping } | null {
    const name = /^\s*([^\s:]+)/.exec(textOf(raw.attributes, 'grid_mapping') ?? '')?.[1]
    const variable = name === undefined ? null : lookUp(this.file, raw, name)
    const mapping = variable && mappingOf(variable)
    return variable && mapping ? { variable, mapping } : null
  }

  /** Latitude and longitude of every cell, named by `coordinates` or standing on the same two dimensions. */
  private cellByCell(raw: RawVariable): (CellPlace & { latitude: RawVariable; longitude: RawVariable }) | null {
    const named = (textOf(raw.attributes, 'coordinates') ?? '').split(/\s+/).filter(Boolean)
    const listed = named.flatMap((name) => lookUp(this.file, raw, name) ?? [])
    const pair = pairOn(raw, listed) ?? pairOn(raw, this.file.variables)
    if (!pair || pair.latitude.name === raw.name || pair.longitude.name === raw.name) return null
    const { latitude, longitude } = pair
    const [rowAxis, columnAxis] = latitude.dimensions.map(({ name }) => raw.dimensions.findIndex((own) => own.name === name)) as [number, number]
    return {
      rowAxis,
      columnAxis,
      latitude,
      longitude,
      grid: () =>
        this.once([latitude, longitude], () => {
          const { grid, warnings } = curvedGrid(this.file, latitude, longitude)
          this.warnings.push(...warnings)
          return grid
        }),
    }
  }
}

const indexOf = (axes: readonly (Axis | null)[], role: Role): number => axes.findIndex((axis) => axis?.role === role)

function planeAxis(axes: readonly (Axis | null)[], letter: 'x' | 'y'): number {
  const isIt = ({ coordinate }: Axis) => {
    const standardName = textOf(coordinate.attributes, 'standard_name')?.toLowerCase() ?? ''
    const axis = textOf(coordinate.attributes, 'axis')?.toLowerCase()
    const base = coordinate.name.slice(coordinate.name.lastIndexOf('/') + 1).toLowerCase()
    if (/^projection_[xy]_/.test(standardName)) return standardName.startsWith(`projection_${letter}_`)
    if (standardName.startsWith('grid_')) return standardName === (letter === 'x' ? 'grid_longitude' : 'grid_latitude')
    return axis === letter || (axis === undefined && new RegExp(`^r?${letter}c?$`).test(base))
  }
  return axes.findIndex((axis) => axis?.role === 'projected' && isIt(axis))
}

/** The only pair of two-dimensional latitudes and longitudes whose dimensions the variable has; null for none or more. */
function pairOn(raw: RawVariable, candidates: readonly RawVariable[]) {
  const own = new Set(raw.dimensions.map(({ name }) => name))
  const fits = ({ type, dimensions }: RawVariable) =>
    type !== null && dimensions.length === 2 && dimensions[0]!.name !== dimensions[1]!.name && dimensions.every(({ name }) => own.has(name))
  const withRole = (role: Role) => candidates.filter((candidate) => fits(candidate) && roleOf(candidate) === role)
  const pairs = withRole('latitude').flatMap((latitude) =>
    withRole('longitude')
      .filter((longitude) => longitude.dimensions.every(({ name }, i) => name === latitude.dimensions[i]!.name))
      .map((longitude) => ({ latitude, longitude })),
  )
  return pairs.length === 1 ? pairs[0]! : null
}
