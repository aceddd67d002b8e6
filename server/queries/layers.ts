import type { Context } from '../context'

/** A layer with its grid's box and its file's name: what summarising and pictures need. */
export interface PlacedLayer {
  id: number
  feedId: number
  fileId: number
  gridId: number
  fileName: string
  checksum: string
  variable: string
  step: number
  observedAt: number
  endsAt: number | null
  hasClock: number
  processingVersion: string
  west: number
  south: number
  east: number
  north: number
  columns: number
}

const placed = `SELECT l.id, l.feed_id AS feedId, l.file_id AS fileId, l.grid_id AS gridId, f.name AS fileName, l.checksum, l.variable, l.step,
  l.observed_at AS observedAt, l.ends_at AS endsAt, l.has_clock AS hasClock, l.processing_version AS processingVersion,
  g.west, g.south, g.east, g.north, g.column_count AS columns
  FROM layers l JOIN files f ON f.id = l.file_id JOIN grids g ON g.id = l.grid_id`

export async function layersById(context: Context, ids: readonly number[]): Promise<PlacedLayer[]> {
  return context.db.all<PlacedLayer>(`${placed} WHERE l.id IN (SELECT value FROM json_each($ids)) ORDER BY l.id`, { ids: JSON.stringify(ids) })
}

/** Layers of a feed that people trust, observed between two instants (both included). */
export async function trustedLayers(context: Context, feedId: number, from: number, to: number): Promise<PlacedLayer[]> {
  return context.db.all<PlacedLayer>(
    `${placed} WHERE l.feed_id = $feedId AND l.observed_at BETWEEN $from AND $to AND l.suspect_at IS NULL ORDER BY l.observed_at, l.id`,
    { feedId, from, to },
  )
}
