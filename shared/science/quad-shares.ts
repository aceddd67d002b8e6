import { clipRing, flatArea } from './clip-ring'
import type { PlaneRing } from './coverage-scan'
import type { CurvilinearGrid } from './grid'
import { isConvex, quadBox, type QuadBox, quadCell, type QuadCell, trianglesOf } from './quad-cell'

/** Cells are looked at in blocks of this many a side: a ring is cut to the block's box before it is cut to cells. */
const blockSide = 16
/** Cutting a ring twice leaves shares of about 1e-12 where there is none, and as much short of 1 inside. */
const roundingShare = 1e-10

interface Ring {
  points: number[]
  /** +1 for water, -1 for a hole, whichever way it winds. */
  weight: number
  box: QuadBox
}

/**
 * The exact share of every cell of a curvilinear grid that lies inside the rings, whose points are degrees. `emit` is
 * called for shares above zero, block by block. Cells without a place, round a pole or folded over have no share.
 */
export function scanQuads(
  rings: readonly PlaneRing[],
  grid: CurvilinearGrid,
  emit: (row: number, column: number, share: number) => void,
): void {
  const outlines = rings.map(ringOf)
  for (let top = 0; top < grid.rows; top += blockSide) {
    for (let left = 0; left < grid.columns; left += blockSide) scanBlock(outlines, grid, top, left, emit)
  }
}

function ringOf({ x, y, hole }: PlaneRing): Ring {
  const points = Array.from({ length: 2 * x.length }, (_, i) => (i % 2 ? y[i >> 1]! : x[i >> 1]!))
  const box = { west: least(x), east: most(x), south: least(y), north: most(y) }
  return { points, weight: Math.sign(flatArea(points)) * (hole ? -1 : 1), box }
}

function scanBlock(
  rings: readonly Ring[],
  grid: CurvilinearGrid,
  top: number,
  left: number,
  emit: (row: number, column: number, share: number) => void,
): void {
  const cells: { row: number; column: number; quad: QuadCell; box: QuadBox }[] = []
  const block: QuadBox = { west: Infinity, east: -Infinity, south: Infinity, north: -Infinity }
  for (let row = top; row < Math.min(top + blockSide, grid.rows); row++) {
    for (let column = left; column < Math.min(left + blockSide, grid.columns); column++) {
      const quad = quadCell(grid, row * grid.columns + column)
      if (!quad) continue
      const box = quadBox(quad)
      cells.push({ row, column, quad, box })
      block.west = Math.min(block.west, box.west)
      block.east = Math.max(block.east, box.east)
      block.south = Math.min(block.south, box.south)
      block.north = Math.max(block.north, box.north)
    }
  }
  const near = rings.flatMap((ring) => copiesNear(ring, block))
  if (near.length === 0) return
  for (const { row, column, quad, box } of cells) {
    const share = shareOf(quad, box, near)
    if (share > roundingShare) emit(row, column, share > 1 - roundingShare ? 1 : share)
  }
}

/** A ring moved by whole turns to wherever it meets a block, and cut to the block's box. */
function copiesNear(ring: Ring, block: QuadBox): Ring[] {
  const { box, points, weight } = ring
  if (box.south > block.north || box.north < block.south) return []
  const copies: Ring[] = []
  for (let turn = Math.ceil((block.west - box.east) / 360); turn <= Math.floor((block.east - box.west) / 360); turn++) {
    const moved = points.map((value, i) => (i % 2 ? value : value + 360 * turn))
    const cut = cutToBox(moved, block)
    if (cut.length >= 6) copies.push({ points: cut, weight, box: boxOf(cut) })
  }
  return copies
}

function cutToBox(points: readonly number[], { west, east, south, north }: QuadBox): number[] {
  let cut = clipRing(points, west, south, east, south)
  cut = clipRing(cut, east, south, east, north)
  cut = clipRing(cut, east, north, west, north)
  return clipRing(cut, west, north, west, south)
}

function shareOf(quad: QuadCell, box: QuadBox, rings: readonly Ring[]): number {
  const parts = isConvex(quad) ? [[0, 1, 2, 3]] : trianglesOf(quad)
  let [whole, inside] = [0, 0]
  for (const part of parts) {
    const corners = part.flatMap((i) => [quad.lons[i]!, quad.lats[i]!])
    const area = flatArea(corners)
    whole += Math.abs(area)
    const outline = area > 0 ? corners : reversed(corners)
    for (const ring of rings) {
      const { west, east, south, north } = ring.box
      if (west > box.east || east < box.west || south > box.north || north < box.south) continue
      inside += ring.weight * flatArea(cutToOutline(ring.points, outline))
    }
  }
  return inside / whole
}

function cutToOutline(points: readonly number[], outline: readonly number[]): number[] {
  let cut: number[] = [...points]
  for (let i = 0, n = outline.length; i < n && cut.length > 0; i += 2) {
    cut = clipRing(cut, outline[i]!, outline[i + 1]!, outline[(i + 2) % n]!, outline[(i + 3) % n]!)
  }
  return cut
}

function reversed(corners: readonly number[]): number[] {
  return Array.from(corners, (_, i) => corners[corners.length - 2 - i + 2 * (i % 2)]!)
}

function boxOf(points: readonly number[]): QuadBox {
  const box = { west: Infinity, east: -Infinity, south: Infinity, north: -Infinity }
  for (let i = 0; i < points.length; i += 2) {
    box.west = Math.min(box.west, points[i]!)
    box.east = Math.max(box.east, points[i]!)
    box.south = Math.min(box.south, points[i + 1]!)
    box.north = Math.max(box.north, points[i + 1]!)
  }
  return box
}

function least(values: ArrayLike<number>): number {
  let found = Infinity
  for (let i = 0; i < values.length; i++) found = Math.min(found, values[i]!)
  return found
}

function most(values: ArrayLike<number>): number {
  let found = -Infinity
  for (let i = 0; i < values.length; i++) found = Math.max(found, values[i]!)
  return found
}
