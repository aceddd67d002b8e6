import type { Context } from '../context'
import type { Transaction } from '../db'
import { giveWay, moreUrgent } from '../jobs/give-way'
import { enqueueJob, markProgress } from '../jobs/queue'
import type { JobRecord } from '../models/job'
import { layerIdsFromNewest } from '../queries/layers'
import { deriveLayers } from './derive-layers'
import { ensureFirstRule, regionsWithoutRule } from './first-rule'
import { queueJudging } from './queue-judging'
import { summariseLayers } from './summarise-layers'

const layersAtOnce = 62

export async function queueFeedBackfill(context: Context, tx: Transaction, feed: { id: number; name: string }): Promise<void> {
  await enqueueJob(context, tx, { kind: 'backfill-feed', key: String(feed.id), subject: feed.name, payload: { feedId: feed.id }, priority: 45 })
}

/**
 * Makes the layers of a new derived feed over all that its source holds, newest first, in small committed batches; the
 * mark of progress is how many source layers are done. Layers that arrive meanwhile are derived as they come.
 */
export async function backfillFeed(context: Context, job: JobRecord): Promise<'done' | 'paused'> {
  const feed = await context.models.feeds.findByPk(Number(job.payload['feedId']))
  if (!feed || feed.derivedFrom === null || feed.retired) return 'done'
  const sources = await layerIdsFromNewest(context, feed.derivedFrom)
  for (let done = Math.min(job.done, sources.length); done < sources.length; done += layersAtOnce) {
    await job.reload()
    if (job.state !== 'running') return 'paused'
    const batch = sources.slice(done, done + layersAtOnce)
    const derived = await deriveLayers(context, feed, batch)
    await summariseLayers(context, feed.id, derived, (tx) => markProgress(context, tx, job, done + batch.length, sources.length))
    context.news.tell({ topic: 'feeds', id: feed.id }, { topic: 'jobs', id: job.id })
    if (await moreUrgent(context, job)) return giveWay(context, job)
  }
  await context.db.write(async (tx) => {
    for (const region of await regionsWithoutRule(context, tx)) await ensureFirstRule(context, tx, region)
    await queueJudging(context, tx, { feedId: feed.id })
  })
  context.news.tell({ topic: 'feeds', id: feed.id }, { topic: 'regions' })
  return 'done'
}
