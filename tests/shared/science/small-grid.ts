import type { AxesGrid } from '../../../shared/science/grid'

export interface SmallGrid {
  grid: AxesGrid
  values: Float64Array
}

/** grid`1 2 · / 4 8 3`: rows from north to south, `·` missing; cells of one degree, the south-west corner at 0, 0. */
export function grid(strings: TemplateStringsArray): SmallGrid {
  const rows = strings.join('').split('/').map((row) => row.trim().split(/\s+/))
  const columns = rows[0]!.length
  if (rows.some((row) => row.length !== columns)) throw new RangeError('Every row of a small grid has as many cells.')
  const cells = rows.flat().map((cell) => (cell === '·' ? NaN : Number(cell)))
  return {
    grid: {
      kind: 'axes',
      rows: rows.length,
      columns,
      latEdges: Float64Array.from({ length: rows.length + 1 }, (_, i) => rows.length - i),
      lonEdges: Float64Array.from({ length: columns + 1 }, (_, i) => i),
    },
    values: Float64Array.from(cells),
  }
}

/** A box as a polygon, west, south, east, north. */
export function box(west: number, south: number, east: number, north: number) {
  const ring = [[west, south], [east, south], [east, north], [west, north], [west, south]]
  return { type: 'Polygon' as const, coordinates: [ring] }
}
