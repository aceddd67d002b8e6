import type { Context } from '../context'
import type { Transaction } from '../db'
import { enqueueJob } from '../jobs/queue'

/** Queues judging for the rules of a feed, or of one region, that are switched on. */
export async function queueJudging(context: Context, tx: Transaction, of: { feedId?: number; regionId?: number }): Promise<void> {
  const rules = await context.db.all<{ id: number; name: string }>(
    `SELECT ru.id, re.name FROM rules ru JOIN regions re ON re.id = ru.region_id
     WHERE ru.active_version IS NOT NULL AND re.retired_at IS NULL
       AND ($feedId IS NULL OR ru.feed_id = $feedId) AND ($regionId IS NULL OR ru.region_id = $regionId)`,
    { feedId: of.feedId ?? null, regionId: of.regionId ?? null },
    tx,
  )
  for (const rule of rules) {
    await enqueueJob(context, tx, { kind: 'judge-region', key: String(rule.id), subject: rule.name, payload: { ruleId: rule.id }, priority: 30 })
  }
}
