import type { RuleDefinition } from '../../shared/science/rule'
import type { Severity } from '../../shared/schemas/common'
import type { HistoryState } from '../../shared/schemas/regions'
import type { Context } from '../context'

/** What a region's standing is made of, one row a region. */
export interface RegionFacts {
  regionId: number
  geometryId: number
  feedId: number | null
  feedName: string | null
  unit: string | null
  cadence: string | null
  silentAfterHours: number | null
  gapFilled: number | null
  ruleId: number | null
  definition: RuleDefinition | null
  /** Of the layers observed by now: one dated ahead by mistake must not hide that a feed has gone silent. */
  newestLayerAt: number | null
  /** Whole water cells it holds of the newest view's grid, by that view's mask; null while nothing was seen. */
  wholeWater: number | null
  alertId: number | null
  alertSeverity: Severity | null
  jobDone: number | null
  jobTotal: number | null
  jobState: HistoryState | null
  /** Set while the history of its feed is being made anew. */
  feedJobState: HistoryState | null
  judged: JudgedFacts | null
}

export interface JudgedFacts {
  state: 'flagged' | 'unflagged' | 'not-ready' | 'not-comparable' | 'never-seen'
  inEvent: number
  severity: Severity | null
  day: number | null
  layerId: number | null
  observedAt: number | null
  coverage: number | null
  value: number | null
  usual: number | null
  p10: number | null
  p90: number | null
  timesUsual: number | null
}

type Row = Omit<RegionFacts, 'definition' | 'judged'> & { definition: string | null; judged: string | null }

/** Facts of all regions that are not retired, or of one. A region stands by its first rule that is switched on. */
export async function regionFacts(context: Context, regionId?: number): Promise<RegionFacts[]> {
  const rows = await context.db.all<Row>(
    `SELECT r.id AS regionId, r.geometry_id AS geometryId, f.id AS feedId, f.name AS feedName, f.unit, f.cadence,
       f.silent_after_hours AS silentAfterHours, f.gap_filled AS gapFilled, ru.id AS ruleId, rv.definition,
       (SELECT max(ifnull(l.ends_at, l.observed_at)) FROM layers l WHERE l.feed_id = f.id AND l.observed_at <= $now) AS newestLayerAt,
       (SELECT ifnull(m.whole_water, w.whole_water) FROM summaries v JOIN provenances p ON p.id = v.provenance_id
          JOIN cell_weights w ON w.geometry_id = v.geometry_id AND w.grid_id = p.grid_id
          LEFT JOIN region_masks m ON m.geometry_id = v.geometry_id AND m.mask_id = p.mask_id
        WHERE v.geometry_id = r.geometry_id AND v.feed_id = f.id ORDER BY v.day DESC LIMIT 1) AS wholeWater,
       a.id AS alertId, a.severity AS alertSeverity, j.done AS jobDone, j.total AS jobTotal, j.state AS jobState, fj.state AS feedJobState,
       CASE WHEN s.rule_id IS NULL THEN NULL ELSE json_object('state', s.state, 'inEvent', s.in_event, 'severity', s.severity, 'day', s.day,
         'layerId', s.layer_id, 'observedAt', s.observed_at, 'coverage', s.coverage, 'value', s.value, 'usual', s.usual, 'p10', s.p10,
         'p90', s.p90, 'timesUsual', s.times_usual) END AS judged
     FROM regions r
     LEFT JOIN rules ru ON ru.id = (SELECT min(id) FROM rules WHERE region_id = r.id AND active_version IS NOT NULL)
     LEFT JOIN rule_versions rv ON rv.rule_id = ru.id AND rv.version = ru.active_version
     LEFT JOIN feeds f ON f.id = ifnull(ru.feed_id, r.wanted_feed_id)
     LEFT JOIN standings s ON s.rule_id = ru.id AND s.geometry_id = r.geometry_id
     LEFT JOIN alerts a ON a.region_id = r.id AND a.state <> 'closed'
     LEFT JOIN jobs j ON j.state <> 'done' AND j.id = (SELECT max(id) FROM jobs WHERE kind = 'backfill-region' AND job_key = CAST(r.geometry_id AS TEXT))
     LEFT JOIN jobs fj ON fj.state <> 'done' AND fj.id = (SELECT max(id) FROM jobs WHERE kind = 'backfill-feed' AND job_key = CAST(f.id AS TEXT))
     WHERE r.retired_at IS NULL AND ($regionId IS NULL OR r.id = $regionId) GROUP BY r.id ORDER BY r.id`,
    { regionId: regionId ?? null, now: context.clock.now() },
  )
  return rows.map((row) => ({
    ...row,
    definition: row.definition === null ? null : (JSON.parse(row.definition) as RuleDefinition),
    judged: row.judged === null ? null : (JSON.parse(row.judged) as JudgedFacts),
  }))
}

export interface SeenDay {
  regionId: number
  day: number
  coverage: number | null
}

/** Coverage by day since `fromDay` of the feed each region stands by. */
export async function seenDays(context: Context, fromDay: number, facts: readonly RegionFacts[]): Promise<SeenDay[]> {
  const wanted = facts.flatMap((fact) => (fact.feedId === null ? [] : [[fact.regionId, fact.geometryId, fact.feedId]]))
  return context.db.all<SeenDay>(
    `SELECT w.value ->> 0 AS regionId, s.day, s.coverage FROM json_each($wanted) w
     JOIN summaries s ON s.geometry_id = w.value ->> 1 AND s.feed_id = w.value ->> 2 AND s.day >= $fromDay ORDER BY s.day`,
    { wanted: JSON.stringify(wanted), fromDay },
  )
}
