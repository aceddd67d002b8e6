import { defaultRule } from '../../shared/science/rule'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { RegionRow } from '../models/region'

/**
 * Every region starts with Offing's default rule on the feed it was drawn for, else on the first chlorophyll feed that
 * has seen it. Does nothing where a rule exists, or nothing has been seen yet.
 */
export async function ensureFirstRule(context: Context, tx: Transaction, region: RegionRow): Promise<void> {
  if ((await context.models.rules.count({ where: { regionId: region.id }, transaction: tx })) > 0) return
  const feedId = region.wantedFeedId ?? (await seenChlorophyllFeed(context, tx, region))
  if (feedId === null) return
  const now = context.clock.now()
  const rule = await context.models.rules.create(
    { regionId: region.id, feedId, name: 'Unusual chlorophyll', activeVersion: 1, createdBy: region.createdBy, createdAt: now },
    { transaction: tx },
  )
  await context.models.ruleVersions.create(
    { ruleId: rule.id, version: 1, definition: defaultRule(), note: 'The rule every region starts with.', createdBy: null, createdAt: now, activatedAt: now },
    { transaction: tx },
  )
}

async function seenChlorophyllFeed(context: Context, tx: Transaction, region: RegionRow): Promise<number | null> {
  const feed = await context.db.first<{ id: number }>(
    `SELECT f.id FROM feeds f WHERE f.quantity = 'chlorophyll' AND f.retired = 0
     AND EXISTS (SELECT 1 FROM summaries s WHERE s.geometry_id = $geometryId AND s.feed_id = f.id) ORDER BY f.derived_from IS NOT NULL, f.id LIMIT 1`,
    { geometryId: region.geometryId },
    tx,
  )
  return feed?.id ?? null
}

export async function regionsWithoutRule(context: Context, tx: Transaction): Promise<RegionRow[]> {
  const bare = await context.db.all<{ id: number }>(
    'SELECT id FROM regions WHERE retired_at IS NULL AND NOT EXISTS (SELECT 1 FROM rules WHERE region_id = regions.id)',
    {},
    tx,
  )
  return context.models.regions.findAll({ where: { id: bare.map((region) => region.id) }, transaction: tx })
}
