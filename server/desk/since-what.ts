import type { Context } from '../context'
import type { Transaction } from '../db'
import type { AlertRecord } from '../models/alert'
import type { Subject } from '../pipeline/active-rule'
import { maskText } from '../pipeline/masks/mask-in-force'

/** What an alert is judged anew after: another water mask than it was raised by, else other layers. */
export async function sinceWhat(context: Context, tx: Transaction, { geometry, feed }: Subject, alert: AlertRecord): Promise<string> {
  const mask = await context.db.first<{ kind: string; version: number }>(
    `SELECT m.kind, m.version FROM summaries s JOIN provenances p ON p.id = s.provenance_id JOIN masks m ON m.id = p.mask_id
     WHERE s.geometry_id = $geometryId AND s.feed_id = $feedId ORDER BY s.day DESC LIMIT 1`,
    { geometryId: geometry.id, feedId: feed.id },
    tx,
  )
  const isOther = mask !== undefined && maskText(mask) !== alert.evidence.waterMask
  return isOther ? `By the water mask now in force (${maskText(mask)})` : 'After late or corrected layers'
}
