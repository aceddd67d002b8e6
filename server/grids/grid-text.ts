import { createHash } from 'node:crypto'
import type { CurvilinearGrid, Grid, TransformGrid } from '../../shared/science/grid'
import { packDegrees, unpackDegrees } from './curved-text'

/** A grid as text for the database, in full precision: JSON numbers carry doubles exactly. */
export function encodeGrid(grid: Grid): string {
  if (grid.kind === 'axes') {
    return JSON.stringify({ kind: 'axes', latEdges: Array.from(grid.latEdges), lonEdges: Array.from(grid.lonEdges) })
  }
  const { kind, rows, columns } = grid
  if (grid.kind === 'transform') return JSON.stringify({ kind, rows, columns, transform: grid.transform, crs: grid.crs })
  const across = columns + 1
  return JSON.stringify({
    kind, rows, columns,
    cornerLats: packDegrees(grid.cornerLats, across), cornerLons: packDegrees(grid.cornerLons, across),
  })
}

type Encoded =
  | { kind: 'axes'; latEdges: number[]; lonEdges: number[] }
  | TransformGrid
  | { kind: 'curvilinear'; rows: number; columns: number; cornerLats: string; cornerLons: string }

/** Curvilinear grids are large, and the same one is asked for tile after tile. */
const kept = new Map<string, CurvilinearGrid>()
const mostKept = 4

export function decodeGrid(text: string): Grid {
  const known = kept.get(text)
  if (known) return known
  const encoded = JSON.parse(text) as Encoded
  if (encoded.kind === 'transform') return encoded
  if (encoded.kind === 'axes') {
    const latEdges = Float64Array.from(encoded.latEdges)
    const lonEdges = Float64Array.from(encoded.lonEdges)
    return { kind: 'axes', rows: latEdges.length - 1, columns: lonEdges.length - 1, latEdges, lonEdges }
  }
  const { kind, rows, columns } = encoded
  const unpack = (packed: string) => unpackDegrees(packed, (rows + 1) * (columns + 1), columns + 1)
  const grid = { kind, rows, columns, cornerLats: unpack(encoded.cornerLats), cornerLons: unpack(encoded.cornerLons) }
  if (kept.size >= mostKept) kept.delete(kept.keys().next().value!)
  kept.set(text, grid)
  return grid
}

/** The same for two grids exactly when their cells are the same. */
export function gridFingerprint(grid: Grid): string {
  const hash = createHash('sha256')
  if (grid.kind !== 'curvilinear') return hash.update(encodeGrid(grid)).digest('hex')
  const { rows, columns, cornerLats, cornerLons } = grid
  return hash.update(`curvilinear ${rows} ${columns}`).update(cornerLats).update(cornerLons).digest('hex')
}
