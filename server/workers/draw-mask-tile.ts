import { inflateSync } from 'node:zlib'
import sharp from 'sharp'
import { maskInks, strokeAt, type MaskGround } from '../../shared/mask-picture'
import { bitAt } from '../../shared/science/water-mask'
import { isLand } from '../geography/land'
import { cellCentre } from '../grids/cell-centre'
import { decodeGrid } from '../grids/grid-text'
import { projectTo } from '../grids/read/project'
import { tileSize } from '../pictures/mercator'
import { tileCells } from '../pictures/tile-cells'
import type { MaskTasks } from './mask-tasks'

/** Water, land, and where the mask and the land outline differ; nothing outside the grid. Null: nothing at all. */
export async function drawMaskTile({ grid: text, water, z, x, y, theme }: MaskTasks['drawMaskTile']['input']): Promise<Uint8Array | null> {
  const grid = decodeGrid(text)
  const bits = water && inflateSync(water)
  const { split, rows, columns } = tileCells(grid, z, x, y, grid.kind === 'transform' ? projectTo(grid.crs) : undefined)
  const grounds = new Map<number, MaskGround>()
  const groundOf = (cell: number): MaskGround => {
    const known = grounds.get(cell)
    if (known) return known
    const outline = !isLand(...cellCentre(grid, cell))
    const is = bits ? bitAt(bits, cell) === 1 : outline
    const ground = is === outline ? (is ? 'water' : 'land') : is ? 'gained' : 'lost'
    grounds.set(cell, ground)
    return ground
  }
  const pixels = new Uint8Array(tileSize * tileSize * 4)
  let drawn = false
  for (let py = 0, i = 0; py < tileSize; py++) {
    for (let px = 0; px < tileSize; px++, i++) {
      const [row, column] = split ? [rows[py]!, columns[px]!] : [rows[i]!, columns[i]!]
      if (row < 0 || column < 0) continue
      const ground = groundOf(row * grid.columns + column)
      const { fill, stroke } = maskInks[theme][ground]
      pixels.set(strokeAt(ground, px, py) ? stroke : fill, i * 4)
      pixels[i * 4 + 3] = 255
      drawn = true
    }
  }
  return drawn ? sharp(pixels, { raw: { width: tileSize, height: tileSize, channels: 4 } }).png({ compressionLevel: 6 }).toBuffer() : null
}
