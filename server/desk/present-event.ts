import { dateOf } from '../../shared/science/local-day'
import type { BloomEventItem } from '../../shared/schemas/series'
import type { EventRow } from '../models/event'

const date = (day: number | null) => (day === null ? null : dateOf(day))

export function presentEvent(event: EventRow, alertId: number | null, geometryVersion: number): BloomEventItem {
  return {
    id: event.id,
    regionId: event.regionId,
    feedId: event.feedId,
    ruleId: event.ruleId,
    ruleVersion: event.ruleVersion,
    phase: event.phase,
    lastUnflaggedBefore: date(event.lastUnflaggedBefore),
    firstFlagged: dateOf(event.firstFlagged),
    lastFlagged: dateOf(event.lastFlagged),
    firstUnflaggedAfter: date(event.firstUnflaggedAfter),
    triggerDay: dateOf(event.triggerDay),
    peakDay: dateOf(event.peakDay),
    peakValue: event.peakValue,
    peakTimesUsual: event.peakTimesUsual,
    severity: event.severity,
    usableViews: event.usableViews,
    geometryVersion,
    endedBecause: event.endedBecause,
    alertId,
  }
}
