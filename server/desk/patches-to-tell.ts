import { severities } from '../../shared/schemas/common'
import type { EvidencePatch } from '../../shared/schemas/patches'
import type { BloomEvent } from '../../shared/science/events'
import type { Context } from '../context'
import { LayerRefused } from '../grids/layer-refused'
import type { Subject } from '../pipeline/active-rule'
import { storedView } from '../queries/stored-views'
import { levelOf, plainLevel } from './region-level'
import { patchesOfView } from './view-patches'

/**
 * The largest patch of every day an alert may speak of once these events are kept: the newest day of a running event
 * without an alert, the peak of one that rose. Read before the transaction, which must not wait for a file. Null where
 * nothing reaches the level; a view that cannot be read any more is left out, as that must not keep an alert back.
 */
export async function patchesToTell(context: Context, subject: Subject, events: readonly BloomEvent[]): Promise<ReadonlyMap<number, EvidencePatch | null>> {
  const told = new Map<number, EvidencePatch | null>()
  for (const day of await daysToTell(context, subject, events)) {
    try {
      const patch = await largestPatch(context, subject, day)
      if (patch !== undefined) told.set(day, patch)
    } catch (error) {
      if (!(error instanceof LayerRefused)) throw error
      context.log.warn({ regionId: subject.region.id, day, code: error.code }, 'the patches of an alert could not be read')
    }
  }
  return told
}

async function daysToTell(context: Context, { rule }: Subject, events: readonly BloomEvent[]): Promise<Set<number>> {
  const alerts = await context.models.alerts.findAll({ where: { ruleId: rule.id }, attributes: ['triggerDay', 'state', 'severity'] })
  const days = new Set<number>()
  for (const event of events) {
    const its = alerts.filter((alert) => event.firstFlagged <= alert.triggerDay && alert.triggerDay <= event.lastFlagged)
    if (its.length === 0 && event.phase === 'running') days.add(event.lastFlagged)
    if (its.some((alert) => alert.state !== 'closed' && severities.indexOf(event.severity) > severities.indexOf(alert.severity))) days.add(event.peakDay)
  }
  return days
}

/** Undefined where the view or its layers are gone. */
async function largestPatch(context: Context, { region, geometry, feed, definition }: Subject, day: number): Promise<EvidencePatch | null | undefined> {
  const view = await storedView(context, { geometryId: geometry.id, feedId: feed.id }, day)
  const level = levelOf(definition.test) ?? plainLevel
  const found = view && (await patchesOfView(context, context.workers.heavy, { region, geometry, feed, level, minimumCells: 1, most: 1 }, view))
  if (!found) return undefined
  const [patch] = found.patches
  if (!patch) return null
  const { areaKm2, cells, greatest, peak, nearest, peakAway, touchesEdge, touchesUnseen } = patch
  return {
    level,
    areaKm2,
    atLeast: touchesEdge || touchesUnseen,
    cells,
    greatest,
    latitude: peak[1],
    longitude: peak[0],
    siteName: region.site?.name || null,
    nearest,
    peakAway,
    patches: 1 + found.others.patches,
  }
}
