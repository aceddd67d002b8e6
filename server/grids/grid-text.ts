import { createHash } from 'node:crypto'
import type { Grid, TransformGrid } from '../../shared/science/grid'

/** A grid as text for the database, in full precision: JSON numbers carry doubles exactly. */
export function encodeGrid(grid: Grid): string {
  return grid.kind === 'axes'
    ? JSON.stringify({ kind: 'axes', latEdges: Array.from(grid.latEdges), lonEdges: Array.from(grid.lonEdges) })
    : JSON.stringify({
        kind: 'transform', rows: grid.rows, columns: grid.columns, transform: grid.transform, crs: grid.crs,
      })
}

type Encoded =
  | { kind: 'axes'; latEdges: number[]; lonEdges: number[] }
  | ({ kind: 'transform' } & Omit<TransformGrid, 'kind'>)

export function decodeGrid(text: string): Grid {
  const encoded = JSON.parse(text) as Encoded
  if (encoded.kind === 'transform') return encoded
  const latEdges = Float64Array.from(encoded.latEdges)
  const lonEdges = Float64Array.from(encoded.lonEdges)
  return { kind: 'axes', rows: latEdges.length - 1, columns: lonEdges.length - 1, latEdges, lonEdges }
}

/** The same for two grids exactly when their cells are the same. */
export function gridFingerprint(grid: Grid): string {
  return createHash('sha256').update(encodeGrid(grid)).digest('hex')
}
