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
  // One that had begun under other settings begins again.
  await context.db.run(`UPDATE jobs SET done = 0 WHERE kind = 'backfill-feed' AND job_key = $key AND state = 'waiting'`, { key: String(feed.id) }, tx)
}

/**
 * Makes the history of a feed anew, newest first, in small committed batches: of a derived feed its layers over all that
 * its source holds, of any feed the figures of its layers. The mark of progress is how many layers are done; layers that
 * arrive meanwhile are worked out as they come.
 */
export async function backfillFeed(context: Context, job: JobRecord): Promise<'done' | 'paused'> {
  const feed = await context.models.feeds.findByPk(Number(job.payload['feedId']))
  if (!feed || feed.retired) return 'done'
  const sources = await layerIdsFromNewest(context, feed.derivedFrom ?? feed.id)
  for (let done = Math.min(job.done, sources.length); done < sources.length; done += layersAtOnce) {
    await job.reload()
    if (job.state !== 'running') return 'paused'
    const batch = sources.slice(done, done + layersAtOnce)
    const layers = feed.derivedFrom === null ? batch : await deriveLayers(context, feed, batch)
    await summariseLayers(context, feed.id, layers, (tx) => markProgress(context, tx, job, done + batch.length, sources.length))
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
