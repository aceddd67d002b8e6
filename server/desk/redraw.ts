import { dateOf } from '../../shared/science/local-day'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { EventRecord } from '../models/event'

interface Redrawing {
  regionId: number
  /** Version of the outline that takes over. */
  version: number
  confirmed: boolean
  person: Person
}

/**
 * Other outline, other figures: an event that is running over the old one cannot go on over the new. It ends with that
 * reason and keeps its outline, baseline and figures; its alert says so and goes on with whatever the rule finds over the
 * new outline on its trigger day. Nothing of this happens unless the person has confirmed it.
 */
export async function endRunningEvents(context: Context, tx: Transaction, { regionId, version, confirmed, person }: Redrawing): Promise<void> {
  const events = await context.models.events.findAll({ where: { regionId, phase: 'running' }, order: [['firstFlagged', 'ASC']], transaction: tx })
  if (events.length === 0) return
  const alerts = await context.models.alerts.findAll({ where: { eventId: events.map((event) => event.id) }, transaction: tx })
  const open = alerts.filter((alert) => alert.state !== 'closed')
  if (!confirmed) throw askFirst(events, open.map((alert) => alert.id))
  const because = `the outline was redrawn as version ${version}`
  for (const event of events) await event.update({ phase: 'ended', endedBecause: because }, { transaction: tx })
  for (const alert of open) {
    await alert.update({ phase: 'ended', version: alert.version + 1 }, { transaction: tx })
    const text = `Ended: ${because}. The event keeps the outline and figures it began with; the new outline is judged when its history has been read.`
    await context.models.alertEntries.create({ alertId: alert.id, at: context.clock.now(), kind: 'ended', userId: person.id, text }, { transaction: tx })
    context.news.tell({ topic: 'alerts', id: alert.id })
  }
}

function askFirst(events: readonly EventRecord[], alertIds: number[]): ApiError {
  const since = dateOf(events[0]!.firstFlagged)
  return new ApiError(
    'event-running',
    `An event has been running over this outline since ${since}. Redrawing ends it with that reason: send "confirm": true to go on. Nothing was changed.`,
    { since, severity: events.at(-1)!.severity, eventIds: events.map((event) => event.id), alertIds },
  )
}
