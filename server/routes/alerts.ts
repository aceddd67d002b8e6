import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { actOnAlert, type Act } from '../desk/act-on-alert'
import { explainAlert } from '../desk/explain-alert'
import { presentAlert, presentAlerts } from '../desk/present-alert'
import { alertIds, alertsInOrder } from '../queries/alert-rows'
import { cursorId } from './paging'
import { serve } from './serve'

export function alertRoutes(router: Router, context: Context): void {
  const known = async (id: number) => {
    const alert = await context.models.alerts.findByPk(id)
    if (!alert) throw new ApiError('not-found', 'There is no such alert.')
    return alert
  }
  const act = async (wanted: Act) => presentAlert(context, await actOnAlert(context, wanted))

  serve(router, context, endpoints.listAlerts, async ({ query: { limit, cursor, ...wanted } }) => {
    const ids = await alertIds(context, wanted, limit, cursor === undefined ? null : cursorId(cursor, 0))
    const items = await presentAlerts(context, await alertsInOrder(context, ids.slice(0, limit)))
    return { items, nextCursor: ids.length > limit ? String(ids[limit - 1]) : null }
  })
  serve(router, context, endpoints.alert, async ({ params }) => presentAlert(context, await known(params.id)))
  serve(router, context, endpoints.alertExplanation, async ({ params }) => explainAlert(context, await known(params.id)))
  serve(router, context, endpoints.acknowledgeAlert, ({ person, params, body }) =>
    act({
      alertId: params.id,
      person,
      kind: 'acknowledged',
      version: body.version,
      text: body.note || 'Acknowledged.',
      change: (alert, now) =>
        alert.state === 'open'
          ? { state: 'acknowledged', acknowledgedBy: person.id, acknowledgedAt: now, assigneeId: alert.assigneeId ?? person.id }
          : { conflict: 'Only an open alert can be acknowledged.' },
    }),
  )
  serve(router, context, endpoints.noteAlert, ({ person, params, body }) =>
    // A note overwrites nothing, so it needs no version.
    act({ alertId: params.id, person, kind: 'note', text: body.text, change: () => ({}) }),
  )
  serve(router, context, endpoints.assignAlert, async ({ person, params, body }) => {
    const assignee = body.userId === null ? null : await context.models.users.findByPk(body.userId)
    if (body.userId !== null && (!assignee || assignee.disabled)) throw new ApiError('not-valid', 'There is nobody with that id to give it to.')
    return act({
      alertId: params.id,
      person,
      kind: 'assigned',
      version: body.version,
      text: assignee ? `Given to ${assignee.name}.` : 'Given back: nobody has it.',
      change: (alert) => (alert.state === 'closed' ? { conflict: 'A closed alert cannot be given to anybody.' } : { assigneeId: body.userId }),
    })
  })
  serve(router, context, endpoints.holdAlert, ({ person, params, body }) =>
    act({
      alertId: params.id,
      person,
      kind: 'held',
      version: body.version,
      text: `Held until ${body.until}: ${body.reason}`,
      change: (alert, now) => {
        if (Date.parse(body.until) <= now) throw new ApiError('not-valid', 'The time to hold until has passed.')
        return alert.state === 'closed' ? { conflict: 'A closed alert cannot be held.' } : { holdUntil: Date.parse(body.until), holdReason: body.reason }
      },
    }),
  )
  serve(router, context, endpoints.closeAlert, ({ person, params, body }) =>
    act({
      alertId: params.id,
      person,
      kind: 'closed',
      version: body.version,
      text: [`Closed: ${body.outcome}${body.cause ? ` (${body.cause})` : ''}.`, body.note].filter(Boolean).join(' '),
      change: (alert, now) =>
        alert.state === 'closed'
          ? { conflict: 'It is closed already.' }
          : { state: 'closed', outcome: body.outcome, cause: body.outcome === 'not a bloom' ? body.cause : null, closedBy: person.id, closedAt: now, holdUntil: null, holdReason: null },
    }),
  )
  serve(router, context, endpoints.reopenAlert, async ({ person, params, body }) => {
    const alert = await known(params.id)
    const open = await context.db.first<{ id: number }>(`SELECT id FROM alerts WHERE region_id = $regionId AND state <> 'closed' AND id <> $id`, { regionId: alert.regionId, id: alert.id })
    if (open) throw new ApiError('conflict', `Alert ${open.id} is open over this region; one region has one open alert.`, { alertId: open.id })
    return act({
      alertId: params.id,
      person,
      kind: 'reopened',
      version: body.version,
      text: `Reopened: ${body.note}`,
      change: (record) =>
        record.state === 'closed'
          ? { state: 'acknowledged', acknowledgedBy: person.id, acknowledgedAt: context.clock.now(), outcome: null, cause: null, closedBy: null, closedAt: null }
          : { conflict: 'Only a closed alert can be reopened.' },
    })
  })
}
