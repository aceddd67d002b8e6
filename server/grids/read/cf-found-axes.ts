import type { FoundAxis } from '../../../shared/schemas/found'
import { axisOf } from '../found-axes'
import { LayerRefused } from '../layer-refused'
import { packingOf, unpackInPlace } from './cf-packing'
import type { Axis } from './cf-place'
import type { Role } from './cf-roles'
import { coordinateOf } from './cf-roles'
import { maxAxisLength } from './limits'
import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

const roles: Record<Role, FoundAxis['role']> = { latitude: 'latitude', longitude: 'longitude', time: 'time', vertical: 'level', projected: 'projected' }

/** What the file says of the dimensions of its variables; each coordinate is read once. */
export class CfAxes {
  private readonly read = new Map<string, Float64Array | null>()

  constructor(private readonly file: RawNetcdf) {}

  of({ dimensions }: RawVariable, axes: readonly (Axis | null)[]): FoundAxis[] {
    return dimensions.map(({ name, size }, at) => {
      const axis = axes[at]
      const coordinate = axis?.coordinate ?? coordinateOf(this.file, name)
      const unit = coordinate && textOf(coordinate.attributes, 'units')
      return axisOf(name, size, axis ? roles[axis.role] : 'other', unit, coordinate && this.values(coordinate), coordinate?.name ?? null)
    })
  }

  /** Null where the coordinate cannot be read back: what depends on it says so. */
  private values(coordinate: RawVariable): Float64Array | null {
    const known = this.read.get(coordinate.name)
    if (known !== undefined) return known
    const values = this.valuesOf(coordinate)
    this.read.set(coordinate.name, values)
    return values
  }

  private valuesOf(coordinate: RawVariable): Float64Array | null {
    const length = coordinate.dimensions[0]!.size
    if (coordinate.type === null || length === 0 || length > maxAxisLength) return null
    try {
      const values = this.file.read(coordinate, [0], [length])
      unpackInPlace(values, packingOf(coordinate))
      return values
    } catch (error) {
      if (error instanceof LayerRefused) return null
      throw error
    }
  }
}
