import type { z } from 'zod'
import type { Measurement, measureRequest } from '../../shared/schemas/outlines'
import type { Context } from '../context'
import { gridOf } from '../pipeline/known-grids'
import { boxesMeet } from '../pipeline/summarise-layers'
import { feedGrids } from '../queries/feed-grids'
import { presentOutline, presentRefusal } from './present-outline'

/** An outline as it would be kept, and what the newest grid of each feed would hold of it. Nothing is saved. */
export async function measureOutline(context: Context, { geometry, shoreBufferKm, inland }: z.infer<typeof measureRequest>): Promise<Measurement> {
  const newest = await feedGrids(context)
  const ids = [...new Set(newest.map((feed) => feed.gridId))]
  const boxes = ids.map((id) => newest.find((feed) => feed.gridId === id)!)
  const grids = await Promise.all(boxes.map(async ({ gridId, west, south, east, north }) => ({ grid: await gridOf(context, gridId), west, south, east, north })))
  const answer = await context.workers.light('measureOutline', { sent: geometry, inland, shoreBufferKm, grids })
  if ('refused' in answer) return { outline: null, refusal: presentRefusal(answer.refused), feeds: [] }
  const { outline, counts } = answer
  return {
    outline: presentOutline(outline),
    refusal: null,
    feeds: newest.map((feed) => {
      const meets = boxesMeet(outline.box, feed)
      const count = counts[ids.indexOf(feed.gridId)]!
      return { feedId: feed.feedId, name: feed.name, ...(meets ? count : nothing) }
    }),
  }
}

const nothing = { exact: true, cells: 0, wholeCells: 0, waterAreaKm2: 0, nearLandShare: null }
