import type { Context } from '../context'

/** The newest view of an outline in a feed, with the layers it was made from; undefined where nothing was seen yet. */
export async function newestView(context: Context, geometryId: number, feedId: number): Promise<{ day: number; layerIds: number[] } | undefined> {
  const row = await context.db.first<{ day: number; layerIds: string }>(
    `SELECT s.day, (SELECT json_group_array(v.layer_id) FROM view_layers v WHERE v.geometry_id = s.geometry_id AND v.feed_id = s.feed_id AND v.day = s.day) AS layerIds
     FROM summaries s WHERE s.geometry_id = $geometryId AND s.feed_id = $feedId ORDER BY s.day DESC LIMIT 1`,
    { geometryId, feedId },
  )
  return row && { day: row.day, layerIds: JSON.parse(row.layerIds) as number[] }
}
