import { dateOf, epochDayOf, type EpochDay } from '../../../shared/science/local-day'
import type { NewMask } from '../../../shared/schemas/masks'
import { audit } from '../../accounts/audit'
import type { Person } from '../../accounts/person'
import { ApiError } from '../../api-error'
import type { Context } from '../../context'
import { enqueueJob } from '../../jobs/queue'
import type { FeedRecord } from '../../models/feed'
import { trustedLayers, type PlacedLayer } from '../../queries/layers'
import { gridsOfFeed, type LayersOnGrid } from '../../queries/masks'
import { fullYears } from './full-years'
import { ownMarks } from './own-marks'

const dayMs = 86_400_000

/** Land does not move: so many files, spread over the period, say what their land is. */
const mostFilesAsked = 24

export const maskJobKey = (feedId: number, gridId: number) => `${feedId} ${gridId}`

/** Asks for a mask: which layers it is made from is settled now, so that what arrives later changes nothing. */
export async function queueMask(context: Context, person: Person, feedId: number, wish: NewMask): Promise<void> {
  const feed = await context.models.feeds.findByPk(feedId)
  if (!feed) throw new ApiError('not-found', 'There is no such feed.')
  const grid = (await gridsOfFeed(context, feedId)).find(({ gridId }) => gridId === wish.gridId)
  if (!grid) throw notValid('gridId', 'This feed has no trusted layer on such a grid.')
  const { fromDay, toDay } = periodOf(context, grid, wish)
  const layers = await layersOfPeriod(context, feed, grid, { fromDay, toDay })
  if (layers.length === 0) throw notValid('from', `No trusted layer of ${feed.name} lies between ${dateOf(fromDay)} and ${dateOf(toDay)}.`)
  if (wish.kind === 'own' && (await ownMarks(context, grid.newestLayerId)) === null) {
    throw notValid('kind', `The files of ${feed.name} carry no land flag and no land or sea mask that Offing understands.`)
  }
  const chosen = wish.kind === 'own' ? spread(layers, mostFilesAsked) : layers
  await keepWish(context, person, feed, { ...wish, fromDay, toDay, layerIds: chosen.map((layer) => layer.id) })
  context.news.tell({ topic: 'feeds', id: feedId }, { topic: 'jobs' })
  context.wake()
}

function periodOf(context: Context, { oldest }: LayersOnGrid, { from, to }: NewMask): { fromDay: EpochDay; toDay: EpochDay } {
  if (from !== undefined && to !== undefined) return { fromDay: epochDayOf(from), toDay: epochDayOf(to) }
  const years = fullYears(Math.floor(oldest / dayMs), Math.floor(context.clock.now() / dayMs))
  if (!years) throw notValid('from', 'There is no full calendar year of layers yet: name a period.')
  return years
}

/** Trusted layers of the grid, observed on days of the period (UTC). */
async function layersOfPeriod(context: Context, feed: FeedRecord, { gridId }: LayersOnGrid, { fromDay, toDay }: { fromDay: EpochDay; toDay: EpochDay }): Promise<PlacedLayer[]> {
  const layers = await trustedLayers(context, feed.id, fromDay * dayMs, (toDay + 1) * dayMs - 1)
  return layers.filter((layer) => layer.gridId === gridId)
}

/** The order is that of the layers themselves, not of their arrival, so that the same ones are taken in any case. */
function spread(layers: readonly PlacedLayer[], most: number): PlacedLayer[] {
  const ordered = [...layers].sort((a, b) => a.observedAt - b.observedAt || (a.checksum < b.checksum ? -1 : 1) || a.step - b.step)
  if (ordered.length <= most) return ordered
  return Array.from({ length: most }, (_, i) => ordered[Math.round((i * (ordered.length - 1)) / (most - 1))]!)
}

type Wish = NewMask & { fromDay: EpochDay; toDay: EpochDay; layerIds: number[] }

async function keepWish(context: Context, person: Person, feed: FeedRecord, { gridId, kind, minShare, fromDay, toDay, layerIds }: Wish): Promise<void> {
  const key = maskJobKey(feed.id, gridId)
  await context.db.write(async (tx) => {
    const running = await context.db.first(`SELECT 1 AS one FROM jobs WHERE kind = 'make-mask' AND job_key = $key AND state IN ('waiting', 'running', 'paused')`, { key }, tx)
    if (running) throw new ApiError('conflict', `A water mask of ${feed.name} is being made already. Wait for it, or cancel its job.`)
    await context.db.run('DELETE FROM mask_makings WHERE feed_id = $feedId AND grid_id = $gridId', { feedId: feed.id, gridId }, tx)
    await context.db.run(
      `INSERT INTO mask_makings (feed_id, grid_id, kind, from_day, to_day, min_share, layer_ids, asked_by, asked_at)
       VALUES ($feedId, $gridId, $kind, $fromDay, $toDay, $minShare, $layerIds, $askedBy, $at)`,
      { feedId: feed.id, gridId, kind, fromDay, toDay, minShare, layerIds: JSON.stringify(layerIds), askedBy: person.id, at: context.clock.now() },
      tx,
    )
    const making = await context.db.first<{ id: number }>('SELECT id FROM mask_makings WHERE feed_id = $feedId AND grid_id = $gridId', { feedId: feed.id, gridId }, tx)
    await enqueueJob(context, tx, { kind: 'make-mask', key, subject: feed.name, payload: { makingId: making!.id }, priority: 42 })
    const details = { mask: kind, from: dateOf(fromDay), to: dateOf(toDay), ...(kind === 'valid share' ? { minShare } : {}), layers: layerIds.length }
    await audit(context, tx, { userId: person.id, action: 'mask:make', subject: `feed ${feed.id}`, details })
  })
}

function notValid(field: string, message: string): ApiError {
  return new ApiError('not-valid', message, { fields: { [field]: message } })
}
