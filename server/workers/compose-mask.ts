import { createHash } from 'node:crypto'
import { deflateSync } from 'node:zlib'
import type { Grid } from '../../shared/science/grid'
import { bitAt, emptyBits, isOftenSeen, setBit } from '../../shared/science/water-mask'
import { outlineWater } from '../geography/grid-outline'
import { tileBox } from '../grids/decoded/tile-pack'
import { decodeGrid } from '../grids/grid-text'
import type { ComposedMask, MaskTasks } from './mask-tasks'

type Input = MaskTasks['composeMask']['input']

/** The mask that counts give: where nothing was counted, it is as the land outline has it. */
export function composeMask(input: Input): ComposedMask {
  const grid = decodeGrid(input.grid)
  const outline = outlineWater(grid)
  const { bits, byOutline } = waterBits(grid, outline, input)
  const cells = grid.rows * grid.columns
  let [waterCells, gained, lost] = [0, 0, 0]
  for (let cell = 0; cell < cells; cell++) {
    const [is, was] = [bitAt(bits, cell), bitAt(outline, cell)]
    waterCells += is
    if (is > was) gained++
    else if (was > is) lost++
  }
  return { water: deflateSync(bits, { level: 9 }), checksum: maskChecksum(bits, input), waterCells, gained, lost, byOutline }
}

function waterBits(grid: Grid, outline: Uint8Array, { tiles, counts, kind, layers, minShare }: Input): { bits: Uint8Array; byOutline: number } {
  const cells = grid.rows * grid.columns
  const bits = emptyBits(cells)
  const told = emptyBits(cells)
  let at = 0
  for (const tile of tiles) {
    const box = tileBox(grid, tile)
    for (let row = box.row; row < box.row + box.rows; row++) {
      for (let column = box.column; column < box.column + box.columns; column++, at++) {
        const [water, known] = [counts.water[at]!, counts.known[at]!]
        if (known === 0) continue
        const cell = row * grid.columns + column
        setBit(told, cell)
        // Files that disagree about land (an early version with another coast) are decided by most of them.
        if (kind === 'own' ? isOftenSeen(water, known, 0.5) : isOftenSeen(water, layers, minShare)) setBit(bits, cell)
      }
    }
  }
  let byOutline = 0
  for (let cell = 0; cell < cells; cell++) {
    if (bitAt(told, cell)) continue
    byOutline++
    if (bitAt(outline, cell)) setBit(bits, cell)
  }
  return { bits, byOutline }
}

/** The same for two masks exactly when they say the same of every cell, made in the same way of the same period. */
function maskChecksum(bits: Uint8Array, { kind, fromDay, toDay, minShare, grid }: Input): string {
  const how = JSON.stringify([kind, fromDay, toDay, kind === 'own' ? null : minShare])
  return createHash('sha256').update(how).update(grid).update(bits).digest('hex')
}
