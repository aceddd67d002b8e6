import type { FoundCells, FoundHistogram } from '../../shared/schemas/found'
import type { GridWindow } from '../../shared/science/grid'
import { cellHolds, CellGroups, type FlagsRead } from './found-cells'
import type { GridSource, GridVariable } from './grid-source'
import { valueHistogram } from './value-histogram'

/** What the first step of a variable holds; of a very large grid, sixteen bands of its rows from the first to the last. */
export interface FirstStep {
  /** Cells looked at, and those with a value. */
  cells: number
  valid: number
  min: number | null
  median: number | null
  max: number | null
  /** Of all values, whatever flags their cells carry. */
  histogram: FoundHistogram | null
  /** Flag meanings found beside it, with the cells each applies to. */
  flags: { meaning: string; cells: number }[]
  /** 'marked': the file says which cells were filled in; 'unmarked': it says only that some were. */
  gapFilled: 'marked' | 'unmarked' | null
  found: FoundCells
}

const mostCells = 4_000_000
const bands = 16

export async function lookAtFirstStep(source: GridSource, variable: GridVariable): Promise<FirstStep> {
  const { grid, quantity, times, flags, gapFilled } = variable
  const groups = new CellGroups()
  const seen: Float64Array[] = []
  let cells = 0
  for (const window of times.length === 0 ? [] : bandsOf(grid.rows, grid.columns)) {
    const values = await source.readWindow(variable.name, 0, window)
    cells += values.length
    groups.add(await heldBy(source, variable, window, values), await flagsOf(source, variable, window))
    seen.push(values.filter((value) => !Number.isNaN(value)))
  }
  const sorted = joined(seen).sort()
  const histogram = valueHistogram(sorted, quantity === 'chlorophyll' ? 'log10' : 'linear')
  return {
    cells,
    valid: sorted.length,
    min: sorted[0] ?? null,
    median: histogram?.median ?? null,
    max: sorted[sorted.length - 1] ?? null,
    histogram,
    flags: cells === 0 ? [] : (flags?.meanings ?? []).map(({ name }) => ({ meaning: name, cells: groups.countOf(name) })),
    gapFilled: gapFilled === undefined ? null : gapFilled.variable === null ? 'unmarked' : 'marked',
    found: groups.found(),
  }
}

async function heldBy(source: GridSource, { name, validMin, validMax }: GridVariable, window: GridWindow, values: Float64Array): Promise<Uint8Array> {
  const ranged = validMin !== null || validMax !== null
  const outside = ranged ? await source.readOutside?.(name, 0, window) : undefined
  return Uint8Array.from(values, (value, cell) => (Number.isNaN(value) ? (outside?.[cell] ? cellHolds.outside : cellHolds.missing) : cellHolds.value))
}

async function flagsOf(source: GridSource, { name, flags, gapFilled }: GridVariable, window: GridWindow): Promise<FlagsRead[]> {
  const own = flags && { cells: await source.readFlags(name, 0, window, flags.variable), meanings: flags.meanings, filled: false }
  if (!gapFilled || gapFilled.variable === null) return own ? [own] : []
  const cells = own && gapFilled.variable === flags?.variable ? own.cells : await source.readFlags(name, 0, window, gapFilled.variable)
  return [...(own ? [own] : []), { cells, meanings: gapFilled.meanings, filled: true }]
}

function joined(parts: readonly Float64Array[]): Float64Array {
  const all = new Float64Array(parts.reduce((sum, { length }) => sum + length, 0))
  let filled = 0
  for (const part of parts) {
    all.set(part, filled)
    filled += part.length
  }
  return all
}

function bandsOf(rows: number, columns: number): GridWindow[] {
  if (rows * columns <= mostCells) return [{ row: 0, column: 0, rows, columns }]
  const height = Math.max(1, Math.floor(mostCells / bands / columns))
  const rowOf = (band: number) => Math.floor(((rows - height) * band) / (bands - 1))
  return Array.from({ length: bands }, (_, band) => ({ row: rowOf(band), column: 0, rows: height, columns }))
}
