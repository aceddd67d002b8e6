import type { CurvilinearGrid, TransformGrid } from '../../../shared/science/grid'
import { LayerRefused } from '../layer-refused'
import { readAxis, axisEdges } from './cf-axes'
import { roundDegrees } from './corner-places'
import type { Mapping } from './grid-mapping'
import { maxCurvedCells } from './limits'
import { unprojectFrom } from './project'
import { type RawNetcdf, type RawVariable, textOf } from './raw-netcdf'
import { rotatedToTrue } from './rotated-pole'

const evenShare = 1e-3

/**
 * The grid of projected x and y axes. Even axes keep their plane; uneven ones, and those of a rotated pole, become
 * cells with corners placed one by one.
 */
export function projectedGrid(
  file: RawNetcdf,
  y: RawVariable,
  x: RawVariable,
  mapping: Exclude<Mapping, { kind: 'degrees' }>,
  warnings: string[],
): TransformGrid | CurvilinearGrid {
  const scale = [x, y].map((axis) => planeUnits(axis, mapping))
  const [xEdges, yEdges] = [x, y].map((axis, i) =>
    axisEdges(file, axis, readAxis(file, axis), warnings).map((edge) => edge * scale[i]!),
  ) as [Float64Array, Float64Array]
  const [rows, columns] = [yEdges.length - 1, xEdges.length - 1]
  if (mapping.kind === 'proj4' && isEven(xEdges) && isEven(yEdges)) {
    const [x0, y0] = [xEdges[0]!, yEdges[0]!]
    const [dx, dy] = [(xEdges[columns]! - x0) / columns, (yEdges[rows]! - y0) / rows]
    return { kind: 'transform', rows, columns, transform: [x0, dx, 0, y0, 0, dy], crs: mapping.crs }
  }
  if (rows * columns > maxCurvedCells) {
    throw new LayerRefused('too-large', `The grid of ${y.name} and ${x.name} has more cells than Offing places one by one.`, { rows, columns })
  }
  const place = mapping.kind === 'proj4' ? unprojectFrom(mapping.crs) : rotatedToTrue(mapping)
  const count = (rows + 1) * (columns + 1)
  const corners = { lons: new Float64Array(count), lats: new Float64Array(count) }
  for (let i = 0; i < count; i++) {
    const [lon, lat] = place(xEdges[i % (columns + 1)]!, yEdges[Math.floor(i / (columns + 1))]!)
    corners.lons[i] = lon
    corners.lats[i] = lat
  }
  return { kind: 'curvilinear', rows, columns, cornerLons: roundDegrees(corners.lons), cornerLats: roundDegrees(corners.lats) }
}

function isEven(edges: Float64Array): boolean {
  const n = edges.length - 1
  const step = (edges[n]! - edges[0]!) / n
  return edges.every((edge, i) => Math.abs(edge - edges[0]! - i * step) <= evenShare * Math.abs(step))
}

const metres: Record<string, number> = {
  m: 1, meter: 1, meters: 1, metre: 1, metres: 1, km: 1000, kilometer: 1000, kilometers: 1000, kilometre: 1000, kilometres: 1000,
}
const radians: Record<string, number> = { rad: 1, radian: 1, radians: 1, microradian: 1e-6, microradians: 1e-6 }

/** What one unit of a coordinate is in the plane: metres, or degrees for a rotated pole. */
function planeUnits(axis: RawVariable, mapping: Exclude<Mapping, { kind: 'degrees' }>): number {
  const unit = textOf(axis.attributes, 'units')?.toLowerCase() ?? ''
  if (mapping.kind === 'rotated') {
    if (/^deg(ree)?s?(_?[ne](orth|ast)?)?$/.test(unit)) return 1
  } else if (mapping.angular !== null && radians[unit] !== undefined) {
    return radians[unit] * mapping.angular
  } else if (metres[unit] !== undefined) {
    return metres[unit]
  }
  throw new LayerRefused(
    'unknown-place',
    `The file does not say with certainty where its cells are: ${axis.name} has the unit "${unit || 'none'}", which its projection does not take.`,
    { variable: axis.name, unit },
  )
}
