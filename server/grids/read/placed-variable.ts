import type { GridWindow } from '../../../shared/science/grid'
import type { GridVariable } from '../grid-source'
import type { Packing } from './cf-packing'
import type { Meaning } from './quantity'
import type { RawVariable } from './raw-netcdf'

/** A variable of a NetCDF file with all that is needed to read a window of it. */
export interface PlacedVariable {
  raw: RawVariable
  variable: GridVariable
  packing: Packing
  meaning: Meaning
  rowAxis: number
  columnAxis: number
  stepAxis: number | null
  /** Index along every other dimension: that of the surface. */
  start: readonly number[]
}

export function find(placed: readonly PlacedVariable[], name: string): PlacedVariable {
  const found = placed.find(({ variable }) => variable.name === name)
  if (!found) throw new RangeError(`the file has no gridded variable ${name}`)
  return found
}

/** The block of the file's own dimensions that holds a window. */
export function blockOf({ raw, rowAxis, columnAxis, stepAxis, start: surface }: PlacedVariable, step: number, window: GridWindow) {
  const start = [...surface]
  const count = raw.dimensions.map(() => 1)
  start[rowAxis] = window.row
  count[rowAxis] = window.rows
  start[columnAxis] = window.column
  count[columnAxis] = window.columns
  if (stepAxis !== null) start[stepAxis] = step
  return { start, count }
}

/** A block as it came, turned where the file has its columns before its rows. */
export function upright<T extends Float64Array | Uint32Array | Uint8Array>(
  { rowAxis, columnAxis }: PlacedVariable,
  block: T,
  { rows, columns }: GridWindow,
): T {
  if (rowAxis < columnAxis) return block
  const turned = block.slice() as T
  for (let row = 0; row < rows; row++) {
    for (let column = 0; column < columns; column++) turned[row * columns + column] = block[column * rows + row]!
  }
  return turned
}
