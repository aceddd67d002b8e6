import type { AlertItem } from '../../shared/schemas/alerts'
import type { Severity } from '../../shared/schemas/common'
import type { Context } from '../context'
import type { AlertRecord } from '../models/alert'

export interface AlertsWanted {
  state?: AlertItem['state'] | undefined
  severity?: Severity | undefined
  regionId?: number | undefined
}

interface Position {
  closed: number
  rank: number
  raisedAt: number
  id: number
}

const severityRank = `CASE severity WHEN 'Extreme' THEN 3 WHEN 'Severe' THEN 2 WHEN 'Moderate' THEN 1 ELSE 0 END`

/** Ids of alerts by worry: not closed first, then severity, then the longest open; one more than `limit` tells of a next page. */
export async function alertIds(context: Context, wanted: AlertsWanted, limit: number, after: number | null): Promise<number[]> {
  const from = after === null ? null : await positionOf(context, after)
  const rows = await context.db.all<{ id: number }>(
    `SELECT id FROM (SELECT id, state, severity, region_id, raised_at, (state = 'closed') AS closed, ${severityRank} AS rank FROM alerts)
     WHERE ($state IS NULL OR state = $state) AND ($severity IS NULL OR severity = $severity) AND ($regionId IS NULL OR region_id = $regionId)
       AND ($closed IS NULL OR (closed, -rank, CASE closed WHEN 1 THEN -raised_at ELSE raised_at END, id)
         > ($closed, -$rank, CASE $closed WHEN 1 THEN -$raisedAt ELSE $raisedAt END, $id))
     ORDER BY closed, rank DESC, CASE closed WHEN 1 THEN -raised_at ELSE raised_at END, id LIMIT $limit`,
    {
      state: wanted.state ?? null,
      severity: wanted.severity ?? null,
      regionId: wanted.regionId ?? null,
      closed: from?.closed ?? null,
      rank: from?.rank ?? 0,
      raisedAt: from?.raisedAt ?? 0,
      id: from?.id ?? 0,
      limit: limit + 1,
    },
  )
  return rows.map((row) => row.id)
}

async function positionOf(context: Context, id: number): Promise<Position | null> {
  const row = await context.db.first<Position>(
    `SELECT (state = 'closed') AS closed, ${severityRank} AS rank, raised_at AS raisedAt, id FROM alerts WHERE id = $id`,
    { id },
  )
  return row ?? null
}

export async function alertsInOrder(context: Context, ids: readonly number[]): Promise<AlertRecord[]> {
  const alerts = await context.models.alerts.findAll({ where: { id: [...ids] } })
  const byId = new Map(alerts.map((alert) => [alert.id, alert]))
  return ids.flatMap((id) => byId.get(id) ?? [])
}

export interface RecentView {
  alertId: number
  day: number
  value: number | null
  coverage: number | null
}

/** Views since `fromDay` of the region and feed of each alert, in the alert's own statistic. */
export async function recentViews(context: Context, alerts: readonly AlertRecord[], fromDay: number): Promise<RecentView[]> {
  const wanted = alerts.map((alert) => [alert.id, alert.regionId, alert.feedId, alert.evidence.statistic])
  return context.db.all<RecentView>(
    `SELECT w.value ->> 0 AS alertId, s.day, s.coverage,
       CASE w.value ->> 3 WHEN 'median' THEN s.median WHEN 'mean' THEN s.mean WHEN 'p90' THEN s.p90 ELSE s.geometric_mean END AS value
     FROM json_each($wanted) w JOIN regions r ON r.id = w.value ->> 1
     JOIN summaries s ON s.geometry_id = r.geometry_id AND s.feed_id = w.value ->> 2 AND s.day >= $fromDay ORDER BY s.day`,
    { wanted: JSON.stringify(wanted), fromDay },
  )
}
