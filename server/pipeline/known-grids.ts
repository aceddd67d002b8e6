import type { Grid } from '../../shared/science/grid'
import type { Context } from '../context'
import { decodeGrid } from '../grids/grid-text'

const known = new WeakMap<Context, Map<number, Grid>>()

/** A grid by its id, decoded once. Grids never change. */
export async function gridOf(context: Context, gridId: number): Promise<Grid> {
  const grids = known.get(context) ?? new Map<number, Grid>()
  known.set(context, grids)
  const before = grids.get(gridId)
  if (before) return before
  const row = await context.db.first<{ definition: string }>('SELECT definition FROM grids WHERE id = $gridId', { gridId })
  if (!row) throw new Error(`There is no grid ${gridId}.`)
  const grid = decodeGrid(row.definition)
  grids.set(gridId, grid)
  return grid
}
