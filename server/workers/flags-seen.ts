import { cellsWith } from '../grids/flags'
import type { GridSource, GridVariable } from '../grids/grid-source'

/** What a file says of the quality of a variable's cells. */
export interface FlagsSeen {
  flags: { meaning: string; cells: number }[]
  gapFilled: 'marked' | 'unmarked' | null
}

const mostCells = 4_000_000

/** Cells of the first step that each flag meaning applies to; of a large grid, in as many of its rows as are looked at. */
export async function flagsSeen(source: GridSource, variable: GridVariable): Promise<FlagsSeen> {
  const { gapFilled, flags, grid, times } = variable
  const filled = gapFilled === undefined ? null : gapFilled.variable === null ? 'unmarked' : 'marked'
  if (!flags || times.length === 0) return { flags: [], gapFilled: filled }
  const rows = Math.min(grid.rows, Math.max(1, Math.floor(mostCells / grid.columns)))
  const window = { row: Math.floor((grid.rows - rows) / 2), column: 0, rows, columns: grid.columns }
  const cells = await source.readFlags(variable.name, 0, window, flags.variable)
  const counted = flags.meanings.map((meaning) => ({ meaning: meaning.name, cells: cellsWith(cells, meaning).reduce((sum, one) => sum + one, 0) }))
  return { flags: counted, gapFilled: filled }
}
