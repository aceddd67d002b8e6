import type { Context } from '../context'
import type { EventRow } from '../models/event'

/** Events of a region, newest first, with the alert each gave rise to. */
export async function eventRows(context: Context, regionId: number, wanted: { feedId?: number | undefined; ruleId?: number | undefined }): Promise<{ event: EventRow; alertId: number | null }[]> {
  const { feedId, ruleId } = wanted
  const events = await context.models.events.findAll({
    where: { regionId, ...(feedId === undefined ? {} : { feedId }), ...(ruleId === undefined ? {} : { ruleId }) },
    order: [['firstFlagged', 'DESC']],
  })
  const alerts = await context.models.alerts.findAll({ attributes: ['id', 'eventId'], where: { regionId } })
  const byEvent = new Map(alerts.map((alert) => [alert.eventId, alert.id]))
  return events.map((event) => ({ event, alertId: byEvent.get(event.id) ?? null }))
}
