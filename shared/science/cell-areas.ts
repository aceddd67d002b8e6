import type { Grid, TransformGrid } from './grid'
import { quadCell } from './quad-cell'
import { ringAreaKm2 } from './ring-area'
import { areaToEquatorKm2, authalicRadiusKm, cellAreaKm2 } from './wgs84'

export type Unproject = (x: number, y: number) => [lon: number, lat: number]

type Vector = [number, number, number]

const piecesPerSide = 4
const fullHeightKm2 = areaToEquatorKm2(90)

/** The point on the unit authalic sphere: its areas are the ellipsoid's, and poles are points like others. */
function onAuthalicSphere([lon, lat]: [number, number]): Vector {
  const sine = Math.max(-1, Math.min(1, areaToEquatorKm2(lat) / fullHeightKm2))
  const cosine = Math.sqrt((1 - sine) * (1 + sine))
  const angle = (lon * Math.PI) / 180
  return [cosine * Math.cos(angle), cosine * Math.sin(angle), sine]
}

const dot = (a: Vector, b: Vector) => a[0] * b[0] + a[1] * b[1] + a[2] * b[2]
const less = (a: Vector, b: Vector): Vector => [a[0] - b[0], a[1] - b[1], a[2] - b[2]]
const cross = (a: Vector, b: Vector): Vector => [
  a[1] * b[2] - a[2] * b[1],
  a[2] * b[0] - a[0] * b[2],
  a[0] * b[1] - a[1] * b[0],
]

/** Signed spherical excess of a triangle; the differences keep the digits of small ones. */
function excess(a: Vector, b: Vector, c: Vector): number {
  const volume = dot(a, cross(less(b, a), less(c, a)))
  return 2 * Math.atan2(volume, 1 + dot(a, b) + dot(b, c) + dot(c, a))
}

function transformCellKm2(grid: TransformGrid, row: number, column: number, unproject: Unproject): number {
  const [t0, t1, t2, t3, t4, t5] = grid.transform
  const corners = [[0, 0], [1, 0], [1, 1], [0, 1]] as const
  const outline: Vector[] = []
  for (const [i, [c1, r1]] of corners.entries()) {
    const [c2, r2] = corners[(i + 1) % 4]!
    for (let piece = 0; piece < piecesPerSide; piece++) {
      const c = column + c1 + ((c2 - c1) * piece) / piecesPerSide
      const r = row + r1 + ((r2 - r1) * piece) / piecesPerSide
      outline.push(onAuthalicSphere(unproject(t0 + t1 * c + t2 * r, t3 + t4 * c + t5 * r)))
    }
  }
  let sum = 0
  for (let i = 1; i + 1 < outline.length; i++) sum += excess(outline[0]!, outline[i]!, outline[i + 1]!)
  return Math.abs(sum) * authalicRadiusKm * authalicRadiusKm
}

/**
 * WGS84 area in km2 of each listed cell (whole cells, not shares). Axes grids: exact. Transform: its outline, four
 * pieces a side, unprojected and measured on the sphere of equal area. Checked to 2e-6 on a
 * UTM cell of 100 km and better on smaller ones. Curvilinear: the ring of its corners. A corner without a place on Earth gives NaN.
 * RangeError for a transform grid without `unproject` (x, y of the crs to longitude, latitude), or a cell off the grid.
 */
export function cellAreasKm2(grid: Grid, index: Uint32Array, unproject?: Unproject): Float64Array {
  if (grid.kind === 'axes') {
    return Float64Array.from(index, (cell) => cellAreaKm2(grid, Math.floor(cell / grid.columns), cell % grid.columns))
  }
  if (grid.kind === 'curvilinear') {
    return Float64Array.from(index, (cell) => {
      if (cell >= grid.rows * grid.columns) throw new RangeError(`The grid of ${grid.rows} x ${grid.columns} cells has no cell ${cell}.`)
      const quad = quadCell(grid, cell)
      return quad ? ringAreaKm2(quad.lons.map((lon, i) => [lon, quad.lats[i]!])) : NaN
    })
  }
  if (!unproject) throw new RangeError('A grid with a transform needs its projection to find areas of cells.')
  return Float64Array.from(index, (cell) => {
    const row = Math.floor(cell / grid.columns)
    if (row >= grid.rows) throw new RangeError(`The grid of ${grid.rows} x ${grid.columns} cells has no cell ${cell}.`)
    return transformCellKm2(grid, row, cell % grid.columns, unproject)
  })
}
