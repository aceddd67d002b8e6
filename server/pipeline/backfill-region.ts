import type { Context } from '../context'
import type { Transaction } from '../db'
import { giveWay, moreUrgent } from '../jobs/give-way'
import { enqueueJob, markProgress } from '../jobs/queue'
import type { JobRecord } from '../models/job'
import { ensureFirstRule } from './first-rule'
import { queueJudging } from './queue-judging'
import { boxesMeet } from './summarise-layers'
import { summariseViews, type ViewKey } from './summarise-views'
import { viewDay } from './view-day'

const viewsAtOnce = 120

interface KnownLayer {
  feedId: number
  observedAt: number
  endsAt: number | null
  hasClock: number
  west: number
  south: number
  east: number
  north: number
}

export async function queueBackfill(context: Context, tx: Transaction, region: { id: number; name: string; geometryId: number }): Promise<void> {
  await enqueueJob(context, tx, {
    kind: 'backfill-region',
    key: String(region.geometryId),
    subject: region.name,
    payload: { regionId: region.id, geometryId: region.geometryId },
    priority: 40,
  })
}

/**
 * Reads the history of a newly drawn outline, newest day first, in small committed batches; the mark of progress is
 * how many views are done, so a restart goes on from there.
 */
export async function backfillRegion(context: Context, job: JobRecord): Promise<'done' | 'paused'> {
  const geometry = await context.models.geometries.findByPk(Number(job.payload['geometryId']))
  const region = geometry && (await context.models.regions.findByPk(geometry.regionId))
  if (!geometry || !region || region.geometryId !== geometry.id || region.retiredAt !== null) return 'done'
  const keys = await viewsToRead(context, geometry.id, geometry)
  for (let done = Math.min(job.done, keys.length); done < keys.length; done += viewsAtOnce) {
    await job.reload()
    if (job.state !== 'running') return 'paused'
    const batch = keys.slice(done, done + viewsAtOnce)
    await summariseViews(context, batch, (tx) => markProgress(context, tx, job, done + batch.length, keys.length))
    context.news.tell({ topic: 'regions', id: region.id }, { topic: 'jobs', id: job.id })
    if (await moreUrgent(context, job)) return giveWay(context, job)
  }
  await context.db.write(async (tx) => {
    await ensureFirstRule(context, tx, region)
    await queueJudging(context, tx, { regionId: region.id })
  })
  context.news.tell({ topic: 'regions', id: region.id })
  return 'done'
}

async function viewsToRead(context: Context, geometryId: number, box: { west: number; south: number; east: number; north: number; centreLongitude: number }): Promise<ViewKey[]> {
  const layers = await context.db.all<KnownLayer>(
    `SELECT l.feed_id AS feedId, l.observed_at AS observedAt, l.ends_at AS endsAt, l.has_clock AS hasClock, g.west, g.south, g.east, g.north
     FROM layers l JOIN grids g ON g.id = l.grid_id WHERE l.suspect_at IS NULL`,
  )
  const keys = new Map<string, ViewKey>()
  for (const layer of layers) {
    if (!boxesMeet(box, layer)) continue
    const day = viewDay(layer, box.centreLongitude)
    keys.set(`${layer.feedId}:${day}`, { geometryId, feedId: layer.feedId, day })
  }
  return [...keys.values()].sort((a, b) => b.day - a.day || a.feedId - b.feedId)
}
