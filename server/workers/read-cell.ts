import { readLayer } from './read-layer'
import type { Tasks } from './tasks'

export async function readCell({ layer, row, column }: Tasks['readCell']['input']): Promise<number | null> {
  const [value] = await readLayer(layer, { row, column, rows: 1, columns: 1 })
  return value === undefined || Number.isNaN(value) ? null : value
}
