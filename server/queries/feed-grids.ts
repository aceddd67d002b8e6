import type { Context } from '../context'

export interface FeedGrid {
  feedId: number
  name: string
  gridId: number
  west: number
  south: number
  east: number
  north: number
}

/** The grid of the newest trusted layer of each feed in use, by id of the feed. Feeds without a layer have none. */
export async function feedGrids(context: Context): Promise<FeedGrid[]> {
  return context.db.all<FeedGrid>(
    `SELECT f.id AS feedId, f.name, g.id AS gridId, g.west, g.south, g.east, g.north FROM feeds f
     JOIN layers l ON l.id = (SELECT id FROM layers WHERE feed_id = f.id AND suspect_at IS NULL AND replaced_by IS NULL ORDER BY observed_at DESC LIMIT 1)
     JOIN grids g ON g.id = l.grid_id WHERE f.retired = 0 ORDER BY f.id`,
  )
}
