import type { AxesGrid } from '../../../shared/science/grid'
import { LayerRefused } from '../layer-refused'
import { edgesFromBounds, edgesFromCentres, isMonotonic, unwrapLongitudes } from './cf-edges'
import { packingOf, unpackInPlace } from './cf-packing'
import { lookUp } from './cf-roles'
import { maxAxisLength } from './limits'
import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'

export interface PlacedGrid {
  grid: AxesGrid
  warnings: string[]
}

/** The grid two coordinate variables span; refuses when the place can't be told with certainty. */
export function axesGrid(file: RawNetcdf, latitude: RawVariable, longitude: RawVariable): PlacedGrid {
  const warnings: string[] = []
  const lats = readAxis(file, latitude)
  const farthest = lats.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  if (farthest > 90 + 1e-6) throw misplaced(latitude, `holds ${farthest}, beyond the poles`)
  const lons = unwrapLongitudes(readAxis(file, longitude))
  if (lons.some((value) => Math.abs(value) > 1080)) throw misplaced(longitude, 'holds angles beyond three turns')

  const latEdges = axisEdges(file, latitude, lats, warnings).map((edge) => Math.min(90, Math.max(-90, edge)))
  const lonEdges = axisEdges(file, longitude, lons, warnings, 360)
  const span = Math.abs(lonEdges[lonEdges.length - 1]! - lonEdges[0]!)
  const step = span / lons.length
  if (span > 360 + step * 1.5) throw misplaced(longitude, `spans ${span.toFixed(2)} degrees, more than a full circle`)
  if (span > 360 + step * 0.5) {
    warnings.push(`The last column of ${longitude.name} repeats the first (a full circle plus one); it counts once.`)
  }
  return {
    grid: { kind: 'axes', rows: lats.length, columns: lons.length, latEdges, lonEdges },
    warnings,
  }
}

/** The values of a coordinate variable, unpacked; refuses an axis with gaps. */
export function readAxis(file: RawNetcdf, variable: RawVariable): Float64Array {
  const length = variable.dimensions[0]!.size
  if (length === 0) throw misplaced(variable, 'is empty')
  if (length > maxAxisLength) {
    throw new LayerRefused('too-large', `${variable.name} declares ${length} values.`, { variable: variable.name, length })
  }
  const values = file.read(variable, [0], [length])
  unpackInPlace(values, packingOf(variable))
  if (values.some((value) => Number.isNaN(value))) throw misplaced(variable, 'has missing values')
  return values
}

/**
 * Edges of an axis's cells: from its bounds (or the n + 1 edges that older files name) where they fit its centres, else
 * half-way between centres. `turn`: bounds may be counted whole turns away from their centres.
 */
export function axisEdges(
  file: RawNetcdf,
  variable: RawVariable,
  centres: Float64Array,
  warnings: string[],
  turn?: number,
): Float64Array {
  if (!isMonotonic(centres)) throw misplaced(variable, 'does not run steadily in one direction')
  const pairs = boundPairs(file, variable, centres.length)
  if (pairs) {
    const edges = edgesFromBounds(turn === undefined ? pairs : nearCentres(pairs, centres, turn), centres)
    if (edges) return edges
    warnings.push(`The bounds of ${variable.name} leave gaps or miss their cells; edges are taken half-way between centres.`)
  }
  if (centres.length < 2) throw misplaced(variable, 'has a single value and no bounds, so its cell has no known size')
  return edgesFromCentres(centres)
}

function boundPairs(file: RawNetcdf, variable: RawVariable, cells: number): Float64Array | null {
  const named = (attribute: string) => {
    const name = textOf(variable.attributes, attribute)
    return name === null ? null : lookUp(file, variable, name)
  }
  const bounds = named('bounds')
  // Bounds lack attributes of their own: they take the packing of their coordinate.
  const packing = (own: RawVariable) => packingOf({ ...own, attributes: new Map([...variable.attributes, ...own.attributes]) })
  if (bounds?.type && bounds.dimensions.length === 2 && bounds.dimensions[0]!.size === cells && bounds.dimensions[1]!.size === 2) {
    const pairs = file.read(bounds, [0, 0], [cells, 2])
    unpackInPlace(pairs, packing(bounds))
    return pairs
  }
  const edges = named('edges')
  if (!edges?.type || edges.dimensions.length !== 1 || edges.dimensions[0]!.size !== cells + 1) return null
  const values = file.read(edges, [0], [cells + 1])
  unpackInPlace(values, packing(edges))
  return Float64Array.from({ length: 2 * cells }, (_, i) => values[(i + 1) >> 1]!)
}

/** Centres may have been unwrapped past 180 or 360; their bounds follow them. */
function nearCentres(pairs: Float64Array, centres: Float64Array, turn: number): Float64Array {
  return pairs.map((value, i) => value + turn * Math.round((centres[i >> 1]! - value) / turn))
}

function misplaced(variable: RawVariable, reason: string): LayerRefused {
  return new LayerRefused(
    'unknown-place',
    `The file does not say with certainty where its cells are: ${variable.name} ${reason}.`,
    { variable: variable.name, reason },
  )
}
