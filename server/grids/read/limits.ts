import { LayerRefused } from '../layer-refused'

/** Declared sizes above these are refused before anything is allocated for them. */
export const maxCells = 400_000_000
/** Cells whose places are given one by one: granules of 3,232 by 3,200 cells fit. Looking at so many takes about 500 MB. */
export const maxCurvedCells = 12_000_000
/** Of those, cells whose bounds are read too: eight more numbers a cell. */
export const maxBoundedCells = 4_000_000
export const maxWindowCells = 160_000_000
export const maxSteps = 100_000
export const maxAxisLength = 1_000_000
export const maxVariables = 2_000
export const maxBands = 512
/** What a whole-file gzip may expand to. */
export const maxExpandedBytes = 4 * 1024 ** 3 - 1
export const maxChunkBytes = 256 * 1024 * 1024

export function checkDeclaredGrid(name: string, rows: number, columns: number, steps: number): void {
  if (rows * columns > maxCells) {
    throw new LayerRefused(
      'too-large',
      `The grid of ${name} declares ${rows} by ${columns} cells; Offing reads up to ${maxCells / 1e6} million.`,
      { variable: name, rows, columns, maxCells },
    )
  }
  if (steps > maxSteps) {
    throw new LayerRefused('too-large', `${name} declares ${steps} time steps; Offing reads up to ${maxSteps}.`, {
      variable: name,
      steps,
      maxSteps,
    })
  }
}
