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
  const { cornerLons, cornerLats, columns } = grid
  // Written out without lists: this runs for every cell of grids with millions of them.
  const first = cell + Math.floor(cell / columns)
  const below = first + columns + 1
  const lonA = cornerLons[first]!
  const lonB = near(cornerLons[first + 1]!, lonA)
  const lonC = near(cornerLons[below + 1]!, lonB)
  const lonD = near(cornerLons[below]!, lonC)
  const [latA, latB, latC, latD] = [cornerLats[first]!, cornerLats[first + 1]!, cornerLats[below + 1]!, cornerLats[below]!]
  if (!Number.isFinite(lonA + lonB + lonC + lonD + latA + latB + latC + latD) || Math.abs(lonD - lonA) > 180) return null
  const quad: QuadCell = { lons: [lonA, lonB, lonC, lonD], lats: [latA, latB, latC, latD] }
  return isSimple(quad) ? quad : null
}

export interface QuadBox {
  west: number
  east: number
  south: number
  north: number
}

/** The box round a cell; east may be beyond 180. */
export function quadBox({ lons, lats }: QuadCell): QuadBox {
  return {
    west: Math.min(lons[0], lons[1], lons[2], lons[3]), east: Math.max(lons[0], lons[1], lons[2], lons[3]),
    south: Math.min(lats[0], lats[1], lats[2], lats[3]), north: Math.max(lats[0], lats[1], lats[2], lats[3]),
  }
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
