import type { GridWindow } from '../../../shared/science/grid'
import { tileBox, tilesAcross, tileSide, type PackShape } from './tile-pack'

/** A rectangle to read at once, and the tiles that are wanted of it. */
export interface TileRectangle {
  window: GridWindow
  tiles: number[]
}

interface Box {
  top: number
  left: number
  bottom: number
  right: number
  tiles: number[]
}

/** Reading a little too much costs less than reading twice: two rectangles are one where that adds at most a third. */
const slack = 4 / 3

/** Wanted tiles as few rectangles, in rows and columns of the grid. */
export function tileRectangles(shape: PackShape, tiles: readonly number[]): TileRectangle[] {
  const across = tilesAcross(shape)
  let boxes: Box[] = runs(tiles, across)
  for (let merged = true; merged; ) {
    merged = false
    const next: Box[] = []
    for (const box of boxes) {
      const at = next.findIndex((other) => area(union(other, box)) <= slack * (area(other) + area(box)))
      if (at < 0) next.push(box)
      else {
        next[at] = union(next[at]!, box)
        merged = true
      }
    }
    boxes = next
  }
  return boxes.map((box) => ({ window: windowOf(shape, box), tiles: box.tiles }))
}

/** Neighbours within a row of tiles. */
function runs(tiles: readonly number[], across: number): Box[] {
  const boxes: Box[] = []
  for (const tile of [...tiles].sort((a, b) => a - b)) {
    const [row, column] = [Math.floor(tile / across), tile % across]
    const last = boxes.at(-1)
    if (last && last.top === row && last.right === column - 1) {
      last.right = column
      last.tiles.push(tile)
    } else boxes.push({ top: row, bottom: row, left: column, right: column, tiles: [tile] })
  }
  return boxes
}

const area = ({ top, left, bottom, right }: Box) => (bottom - top + 1) * (right - left + 1)

function union(a: Box, b: Box): Box {
  return {
    top: Math.min(a.top, b.top),
    left: Math.min(a.left, b.left),
    bottom: Math.max(a.bottom, b.bottom),
    right: Math.max(a.right, b.right),
    tiles: [...a.tiles, ...b.tiles],
  }
}

function windowOf(shape: PackShape, { top, left, bottom, right }: Box): GridWindow {
  const first = tileBox(shape, top * tilesAcross(shape) + left)
  const last = tileBox(shape, bottom * tilesAcross(shape) + right)
  return { row: top * tileSide, column: left * tileSide, rows: last.row + last.rows - first.row, columns: last.column + last.columns - first.column }
}
