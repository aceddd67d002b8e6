import type { CurvilinearGrid } from '../../shared/science/grid'
import { quadCell, type QuadCell, trianglesOf } from '../../shared/science/quad-cell'

interface Place {
  row: number
  column: number
}

const finders = new WeakMap<CurvilinearGrid, (lon: number, lat: number) => Place | null>()

/**
 * Answers which cell of a curvilinear grid holds a place, or null. Cells are sorted into boxes of about a cell's size
 * once a grid; the one with the lowest number wins where cells overlap.
 */
export function quadFinder(grid: CurvilinearGrid): (lon: number, lat: number) => Place | null {
  const known = finders.get(grid)
  if (known) return known
  const finder = makeFinder(grid)
  finders.set(grid, finder)
  return finder
}

function makeFinder(grid: CurvilinearGrid): (lon: number, lat: number) => Place | null {
  const count = grid.rows * grid.columns
  const boxDeg = Math.min(5, Math.max(0.02, typicalSize(grid)))
  const across = Math.ceil(360 / boxDeg)
  const boxes = new Map<number, number[]>()
  for (let cell = 0; cell < count; cell++) {
    const quad = quadCell(grid, cell)
    if (!quad) continue
    const [west, east] = [Math.min(...quad.lons), Math.max(...quad.lons)]
    const [south, north] = [Math.min(...quad.lats), Math.max(...quad.lats)]
    for (let y = Math.floor((south + 90) / boxDeg); y <= Math.floor((north + 90) / boxDeg); y++) {
      for (const x of boxesBetween(west, east, boxDeg, across)) {
        const box = y * across + x
        const held = boxes.get(box)
        if (held) held.push(cell)
        else boxes.set(box, [cell])
      }
    }
  }
  return (lon, lat) => {
    const x = Math.floor(withinTurn(lon) / boxDeg)
    const y = Math.floor((lat + 90) / boxDeg)
    const cell = boxes.get(y * across + x)?.find((candidate) => holds(quadCell(grid, candidate)!, lon, lat))
    return cell === undefined ? null : { row: Math.floor(cell / grid.columns), column: cell % grid.columns }
  }
}

const withinTurn = (lon: number): number => lon - 360 * Math.floor(lon / 360)

/** Boxes along a parallel; the last one before 360 may be narrower than the others. */
function* boxesBetween(west: number, east: number, boxDeg: number, across: number): Generator<number> {
  const first = Math.floor(withinTurn(west) / boxDeg)
  const last = Math.floor(withinTurn(east) / boxDeg)
  for (let x = first; ; x = (x + 1) % across) {
    yield x
    if (x === last) return
  }
}

/** The median height or width of a sample of cells, whichever is larger. */
function typicalSize(grid: CurvilinearGrid): number {
  const count = grid.rows * grid.columns
  const sizes: number[] = []
  for (let i = 0; i < 200; i++) {
    const quad = quadCell(grid, Math.floor((i * count) / 200))
    if (!quad) continue
    sizes.push(Math.max(Math.max(...quad.lons) - Math.min(...quad.lons), Math.max(...quad.lats) - Math.min(...quad.lats)))
  }
  sizes.sort((a, b) => a - b)
  return sizes[sizes.length >> 1] ?? 1
}

function holds(quad: QuadCell, lon: number, lat: number): boolean {
  const x = lon - 360 * Math.round((lon - quad.lons[0]) / 360)
  // A cell up to 180 degrees wide may lie on either side of its first corner.
  return [x, x - 360, x + 360].some((turned) => trianglesOf(quad).some((triangle) => inTriangle(quad, triangle, turned, lat)))
}

function inTriangle({ lons, lats }: QuadCell, corners: readonly [number, number, number], x: number, y: number): boolean {
  let [left, right] = [false, false]
  for (let i = 0; i < 3; i++) {
    const [a, b] = [corners[i]!, corners[(i + 1) % 3]!]
    const side = (lons[b]! - lons[a]!) * (y - lats[a]!) - (lats[b]! - lats[a]!) * (x - lons[a]!)
    if (side > 0) left = true
    else if (side < 0) right = true
  }
  return !(left && right)
}
