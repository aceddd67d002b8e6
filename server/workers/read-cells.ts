import { LayerRefused } from '../grids/layer-refused'
import type { CellAsked, PictureTasks, ValidRange } from './picture-tasks'
import { readLayer } from './read-layer'

/**
 * The same place in many layers, one after the other: layers of one file follow each other, so each file is
 * opened once. A file that cannot be read any more spoils its own cells only, unless it is the only one asked for.
 */
export async function readCells({ cells, range }: PictureTasks['readCells']['input']): Promise<(number | null)[]> {
  const values: (number | null)[] = new Array<number | null>(cells.length).fill(null)
  const inOrder = [...cells.keys()].sort((a, b) => cells[a]!.layer.path.localeCompare(cells[b]!.layer.path) || a - b)
  for (const at of inOrder) values[at] = await readCell(cells[at]!, range, cells.length > 1)
  return values
}

async function readCell({ layer, row, column }: CellAsked, range: ValidRange, oneOfMany: boolean): Promise<number | null> {
  try {
    const [value] = await readLayer(layer, range, { row, column, rows: 1, columns: 1 })
    return value === undefined || Number.isNaN(value) ? null : value
  } catch (error) {
    if (oneOfMany && error instanceof LayerRefused) return null
    throw error
  }
}
