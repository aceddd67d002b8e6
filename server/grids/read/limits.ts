import { LayerRefused } from '../layer-refused'

/** Declared sizes above these are refused before anything is allocated for them. */
export const maxCells = 400_000_000
/** Cells whose places are given one by one. */
export const maxCurvedCells = 25_000_000
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
