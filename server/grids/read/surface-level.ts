import { packingOf, unpackInPlace } from './cf-packing'
import { maxAxisLength } from './limits'
import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

/** Units of a vertical axis in which 0 is the surface; a numbered level or a pressure in air is not one of them. */
const fromSurface = /^(m|cm|dm|km|met(er|re)s?|decibars?|dbars?)$/i
const metresIn: Record<string, number> = { cm: 0.01, dm: 0.1, km: 1000 }
/** A level this far down, in metres, still counts as the surface: models and moorings give theirs so. */
export const deepestSurface = 10

export interface SurfaceStep {
  step: number
  /** The depth or height of a single level that is not at 0. */
  at: string | null
  /** That level lies too far down to be the surface. */
  deep: boolean
}

/**
 * Which step of a vertical axis, or of a vertical coordinate without a dimension, is the surface: the only one, or the one
 * at 0. Null when the axis has several steps and none is said to be at the surface.
 */
export function surfaceStep(file: RawNetcdf, axis: RawVariable): SurfaceStep | null {
  const length = axis.dimensions[0]?.size ?? 1
  const unit = unitOf(axis)
  if (length > maxAxisLength) return null
  const values = file.read(axis, axis.dimensions.map(() => 0), axis.dimensions.map(({ size }) => size))
  unpackInPlace(values, packingOf(axis))
  if (length === 1) {
    const value = values[0]!
    const away = fromSurface.test(unit) && value !== 0 && Number.isFinite(value)
    const metres = Math.abs(value) * (metresIn[unit.toLowerCase()] ?? 1)
    return { step: 0, at: away ? `${value} ${unit}` : null, deep: away && metres > deepestSurface }
  }
  if (!fromSurface.test(unit)) return null
  const step = values.indexOf(0)
  return step < 0 || step !== values.lastIndexOf(0) ? null : { step, at: null, deep: false }
}

export function isDepth({ name, attributes }: RawVariable): boolean {
  return textOf(attributes, 'standard_name') === 'depth' || /(^|\/)depth$/i.test(name)
}

/** What calls itself a depth and has no unit is taken to be in metres. */
function unitOf(axis: RawVariable): string {
  return textOf(axis.attributes, 'units')?.trim() || (isDepth(axis) ? 'm' : '')
}
