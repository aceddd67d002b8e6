import type { Context } from '../context'
import type { JobRecord } from '../models/job'

/** New layers go before history: the job steps back and is taken up again where it stopped. */
export async function moreUrgent(context: Context, job: JobRecord): Promise<boolean> {
  const waiting = await context.db.first(`SELECT 1 AS one FROM jobs WHERE state = 'waiting' AND priority < $priority LIMIT 1`, { priority: job.priority })
  return waiting !== undefined
}

export async function giveWay(context: Context, job: JobRecord): Promise<'paused'> {
  await context.db.write((tx) => job.update({ state: 'waiting', leaseOwner: null, leaseUntil: null, attempts: 0 }, { transaction: tx }))
  return 'paused'
}
