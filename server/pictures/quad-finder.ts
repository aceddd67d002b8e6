import type { CurvilinearGrid } from '../../shared/science/grid'
import { quadBox, type QuadBox, quadCell, type QuadCell, trianglesOf } from '../../shared/science/quad-cell'

interface Place {
  row: number
  column: number
}

const finders = new WeakMap<CurvilinearGrid, (lon: number, lat: number) => Place | null>()

/**
 * Answers which cell of a curvilinear grid holds a place, or null. Blocks of cells are sorted into boxes of about a
 * block's size once a grid; where cells overlap, the first that is found wins.
 */
export function quadFinder(grid: CurvilinearGrid): (lon: number, lat: number) => Place | null {
  const known = finders.get(grid)
  if (known) return known
  const finder = makeFinder(grid)
  finders.set(grid, finder)
  return finder
}

/** Cells are found in blocks of this many a side: a list of blocks is small even where cells are millions. */
const blockSide = 8

function makeFinder(grid: CurvilinearGrid): (lon: number, lat: number) => Place | null {
  const blocks = blocksOf(grid)
  const boxDeg = Math.min(10, Math.max(0.05, typicalSize(blocks)))
  const across = Math.ceil(360 / boxDeg)
  const boxes = new Map<number, Block[]>()
  for (const block of blocks) {
    const { west, east, south, north } = block.box
    for (let y = Math.floor((south + 90) / boxDeg); y <= Math.floor((north + 90) / boxDeg); y++) {
      for (const x of boxesBetween(west, east, boxDeg, across)) {
        const held = boxes.get(y * across + x)
        if (held) held.push(block)
        else boxes.set(y * across + x, [block])
      }
    }
  }
  return (lon, lat) => {
    const x = Math.floor(withinTurn(lon) / boxDeg)
    const y = Math.floor((lat + 90) / boxDeg)
    for (const block of boxes.get(y * across + x) ?? []) {
      const place = placeIn(grid, block, lon, lat)
      if (place) return place
    }
    return null
  }
}

interface Block {
  top: number
  left: number
  box: QuadBox
}

function blocksOf(grid: CurvilinearGrid): Block[] {
  const blocks: Block[] = []
  for (let top = 0; top < grid.rows; top += blockSide) {
    for (let left = 0; left < grid.columns; left += blockSide) {
      const box = blockBox(grid, top, left)
      if (box) blocks.push({ top, left, box })
    }
  }
  return blocks
}

/** The box round the cells of a block, all counted in the turn of the first of them; null when none has a place. */
function blockBox(grid: CurvilinearGrid, top: number, left: number): QuadBox | null {
  const box: QuadBox = { west: Infinity, east: -Infinity, south: Infinity, north: -Infinity }
  for (let row = top; row < Math.min(top + blockSide, grid.rows); row++) {
    for (let column = left; column < Math.min(left + blockSide, grid.columns); column++) {
      const quad = quadCell(grid, row * grid.columns + column)
      if (!quad) continue
      const cell = quadBox(quad)
      const turn = box.west === Infinity ? 0 : 360 * Math.round((cell.west - box.west) / 360)
      box.west = Math.min(box.west, cell.west - turn)
      box.east = Math.max(box.east, cell.east - turn)
      box.south = Math.min(box.south, cell.south)
      box.north = Math.max(box.north, cell.north)
    }
  }
  return box.west === Infinity ? null : box
}

function placeIn(grid: CurvilinearGrid, { top, left, box }: Block, lon: number, lat: number): Place | null {
  if (!inBox(box, lon, lat)) return null
  for (let row = top; row < Math.min(top + blockSide, grid.rows); row++) {
    for (let column = left; column < Math.min(left + blockSide, grid.columns); column++) {
      const quad = quadCell(grid, row * grid.columns + column)
      if (quad && holds(quad, lon, lat)) return { row, column }
    }
  }
  return null
}

const withinTurn = (lon: number): number => lon - 360 * Math.floor(lon / 360)

/** Boxes along a parallel; the last one before 360 may be narrower than the others. */
function* boxesBetween(west: number, east: number, boxDeg: number, across: number): Generator<number> {
  if (east - west >= 360 - boxDeg) {
    for (let x = 0; x < across; x++) yield x
    return
  }
  const first = Math.floor(withinTurn(west) / boxDeg)
  const last = Math.floor(withinTurn(east) / boxDeg)
  for (let x = first; ; x = (x + 1) % across) {
    yield x
    if (x === last) return
  }
}

/** The median height or width of the blocks, whichever is larger. */
function typicalSize(blocks: readonly Block[]): number {
  const sizes = blocks.map(({ box }) => Math.max(box.east - box.west, box.north - box.south)).sort((a, b) => a - b)
  return sizes[sizes.length >> 1] ?? 1
}

function inBox({ west, east, south, north }: QuadBox, lon: number, lat: number): boolean {
  return lat >= south && lat <= north && lon + 360 * Math.ceil((west - lon) / 360) <= east
}

function holds(quad: QuadCell, lon: number, lat: number): boolean {
  const box = quadBox(quad)
  if (!inBox(box, lon, lat)) return false
  const turned = lon + 360 * Math.ceil((box.west - lon) / 360)
  return trianglesOf(quad).some((triangle) => inTriangle(quad, triangle, turned, lat))
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
