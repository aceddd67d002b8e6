/**
 * A grid as the numeric core sees it. Values on it are row-major, `index = row * columns + column`; NaN is missing.
 *
 * `axes`: cell edges in degrees, `rows + 1` latitude edges and `columns + 1` longitude edges, either direction,
 * longitudes unwrapped (monotonic, so 170, 180, 190 rather than 170, 180, -170).
 * `transform`: a projected or rotated raster; `transform` maps (column, row) to the plane of `crs` as
 * x = t0 + t1*column + t2*row, y = t3 + t4*column + t5*row; `crs` is a proj4 definition.
 * `curvilinear`: places of the cells' corners in degrees, `(rows + 1) * (columns + 1)` of them row-major, in any turn
 * round the globe; a cell is the quadrilateral between its four corners, its sides straight in longitude and latitude
 * the shorter way round. A cell with a NaN corner has no place.
 */
export interface AxesGrid {
  kind: 'axes'
  rows: number
  columns: number
  latEdges: Float64Array
  lonEdges: Float64Array
}

export interface TransformGrid {
  kind: 'transform'
  rows: number
  columns: number
  transform: [number, number, number, number, number, number]
  crs: string
}

export interface CurvilinearGrid {
  kind: 'curvilinear'
  rows: number
  columns: number
  cornerLons: Float64Array
  cornerLats: Float64Array
}

export type Grid = AxesGrid | TransformGrid | CurvilinearGrid

/** A rectangle of cells, in rows and columns of its grid. */
export interface GridWindow {
  row: number
  column: number
  rows: number
  columns: number
}
