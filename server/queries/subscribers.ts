import { severities } from '../../shared/schemas/common'
import type { Context } from '../context'
import type { Transaction } from '../db'

export interface Subscriber {
  userId: number
  name: string
  email: string
}

/** People who hear of a region at once, from a severity on: each once, whatever number of subscriptions says so. */
export async function subscribersOf(context: Context, tx: Transaction, regionId: number, severityRank: number): Promise<Subscriber[]> {
  return context.db.all<Subscriber>(
    `SELECT DISTINCT u.id AS userId, u.name, u.email FROM subscriptions s JOIN users u ON u.id = s.user_id
     WHERE u.disabled = 0 AND s.delivery = 'at once' AND (s.paused_until IS NULL OR s.paused_until <= $now)
       AND s.minimum_severity IN (SELECT value FROM json_each($heard))
       AND (s.all_regions = 1 OR EXISTS (SELECT 1 FROM subscription_regions r WHERE r.subscription_id = s.id AND r.region_id = $regionId))
     ORDER BY u.id`,
    { regionId, now: context.clock.now(), heard: JSON.stringify(severities.slice(0, severityRank + 1)) },
    tx,
  )
}
