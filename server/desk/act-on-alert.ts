import { ApiError } from '../api-error'
import type { Person } from '../accounts/person'
import { audit } from '../accounts/audit'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { AlertRecord, AlertRow } from '../models/alert'
import type { EntryKind } from '../models/alert-entry'

export interface Act {
  alertId: number
  person: Person
  kind: EntryKind
  /** What the acting person saw; when it is stale nothing is written. */
  version?: number | undefined
  text: string
  /** What changes, or the sentence that says why it can't. */
  change(alert: AlertRow, now: number): Partial<AlertRow> | { conflict: string }
}

/**
 * One act of a person on an alert: checked against what they saw, written with its entry in the timeline and the audit.
 * When two act at once the second is told, and nothing is overwritten.
 */
export async function actOnAlert(context: Context, act: Act): Promise<AlertRecord> {
  const alert = await context.db.write(async (tx) => {
    const record = await context.models.alerts.findByPk(act.alertId, { transaction: tx })
    if (!record) throw new ApiError('not-found', 'There is no such alert.')
    if (act.version !== undefined && act.version !== record.version) {
      throw new ApiError('stale-version', `Somebody else changed this alert meanwhile: ${await standsNow(context, record, tx)}`, { version: record.version })
    }
    const change = act.change(record.get({ plain: true }), context.clock.now())
    if ('conflict' in change) throw new ApiError('conflict', `${change.conflict} ${await standsNow(context, record, tx)}`, { version: record.version })
    await record.update({ ...change, version: record.version + 1 }, { transaction: tx })
    await context.models.alertEntries.create(
      { alertId: record.id, at: context.clock.now(), kind: act.kind, userId: act.person.id, text: act.text },
      { transaction: tx },
    )
    await audit(context, tx, { userId: act.person.id, action: `alert:${act.kind}`, subject: `alert ${record.id}`, details: { text: act.text } })
    return record
  })
  context.news.tell({ topic: 'alerts', id: alert.id }, { topic: 'regions', id: alert.regionId })
  return alert
}

async function standsNow(context: Context, alert: AlertRow, tx: Transaction): Promise<string> {
  const nameOf = async (id: number | null) => (id === null ? 'somebody' : ((await context.models.users.findByPk(id, { transaction: tx }))?.name ?? 'somebody'))
  if (alert.state === 'closed') return `It was closed by ${await nameOf(alert.closedBy)}.`
  if (alert.state === 'acknowledged') return `It was acknowledged by ${await nameOf(alert.acknowledgedBy)}.`
  return 'It is open.'
}
