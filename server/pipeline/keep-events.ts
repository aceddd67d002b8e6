import type { BloomEvent } from '../../shared/science/events'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { EventRecord } from '../models/event'
import type { Subject } from './active-rule'

export interface KeptEvent extends BloomEvent {
  id: number
}

/**
 * Brings the stored events of a rule to what the fold gives. Events are matched by overlap, so that one which grew,
 * shrank or moved keeps its id; those no longer found go. Events over an earlier outline stay as they are.
 */
export async function keepEvents(
  context: Context,
  tx: Transaction,
  { rule, ruleVersion, region, geometry, feed }: Subject,
  found: readonly BloomEvent[],
  baselineId: number | null,
): Promise<KeptEvent[]> {
  const stored = await context.models.events.findAll({ where: { ruleId: rule.id, geometryId: geometry.id }, order: [['firstFlagged', 'ASC']], transaction: tx })
  const left = new Set(stored)
  const kept: KeptEvent[] = []
  for (const event of found) {
    const match = best(event, left)
    const { flaggedViews: _, ...fields } = event
    const row = { ...fields, ruleVersion, geometryId: geometry.id, baselineId }
    if (match) {
      left.delete(match)
      await match.update(row, { transaction: tx })
    }
    const id = match?.id ?? (await context.models.events.create({ ...row, regionId: region.id, feedId: feed.id, ruleId: rule.id }, { transaction: tx })).id
    kept.push({ ...event, id })
  }
  for (const gone of left) await gone.destroy({ transaction: tx })
  return kept
}

function best(event: BloomEvent, stored: ReadonlySet<EventRecord>): EventRecord | null {
  let match: EventRecord | null = null
  let most = 0
  for (const record of stored) {
    const days = Math.min(record.lastFlagged, event.lastFlagged) - Math.max(record.firstFlagged, event.firstFlagged) + 1
    if (days > most) {
      most = days
      match = record
    }
  }
  return match
}
