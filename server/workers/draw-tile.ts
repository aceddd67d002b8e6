import sharp from 'sharp'
import { shadesOf, shareOf, type Colouring } from '../../shared/colouring'
import type { GridWindow } from '../../shared/science/grid'
import { decodeGrid } from '../grids/grid-text'
import { projectTo } from '../grids/read/project'
import { tileSize } from '../pictures/mercator'
import { boxOf, runsOf, tileCells, type TileCells } from '../pictures/tile-cells'
import type { PictureTasks } from './picture-tasks'
import { readLayer } from './read-layer'

/** A tile of a small zoom covers more cells than it has pixels: they are read in bands of at most so many. */
const mostCells = 4_000_000
const shades = 512

type Input = PictureTasks['drawTile']['input']

/** One map tile: cells stay cells, nothing is drawn where a value is missing. Null: the layer has nothing to show in it. */
export async function drawTile(input: Input): Promise<Uint8Array | null> {
  const grid = decodeGrid(input.grid)
  const cells = tileCells(grid, input.z, input.x, input.y, grid.kind === 'transform' ? projectTo(grid.crs) : undefined)
  const values = await (cells.split ? valuesOfRuns(input, cells, grid.columns >> 1) : valuesOfBox(input, cells))
  const pixels = values && painted(values, input.colouring, input.theme)
  if (!pixels) return null
  return sharp(pixels, { raw: { width: tileSize, height: tileSize, channels: 4 } }).png({ compressionLevel: 6 }).toBuffer()
}

/** A value a pixel, row-major; null when no pixel lies in a cell. */
async function valuesOfRuns({ layer, range }: Input, { rows, columns }: TileCells, seam: number): Promise<Float64Array | null> {
  const across = runsOf(columns, seam)
  const down = runsOf(rows, Infinity)
  if (across.length === 0 || down.length === 0) return null
  const pixels = new Float64Array(tileSize * tileSize).fill(NaN)
  for (const { first, last, low, high } of across) {
    const width = high - low + 1
    const most = Math.max(1, Math.floor(mostCells / width))
    for (const run of down) {
      for (let from = run.first; from < run.last; ) {
        const to = bandEnd(rows, from, run.last, most)
        const top = Math.min(rows[from]!, rows[to - 1]!)
        const window = { row: top, column: low, rows: Math.max(rows[from]!, rows[to - 1]!) - top + 1, columns: width }
        const values = await readLayer(layer, range, window)
        for (let py = from; py < to; py++) {
          const start = (rows[py]! - top) * width - low
          for (let px = first; px < last; px++) pixels[py * tileSize + px] = values[start + columns[px]!]!
        }
        from = to
      }
    }
  }
  return pixels
}

/** The pixel row to stop before, so that the rows of cells in between are at most so many; one pixel row always goes. */
function bandEnd(rows: Int32Array, from: number, last: number, most: number): number {
  let to = from + 1
  while (to < last && Math.abs(rows[to]! - rows[from]!) < most) to++
  return to
}

async function valuesOfBox({ layer, range }: Input, cells: TileCells): Promise<Float64Array | null> {
  const box = boxOf(cells)
  if (!box) return null
  const pixels = new Float64Array(tileSize * tileSize).fill(NaN)
  const most = Math.max(1, Math.floor(mostCells / box.columns))
  for (let row = box.row; row < box.row + box.rows; row += most) {
    const band: GridWindow = { ...box, row, rows: Math.min(most, box.row + box.rows - row) }
    const values = await readLayer(layer, range, band)
    for (let i = 0; i < pixels.length; i++) {
      const at = cells.rows[i]! - row
      if (cells.rows[i]! >= 0 && at >= 0 && at < band.rows) pixels[i] = values[at * band.columns + cells.columns[i]! - band.column]!
    }
  }
  return pixels
}

function painted(values: Float64Array, colouring: Colouring, theme: Input['theme']): Uint8Array | null {
  const table = shadesOf(colouring, theme, shades)
  const pixels = new Uint8Array(values.length * 4)
  let drawn = false
  for (let i = 0; i < values.length; i++) {
    const value = values[i]!
    if (Number.isNaN(value)) continue
    drawn = true
    const shade = Math.round(shareOf(colouring, value) * (shades - 1)) * 3
    pixels[i * 4] = table[shade]!
    pixels[i * 4 + 1] = table[shade + 1]!
    pixels[i * 4 + 2] = table[shade + 2]!
    pixels[i * 4 + 3] = 255
  }
  return drawn ? pixels : null
}
