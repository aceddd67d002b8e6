import type { Context } from '../context'
import type { EventRow } from '../models/event'

export interface ListedEvent {
  event: EventRow
  alertId: number | null
  /** Version of the outline it was found over. */
  geometryVersion: number
}

/**
 * Events of a region over its outline in force, newest first, with the alert each gave rise to; of those over earlier
 * outlines, the ones that people were told of or that ended because of the redrawing.
 */
export async function eventRows(context: Context, regionId: number, wanted: { feedId?: number | undefined; ruleId?: number | undefined }): Promise<ListedEvent[]> {
  const { feedId, ruleId } = wanted
  const events = await context.models.events.findAll({
    where: { regionId, ...(feedId === undefined ? {} : { feedId }), ...(ruleId === undefined ? {} : { ruleId }) },
    order: [['firstFlagged', 'DESC']],
  })
  const alerts = await context.models.alerts.findAll({ attributes: ['id', 'eventId'], where: { regionId } })
  const byEvent = new Map(alerts.map((alert) => [alert.eventId, alert.id]))
  const versions = await geometryVersions(context, regionId)
  const newest = Math.max(...versions.values())
  return events
    .map((event) => ({ event, alertId: byEvent.get(event.id) ?? null, geometryVersion: versions.get(event.geometryId)! }))
    .filter(({ event, alertId, geometryVersion }) => geometryVersion === newest || alertId !== null || event.endedBecause !== null)
}

/** Versions of a region's outlines by the id of the geometry. */
export async function geometryVersions(context: Context, regionId: number): Promise<Map<number, number>> {
  const geometries = await context.models.geometries.findAll({ attributes: ['id', 'version'], where: { regionId } })
  return new Map(geometries.map(({ id, version }) => [id, version]))
}
