import type { FoundAxis } from '../../shared/schemas/found'
import type { GridVariable } from './grid-source'

/** The dimensions of a variable with their coordinates: as the file gives them, else (rasters) from where its cells are. */
export function foundAxes({ axes, dimensions, grid }: GridVariable): FoundAxis[] {
  if (axes) return axes
  const [row, column] = dimensions
  if (!row || !column || dimensions.length !== 2) return dimensions.map(({ name, size }) => axisOf(name, size, 'other', null, null))
  if (grid.kind === 'axes') {
    return [
      axisOf(row.name, row.size, 'latitude', 'degrees north', middles(grid.latEdges)),
      axisOf(column.name, column.size, 'longitude', 'degrees east', middles(grid.lonEdges)),
    ]
  }
  if (grid.kind === 'curvilinear' || grid.transform[2] !== 0 || grid.transform[4] !== 0) {
    return [axisOf(row.name, row.size, 'other', null, null), axisOf(column.name, column.size, 'other', null, null)]
  }
  const [x, dx, , y, , dy] = grid.transform
  const along = (from: number, step: number, size: number) => Float64Array.from({ length: size }, (_, i) => from + step * (i + 0.5))
  return [
    axisOf(row.name, row.size, 'projected', 'm', along(y, dy, row.size)),
    axisOf(column.name, column.size, 'projected', 'm', along(x, dx, column.size)),
  ]
}

/** First, last, spacing and direction of a coordinate's values. Spacing within a thousandth is even, as of a grid's cells. */
export function axisOf(dimension: string, size: number, role: FoundAxis['role'], unit: string | null, values: Float64Array | null, coordinate: string | null = null): FoundAxis {
  const [first = null, last = null] = values && values.length > 0 ? [values[0]!, values[values.length - 1]!] : []
  const rises = first === null || last === null || first === last ? null : last > first
  return {
    dimension, size, role, coordinate, unit,
    first: finite(first),
    last: finite(last),
    spacing: values && evenSpacing(values),
    direction: rises === null ? null : rises ? 'ascending' : 'descending',
  }
}

function evenSpacing(values: Float64Array): number | null {
  const n = values.length
  if (n < 2) return null
  const step = Math.abs(values[n - 1]! - values[0]!) / (n - 1)
  if (!(step > 0) || !Number.isFinite(step)) return null
  for (let i = 1; i < n; i++) if (!(Math.abs(Math.abs(values[i]! - values[i - 1]!) - step) <= step * 1e-3)) return null
  // Steps of stored coordinates carry their type's rounding; six digits say what was meant.
  return Number(step.toPrecision(6))
}

function middles(edges: Float64Array): Float64Array {
  return Float64Array.from({ length: edges.length - 1 }, (_, i) => (edges[i]! + edges[i + 1]!) / 2)
}

const finite = (value: number | null): number | null => (value !== null && Number.isFinite(value) ? value : null)
