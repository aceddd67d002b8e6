import type { Context } from '../context'
import type { Transaction } from '../db'
import { enqueueJob } from '../jobs/queue'
import { duePulls, setNextDue } from '../queries/pulls'
import { nextDue } from './schedule'

/** Queues every pull that is due and says when it is due next. Times missed while nothing ran are one. */
export async function queueDuePulls(context: Context): Promise<void> {
  const now = context.clock.now()
  if ((await duePulls(context.db, now)).length === 0) return
  await context.db.write(async (tx) => {
    for (const pull of await duePulls(context.db, now, tx)) {
      await queuePull(context, tx, { id: pull.feedId, name: pull.feedName })
      await setNextDue(context.db, tx, pull.feedId, nextDue(pull, now))
    }
  })
}

export async function queuePull(context: Context, tx: Transaction, feed: { id: number; name: string }): Promise<void> {
  await enqueueJob(context, tx, { kind: 'pull-feed', key: String(feed.id), subject: feed.name, payload: { feedId: feed.id }, priority: 30 })
}
