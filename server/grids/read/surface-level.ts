import { packingOf, unpackInPlace } from './cf-packing'
import { maxAxisLength } from './limits'
import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

/** Units of a vertical axis in which 0 is the surface; a numbered level or a pressure in air is not one of them. */
const fromSurface = /^(m|cm|dm|km|met(er|re)s?|decibars?|dbars?)$/i

/**
 * Which step of a vertical axis is the surface: the only one, or the one at 0. Null when the axis has several steps
 * and none is said to be at the surface. `at` is the depth or height of a single step that is not at 0.
 */
export function surfaceStep(file: RawNetcdf, axis: RawVariable): { step: number; at: string | null } | null {
  const length = axis.dimensions[0]?.size ?? 1
  const unit = textOf(axis.attributes, 'units') ?? ''
  if (length > maxAxisLength) return null
  const values = file.read(axis, axis.dimensions.map(() => 0), axis.dimensions.map(({ size }) => size))
  unpackInPlace(values, packingOf(axis))
  if (length === 1) {
    const value = values[0]!
    return { step: 0, at: fromSurface.test(unit) && value !== 0 && Number.isFinite(value) ? `${value} ${unit}` : null }
  }
  if (!fromSurface.test(unit)) return null
  const step = values.indexOf(0)
  return step < 0 || step !== values.lastIndexOf(0) ? null : { step, at: null }
}
