import { baselineDay } from '../../shared/science/baseline'
import { dateOf, dayOfYear366 } from '../../shared/science/local-day'
import type { Alert, AlertItem } from '../../shared/schemas/alerts'
import type { Context } from '../context'
import type { AlertRecord } from '../models/alert'
import { recentViews, type RecentView } from '../queries/alert-rows'
import { geometryVersions } from '../queries/event-rows'
import { newestBaseline } from '../queries/baselines'
import { cautions, opticallyComplexCaution } from './cautions'
import { presentEvent } from './present-event'
import { standings } from './standing'
import { alertStatement, alertStory } from './statement'

const dayMs = 86_400_000
const recentDays = 30

const iso = (instant: number | null) => (instant === null ? null : new Date(instant).toISOString())

/** Alerts as lists show them, in the order given. */
export async function presentAlerts(context: Context, alerts: readonly AlertRecord[]): Promise<AlertItem[]> {
  if (alerts.length === 0) return []
  const { models } = context
  const regions = new Map((await models.regions.findAll({ where: { id: alerts.map((alert) => alert.regionId) } })).map((region) => [region.id, region]))
  const feeds = new Map((await models.feeds.findAll({ where: { id: alerts.map((alert) => alert.feedId) } })).map((feed) => [feed.id, feed]))
  const people = new Map((await models.users.findAll({ attributes: ['id', 'name'] })).map((user) => [user.id, user.name]))
  const standing = await standings(context)
  const events = new Map((await models.events.findAll({ where: { id: alerts.flatMap((alert) => alert.eventId ?? []) } })).map((event) => [event.id, event]))
  const today = Math.floor(context.clock.now() / dayMs)
  const recent = await recentViews(context, alerts, today - recentDays + 1)
  return Promise.all(
    alerts.map(async (alert) => {
      const region = regions.get(alert.regionId)!
      return {
        id: alert.id,
        regionId: alert.regionId,
        regionName: region.name,
        feedId: alert.feedId,
        feedName: feeds.get(alert.feedId)!.name,
        state: alert.state,
        phase: alert.phase,
        severity: alert.severity,
        raisedAt: iso(alert.raisedAt)!,
        triggerDay: dateOf(alert.triggerDay),
        story: alertStory(events.get(alert.eventId ?? 0) ?? null, alert),
        statement: alertStatement(alert.severity, region.name, alert.evidence),
        evidence: alert.evidence,
        latest: standing.get(alert.regionId)?.view ?? null,
        recent: await recentOf(context, alert, region.geometryId, recent.filter((view) => view.alertId === alert.id), today),
        acknowledgedBy: alert.acknowledgedBy === null ? null : (people.get(alert.acknowledgedBy) ?? null),
        acknowledgedAt: iso(alert.acknowledgedAt),
        assignee: alert.assigneeId === null ? null : { id: alert.assigneeId, name: people.get(alert.assigneeId) ?? '' },
        hold: alert.holdUntil === null ? null : { until: iso(alert.holdUntil)!, reason: alert.holdReason ?? '' },
        outcome: alert.outcome,
        cause: alert.cause,
        closedAt: iso(alert.closedAt),
        version: alert.version,
      }
    }),
  )
}

/** One alert with its event, timeline and cautions. */
export async function presentAlert(context: Context, alert: AlertRecord): Promise<Alert> {
  const { models } = context
  const [item] = await presentAlerts(context, [alert])
  const entries = await models.alertEntries.findAll({ where: { alertId: alert.id }, order: [['id', 'DESC']] })
  const people = new Map((await models.users.findAll({ attributes: ['id', 'name'] })).map((user) => [user.id, user.name]))
  const officers = await context.db.all<{ id: number; name: string }>(
    `SELECT DISTINCT u.id, u.name FROM users u JOIN user_roles r ON r.user_id = u.id
     WHERE u.disabled = 0 AND r.role IN ('officer', 'admin') ORDER BY u.name`,
  )
  const event = alert.eventId === null ? null : await models.events.findByPk(alert.eventId)
  const region = await models.regions.findByPk(alert.regionId)
  return {
    ...item!,
    event: event ? presentEvent(event, alert.id, (await geometryVersions(context, alert.regionId)).get(event.geometryId)!) : goneEvent(alert),
    cautions: [...cautions, ...(region?.opticallyComplex ? [opticallyComplexCaution] : [])],
    entries: entries.map((entry) => ({
      id: entry.id,
      at: iso(entry.at)!,
      kind: entry.kind,
      by: entry.userId === null ? null : (people.get(entry.userId) ?? null),
      text: entry.text,
    })),
    assignable: officers,
  }
}

async function recentOf(context: Context, alert: AlertRecord, geometryId: number | null, views: readonly RecentView[], today: number): Promise<AlertItem['recent']> {
  const baseline = geometryId === null ? null : await newestBaseline(context, geometryId, alert.feedId, alert.evidence.statistic)
  const byDay = new Map(views.map((view) => [view.day, view]))
  return Array.from({ length: recentDays }, (_, i) => {
    const day = today - recentDays + 1 + i
    const usual = baseline ? baselineDay(baseline.columns, dayOfYear366(day)) : null
    const view = byDay.get(day)
    const seen = view !== undefined && (view.coverage ?? 0) >= alert.evidence.coverageFloor
    const value = seen ? view.value : null
    const flagged = value !== null && day >= alert.triggerDay - recentDays && alert.evidence.threshold !== null && value >= alert.evidence.threshold
    return { day: dateOf(day), value, p10: usual?.p10 ?? null, p90: usual?.p90 ?? null, flagged }
  })
}

/** Late data may take an event away from under its alert; what it was told on stays. */
function goneEvent(alert: AlertRecord): Alert['event'] {
  const { evidence } = alert
  return {
    id: alert.id,
    regionId: alert.regionId,
    feedId: alert.feedId,
    ruleId: alert.ruleId,
    ruleVersion: evidence.ruleVersion,
    phase: 'ended',
    lastUnflaggedBefore: null,
    firstFlagged: dateOf(alert.triggerDay),
    lastFlagged: dateOf(alert.triggerDay),
    firstUnflaggedAfter: null,
    triggerDay: dateOf(alert.triggerDay),
    peakDay: evidence.day,
    peakValue: evidence.value,
    peakTimesUsual: evidence.timesUsual,
    severity: alert.severity,
    usableViews: 0,
    geometryVersion: evidence.geometryVersion,
    endedBecause: null,
    alertId: alert.id,
  }
}
