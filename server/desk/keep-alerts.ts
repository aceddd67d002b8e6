import { dateOf } from '../../shared/science/local-day'
import { severities } from '../../shared/schemas/common'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { AlertRecord } from '../models/alert'
import type { EntryKind } from '../models/alert-entry'
import type { Change } from '../news'
import type { Subject } from '../pipeline/active-rule'
import type { KeptEvent } from '../pipeline/keep-events'
import { evidenceOn, type JudgedToTell } from './evidence'
import { sinceWhat } from './since-what'
import { writeLetters } from './write-letters'

const hourMs = 3_600_000

/**
 * Alerts follow events. An alert stays with the event that holds its trigger day; a running event seen recently that no
 * alert belongs to raises one, unless the region has an open alert already. Letters go into the same transaction.
 */
export async function keepAlerts(context: Context, tx: Transaction, subject: Subject, judged: JudgedToTell): Promise<Change[]> {
  const alerts = await context.models.alerts.findAll({ where: { ruleId: subject.rule.id }, transaction: tx })
  const changes: Change[] = []
  const changed = (alert: AlertRecord) => changes.push({ topic: 'alerts', id: alert.id })
  const followed = new Set<KeptEvent>()
  const frozen = await eventsOverOtherOutlines(context, tx, subject)
  for (const alert of alerts) {
    const event = judged.events.find((one) => one.firstFlagged <= alert.triggerDay && alert.triggerDay <= one.lastFlagged)
    if (event) followed.add(event)
    // Over a redrawn outline an alert goes on with an event that is running there; else it stays with the one it had.
    const redrawn = alert.eventId !== null && frozen.has(alert.eventId)
    if (redrawn && event?.phase !== 'running') continue
    if (alert.state !== 'closed' && (await follow(context, tx, subject, judged, alert, event, redrawn))) changed(alert)
  }
  const event = judged.events.findLast((one) => one.phase === 'running')
  if (event && !followed.has(event) && isFresh(context, subject, judged, event) && !(await hasOpenAlert(context, tx, subject))) {
    changed(await raise(context, tx, subject, judged, event))
  }
  return changes
}

async function raise(context: Context, tx: Transaction, subject: Subject, judged: JudgedToTell, event: KeptEvent): Promise<AlertRecord> {
  const evidence = await evidenceOn(context, tx, subject, judged, event.lastFlagged)
  const now = context.clock.now()
  const alert = await context.models.alerts.create(
    {
      regionId: subject.region.id,
      feedId: subject.feed.id,
      ruleId: subject.rule.id,
      eventId: event.id,
      state: 'open',
      phase: 'running',
      severity: event.severity,
      triggerDay: event.triggerDay,
      raisedAt: now,
      evidence,
    },
    { transaction: tx },
  )
  const views = event.flaggedViews === 1 ? 'one flagged view' : `${event.flaggedViews} flagged views`
  await addEntry(context, tx, alert, 'raised', `Raised as ${event.severity}: ${views} since ${dateOf(event.firstFlagged)}.`)
  await writeLetters(context, tx, { alert, subject, kind: 'raised' })
  return alert
}

/** Brings an open alert to what its event is now; answers whether anything changed. */
async function follow(context: Context, tx: Transaction, subject: Subject, judged: JudgedToTell, alert: AlertRecord, event: KeptEvent | undefined, redrawn: boolean): Promise<boolean> {
  if (!event) {
    if (alert.eventId === null && alert.phase === 'ended') return false
    await alert.update({ eventId: null, phase: 'ended', version: alert.version + 1 }, { transaction: tx })
    await addEntry(context, tx, alert, 'rejudged', `${await sinceWhat(context, tx, subject, alert)} the rule no longer finds an event here.`)
    return true
  }
  const before = { phase: alert.phase, severity: alert.severity, eventId: alert.eventId }
  const rose = severities.indexOf(event.severity) > severities.indexOf(alert.severity)
  if (before.eventId === event.id && before.phase === event.phase && before.severity === event.severity) return false
  const evidence = rose ? await evidenceOn(context, tx, subject, judged, event.peakDay) : alert.evidence
  await alert.update({ eventId: event.id, phase: event.phase, severity: event.severity, evidence, version: alert.version + 1 }, { transaction: tx })
  if (before.severity !== event.severity) {
    const text = `${rose ? 'Rose' : 'Judged again: went'} from ${before.severity} to ${event.severity}.`
    await addEntry(context, tx, alert, rose ? 'rose' : 'rejudged', text)
  }
  if (before.phase !== event.phase) await addEntry(context, tx, alert, ...(redrawn ? redrawnEntry(subject, event) : phaseEntry(event)))
  if (rose && event.phase === 'running' && isFresh(context, subject, judged, event)) await writeLetters(context, tx, { alert, subject, kind: 'rose' })
  return true
}

function redrawnEntry({ geometry }: Subject, event: KeptEvent): [EntryKind, string] {
  return ['resumed', `Goes on over the redrawn outline, version ${geometry.version}: an event is running there since ${dateOf(event.firstFlagged)}.`]
}

function phaseEntry(event: KeptEvent): [EntryKind, string] {
  switch (event.phase) {
    case 'running':
      return ['resumed', `Flagged again on ${dateOf(event.lastFlagged)}.`]
    case 'ended':
      return ['ended', `Ended: last flagged ${dateOf(event.lastFlagged)}, not flagged on ${dateOf(event.firstUnflaggedAfter ?? event.lastFlagged)}.`]
    case 'lost':
      return ['lost', `Lost from view: no usable view since ${dateOf(event.lastFlagged)}.`]
  }
}

async function addEntry(context: Context, tx: Transaction, alert: AlertRecord, kind: EntryKind, text: string): Promise<void> {
  await context.models.alertEntries.create({ alertId: alert.id, at: context.clock.now(), kind, userId: null, text }, { transaction: tx })
}

async function eventsOverOtherOutlines(context: Context, tx: Transaction, { rule, geometry }: Subject): Promise<Set<number>> {
  const rows = await context.db.all<{ id: number }>('SELECT id FROM events WHERE rule_id = $ruleId AND geometry_id <> $geometryId', { ruleId: rule.id, geometryId: geometry.id }, tx)
  return new Set(rows.map((row) => row.id))
}

/** Only recent views raise anything: history that arrives late wakes nobody. */
function isFresh(context: Context, { feed }: Subject, judged: JudgedToTell, event: KeptEvent): boolean {
  const view = judged.views.find((one) => one.day === event.lastFlagged)
  return view !== undefined && context.clock.now() - (view.endsAt ?? view.observedAt) <= feed.freshnessLimitHours * hourMs
}

async function hasOpenAlert(context: Context, tx: Transaction, { region }: Subject): Promise<boolean> {
  const open = await context.db.first(`SELECT 1 AS one FROM alerts WHERE region_id = $regionId AND state <> 'closed'`, { regionId: region.id }, tx)
  return open !== undefined
}
