import type { AxesGrid, Grid, GridWindow } from '../../shared/science/grid'
import { cellFinder } from './cell-finder'
import { latitudeOf, longitudeOf, tileSize } from './mercator'

/**
 * Which cell each pixel of a tile lies in, -1 for none. Where rows and columns can be told apart (`split`), one row a
 * pixel row and one column a pixel column; else row and column of every pixel, row-major.
 */
export interface TileCells {
  split: boolean
  rows: Int32Array
  columns: Int32Array
}

export function tileCells(grid: Grid, z: number, x: number, y: number, project?: (lon: number, lat: number) => [number, number]): TileCells {
  const latitudes = pixels((pixel) => latitudeOf(z, y * tileSize + pixel))
  const longitudes = pixels((pixel) => longitudeOf(z, x * tileSize + pixel))
  const find = cellFinder(grid, project)
  if (grid.kind === 'axes') return ofAxes(grid, find, latitudes, longitudes)
  const rows = new Int32Array(tileSize * tileSize).fill(-1)
  const columns = new Int32Array(tileSize * tileSize).fill(-1)
  for (let py = 0; py < tileSize; py++) {
    for (let px = 0; px < tileSize; px++) {
      const cell = find(longitudes[px]!, latitudes[py]!)
      if (!cell) continue
      rows[py * tileSize + px] = cell.row
      columns[py * tileSize + px] = cell.column
    }
  }
  return { split: false, rows, columns }
}

type Find = ReturnType<typeof cellFinder>

/** Rows hang on latitude and columns on longitude alone, so 512 look-ups serve 65,536 pixels. */
function ofAxes(grid: AxesGrid, find: Find, latitudes: Float64Array, longitudes: Float64Array): TileCells {
  const lat = (grid.latEdges[0]! + grid.latEdges[1]!) / 2
  const lon = (grid.lonEdges[0]! + grid.lonEdges[1]!) / 2
  return {
    split: true,
    rows: Int32Array.from(latitudes, (one) => find(lon, one)?.row ?? -1),
    columns: Int32Array.from(longitudes, (one) => find(one, lat)?.column ?? -1),
  }
}

function pixels(f: (pixel: number) => number): Float64Array {
  return Float64Array.from({ length: tileSize }, (_, pixel) => f(pixel + 0.5))
}

/** Pixels first to last (not included) that lie in columns next to each other, and the columns they need. */
export interface Run {
  first: number
  last: number
  low: number
  high: number
}

/**
 * Pixels in runs whose cells can be read as one block: a tile over the seam of a grid that goes round the globe needs
 * both of its ends, and must not read everything between them.
 */
export function runsOf(places: Int32Array, seam: number): Run[] {
  const runs: Run[] = []
  let run: Run | undefined
  for (let pixel = 0; pixel < places.length; pixel++) {
    const place = places[pixel]!
    if (place < 0) {
      run = undefined
      continue
    }
    const before = pixel > 0 ? places[pixel - 1]! : -1
    if (!run || Math.abs(place - before) > seam) {
      run = { first: pixel, last: pixel, low: place, high: place }
      runs.push(run)
    }
    run.last = pixel + 1
    run.low = Math.min(run.low, place)
    run.high = Math.max(run.high, place)
  }
  return runs
}

/** The box round all cells of a tile that is not split; null when it meets none. */
export function boxOf({ rows, columns }: TileCells): GridWindow | null {
  let [top, bottom, left, right] = [Infinity, -1, Infinity, -1]
  for (let i = 0; i < rows.length; i++) {
    const row = rows[i]!
    if (row < 0) continue
    const column = columns[i]!
    if (row < top) top = row
    if (row > bottom) bottom = row
    if (column < left) left = column
    if (column > right) right = column
  }
  return bottom < 0 ? null : { row: top, column: left, rows: bottom - top + 1, columns: right - left + 1 }
}
