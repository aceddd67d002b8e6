import sharp from 'sharp'
import { chlorophyllRamp, rampColour, type Rgb } from '../../shared/ramps'
import type { GridWindow } from '../../shared/science/grid'
import { decodeGrid } from '../grids/grid-text'
import { projectTo } from '../grids/read/project'
import { cellFinder, type CellPlace } from '../pictures/cell-finder'
import { latitudeOf, longitudeOf, tileSize } from '../pictures/mercator'
import { readLayer } from './read-layer'
import type { Tasks } from './tasks'

const shades = 512
const tables = { light: tableOf('light'), night: tableOf('night') }

/** One map tile: cells stay cells, nothing is drawn where a value is missing. Null: the layer does not reach it. */
export async function drawTile({ layer, grid: text, z, x, y, theme }: Tasks['drawTile']['input']): Promise<Uint8Array | null> {
  const grid = decodeGrid(text)
  const find = cellFinder(grid, grid.kind === 'transform' ? projectTo(grid.crs) : undefined)
  const latitudes = pixels((pixel) => latitudeOf(z, y * tileSize + pixel))
  const longitudes = pixels((pixel) => longitudeOf(z, x * tileSize + pixel))
  const cells = latitudes.flatMap((lat) => longitudes.map((lon) => find(lon, lat)))
  const window = boxOf(cells)
  if (!window) return null
  const values = await readLayer(layer, window)
  const table = tables[theme]
  const pixelBytes = new Uint8Array(tileSize * tileSize * 4)
  let drawn = false
  for (const [i, cell] of cells.entries()) {
    const value = cell ? values[(cell.row - window.row) * window.columns + cell.column - window.column]! : NaN
    if (Number.isNaN(value)) continue
    drawn = true
    const [red, green, blue] = table[shadeOf(value)]!
    pixelBytes.set([red, green, blue, 255], i * 4)
  }
  if (!drawn) return null
  return sharp(pixelBytes, { raw: { width: tileSize, height: tileSize, channels: 4 } }).png({ compressionLevel: 6 }).toBuffer()
}

function pixels(f: (pixel: number) => number): number[] {
  return Array.from({ length: tileSize }, (_, pixel) => f(pixel + 0.5))
}

function tableOf(theme: 'light' | 'night'): Rgb[] {
  return Array.from({ length: shades }, (_, i) => rampColour(chlorophyllRamp[theme], 0.03 * 1000 ** (i / (shades - 1))))
}

function shadeOf(value: number): number {
  const place = value > 0 ? (Math.log(value / 0.03) / Math.log(1000)) * (shades - 1) : 0
  return Math.round(Math.min(Math.max(place, 0), shades - 1))
}

function boxOf(cells: (CellPlace | null)[]): GridWindow | null {
  let [top, bottom, left, right] = [Infinity, -1, Infinity, -1]
  for (const cell of cells) {
    if (!cell) continue
    top = Math.min(top, cell.row)
    bottom = Math.max(bottom, cell.row)
    left = Math.min(left, cell.column)
    right = Math.max(right, cell.column)
  }
  return bottom < 0 ? null : { row: top, column: left, rows: bottom - top + 1, columns: right - left + 1 }
}
