import type { Context } from '../context'
import type { Transaction } from '../db'
import { giveWay, moreUrgent } from '../jobs/give-way'
import { enqueueJob, markProgress } from '../jobs/queue'
import type { JobRecord } from '../models/job'
import { layersFromNewest } from '../queries/layers'
import { deriveLayers } from './derive-layers'
import { ensureFirstRule, regionsWithoutRule } from './first-rule'
import { queueJudging } from './queue-judging'
import { summariseLayers } from './summarise-layers'

const layersAtOnce = 62

export async function queueFeedBackfill(context: Context, tx: Transaction, feed: { id: number; name: string }): Promise<void> {
  await enqueueJob(context, tx, { kind: 'backfill-feed', key: String(feed.id), subject: feed.name, payload: { feedId: feed.id }, priority: 45 })
  // One that had begun under other settings begins again.
  await context.db.run(
    `UPDATE jobs SET done = 0, payload = json_remove(payload, '$.readTo') WHERE kind = 'backfill-feed' AND job_key = $key AND state = 'waiting'`,
    { key: String(feed.id) },
    tx,
  )
}

/**
 * Makes the history of a feed anew, newest first, in small committed batches: of a derived feed its layers over all that
 * its source holds, of any feed the figures of its layers. The mark of progress is the last layer done; layers that arrive
 * meanwhile are worked out as they come.
 */
export async function backfillFeed(context: Context, job: JobRecord): Promise<'done' | 'paused'> {
  const feed = await context.models.feeds.findByPk(Number(job.payload['feedId']))
  if (!feed || feed.retired) return 'done'
  const sources = await layersFromNewest(context, feed.derivedFrom ?? feed.id)
  for (let done = firstAfter(job.payload['readTo'], sources); done < sources.length; ) {
    await job.reload()
    if (job.state !== 'running') return 'paused'
    const batch = sources.slice(done, done + layersAtOnce)
    const ids = batch.map(({ id }) => id)
    const layers = feed.derivedFrom === null ? ids : await deriveLayers(context, feed, ids)
    done += batch.length
    await summariseLayers(context, feed.id, layers, async (tx) => {
      await job.update({ payload: { ...job.payload, readTo: placeOf(batch.at(-1)!) } }, { transaction: tx })
      await markProgress(context, tx, job, done, sources.length)
    })
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

type Source = Awaited<ReturnType<typeof layersFromNewest>>[number]

const placeOf = ({ observedAt, id }: Source) => `${observedAt}:${id}`

/** Where to go on: layers may have gone or come since, so the mark is a layer, not a number. */
function firstAfter(readTo: unknown, sources: readonly Source[]): number {
  if (typeof readTo !== 'string') return 0
  const [observedAt, id] = readTo.split(':').map(Number) as [number, number]
  const at = sources.findIndex((one) => one.observedAt < observedAt || (one.observedAt === observedAt && one.id < id))
  return at < 0 ? sources.length : at
}
