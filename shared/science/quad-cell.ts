import type { CurvilinearGrid } from './grid'

/** Corners of one cell in order round it, longitudes unwrapped: each the shorter way round from the one before. */
export interface QuadCell {
  lons: readonly [number, number, number, number]
  lats: readonly [number, number, number, number]
}

/**
 * The cell as a quadrilateral in the longitude/latitude plane. Null where it is none: a corner without a place, a cell
 * round a pole (its corners go once round the globe), or one folded over itself.
 */
export function quadCell(grid: CurvilinearGrid, cell: number): QuadCell | null {
  const row = Math.floor(cell / grid.columns)
  const column = cell % grid.columns
  const across = grid.columns + 1
  const corner = row * across + column
  const places = [corner, corner + 1, corner + across + 1, corner + across] as const
  const [a, b, c, d] = places.map((place) => grid.cornerLons[place]!) as [number, number, number, number]
  const lats = places.map((place) => grid.cornerLats[place]!) as [number, number, number, number]
  const lonB = near(b, a)
  const lonC = near(c, lonB)
  const lonD = near(d, lonC)
  if (!Number.isFinite(a + b + c + d + lats[0] + lats[1] + lats[2] + lats[3]) || Math.abs(lonD - a) > 180) return null
  const quad: QuadCell = { lons: [a, lonB, lonC, lonD], lats }
  return isSimple(quad) ? quad : null
}

function near(lon: number, reference: number): number {
  return lon - 360 * Math.round((lon - reference) / 360)
}

/** Twice the signed area of the triangle of three corners. */
function turn({ lons, lats }: QuadCell, i: number, j: number, k: number): number {
  return (lons[j]! - lons[i]!) * (lats[k]! - lats[i]!) - (lons[k]! - lons[i]!) * (lats[j]! - lats[i]!)
}

/** The two triangles of a cell: cut where both turn the same way, which a hollow corner allows along one diagonal only. */
export function trianglesOf(quad: QuadCell): readonly (readonly [number, number, number])[] {
  const straight = turn(quad, 0, 1, 2) * turn(quad, 0, 2, 3) > 0
  return straight ? [[0, 1, 2], [0, 2, 3]] : [[1, 2, 3], [1, 3, 0]]
}

export function isConvex(quad: QuadCell): boolean {
  const turns = [turn(quad, 0, 1, 2), turn(quad, 1, 2, 3), turn(quad, 2, 3, 0), turn(quad, 3, 0, 1)]
  return turns.every((value) => value > 0) || turns.every((value) => value < 0)
}

/** Cut along one diagonal or the other, both triangles turn the same way; a cell folded over itself fails on both. */
function isSimple(quad: QuadCell): boolean {
  const first = turn(quad, 0, 1, 2) * turn(quad, 0, 2, 3)
  const second = turn(quad, 1, 2, 3) * turn(quad, 1, 3, 0)
  return first > 0 || second > 0
}
