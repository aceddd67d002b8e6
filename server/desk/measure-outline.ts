import type { z } from 'zod'
import type { Measurement, measureRequest } from '../../shared/schemas/outlines'
import type { Context } from '../context'
import { gridOf } from '../pipeline/known-grids'
import { maskBits, maskInForce } from '../pipeline/masks/mask-in-force'
import { boxesMeet } from '../pipeline/summarise-layers'
import { feedGrids } from '../queries/feed-grids'
import { presentOutline, presentRefusal } from './present-outline'

/** An outline as it would be kept, and what the newest grid of each feed would hold of it. Nothing is saved. */
export async function measureOutline(context: Context, { geometry, shoreBufferKm, inland }: z.infer<typeof measureRequest>): Promise<Measurement> {
  const newest = await feedGrids(context)
  const masks = await Promise.all(newest.map((feed) => maskInForce(context, feed.feedId, feed.gridId)))
  const bits = await Promise.all(masks.map((mask) => maskBits(context, mask.id)))
  // Feeds on one grid are measured once, unless masks of their own tell them apart.
  const names = newest.map(({ gridId }, i) => (bits[i] ? `${gridId} ${masks[i]!.id}` : String(gridId)))
  const ids = [...new Set(names)]
  const grids = await Promise.all(
    ids.map(async (name) => {
      const at = names.indexOf(name)
      const { gridId, west, south, east, north } = newest[at]!
      const mask = bits[at]
      return { grid: await gridOf(context, gridId), west, south, east, north, ...(mask ? { mask } : {}) }
    }),
  )
  const answer = await context.workers.light('measureOutline', { sent: geometry, inland, shoreBufferKm, grids })
  if ('refused' in answer) return { outline: null, refusal: presentRefusal(answer.refused), feeds: [] }
  const { outline, counts } = answer
  return {
    outline: presentOutline(outline),
    refusal: null,
    feeds: newest.map((feed, i) => {
      const meets = boxesMeet(outline.box, feed)
      const count = counts[ids.indexOf(names[i]!)]!
      return { feedId: feed.feedId, name: feed.name, ...(meets ? count : nothing) }
    }),
  }
}

const nothing = { exact: true, cells: 0, wholeCells: 0, waterAreaKm2: 0, nearLandShare: null }
