import type { Severity } from '../../shared/schemas/common'
import type { Database, Transaction } from '../db'
import type { Delivery } from '../models/subscription'

export interface SubscriptionListRow {
  id: number
  userId: number
  userName: string
  email: string
  allRegions: number
  regionIds: string
  minimumSeverity: Severity
  delivery: Delivery
  pausedUntil: number | null
  version: number
}

const select = `SELECT s.id, s.user_id AS userId, u.name AS userName, u.email, s.all_regions AS allRegions,
  (SELECT json_group_array(region_id) FROM subscription_regions r WHERE r.subscription_id = s.id) AS regionIds,
  s.minimum_severity AS minimumSeverity, s.delivery, s.paused_until AS pausedUntil, s.version
  FROM subscriptions s JOIN users u ON u.id = s.user_id`

/** Of one person, or of everybody where `userId` is null. */
export function subscriptionsAfter(db: Database, userId: number | null, afterId: number, limit: number) {
  return db.all<SubscriptionListRow>(
    `${select} WHERE s.id > $afterId AND ($userId IS NULL OR s.user_id = $userId) ORDER BY s.id LIMIT $limit`,
    { userId, afterId, limit },
  )
}

export function subscriptionById(db: Database, id: number, tx?: Transaction) {
  return db.first<SubscriptionListRow>(`${select} WHERE s.id = $id`, { id }, tx)
}

export async function setSubscriptionRegions(db: Database, id: number, regionIds: readonly number[], tx: Transaction): Promise<void> {
  await db.run('DELETE FROM subscription_regions WHERE subscription_id = $id', { id }, tx)
  await db.run(
    'INSERT INTO subscription_regions (subscription_id, region_id) SELECT DISTINCT $id, value FROM json_each($regionIds)',
    { id, regionIds: JSON.stringify(regionIds) },
    tx,
  )
}

export async function unknownRegions(db: Database, regionIds: readonly number[], tx: Transaction): Promise<number[]> {
  const rows = await db.all<{ id: number }>(
    'SELECT value AS id FROM json_each($regionIds) WHERE value NOT IN (SELECT id FROM regions)',
    { regionIds: JSON.stringify(regionIds) },
    tx,
  )
  return rows.map((row) => row.id)
}
