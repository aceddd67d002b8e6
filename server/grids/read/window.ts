import type { GridWindow } from '../../../shared/science/grid'
import type { GridVariable } from '../grid-source'
import { LayerRefused } from '../layer-refused'
import { maxWindowCells } from './limits'

/** A window that leaves the grid is a mistake of the caller; one that is too large is refused before reading. */
export function checkWindow({ name, grid, times }: GridVariable, step: number, window: GridWindow): void {
  const { row, column, rows, columns } = window
  const whole = [row, column, rows, columns, step].every((n) => Number.isInteger(n) && n >= 0)
  if (!whole || row + rows > grid.rows || column + columns > grid.columns || step >= times.length) {
    throw new RangeError(`${name}: step ${step}, window ${JSON.stringify(window)} leaves the grid`)
  }
  if (rows * columns > maxWindowCells) {
    throw new LayerRefused('too-large', `${rows * columns} cells of ${name} at once are more than Offing reads.`, {
      variable: name,
      cells: rows * columns,
      maxWindowCells,
    })
  }
}
