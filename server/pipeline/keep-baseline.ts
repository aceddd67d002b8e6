import { createHash } from 'node:crypto'
import { isUsable } from '../../shared/science/judge-view'
import { yearOf } from '../../shared/science/local-day'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { StoredView } from '../queries/judgeable-views'
import type { RegionJudgement } from '../workers/tasks'
import type { Subject } from './active-rule'

export const halfWidthDays = 5
export const smoothingDays = 1

/** Keeps the baseline the present year is judged by, as a new version when what it was made from has changed. */
export async function keepBaseline(
  context: Context,
  tx: Transaction,
  { geometry, feed, definition }: Subject,
  views: readonly StoredView[],
  { baseline, processingVersion }: RegionJudgement,
): Promise<number | null> {
  if (!baseline || processingVersion === null) return null
  const made = views.filter((view) => madeFrom(view) && isUsable(view, definition))
  function madeFrom(view: StoredView): boolean {
    const year = yearOf(view.day)
    return view.processingVersion === processingVersion && year >= baseline!.fromYear && year <= baseline!.toYear
  }
  const { statistic, coverageFloor } = definition
  if (statistic === 'departure') return null
  const values = made.map((view) => [view.day, view.statistics[statistic]])
  const sourceHash = createHash('sha256').update(JSON.stringify([statistic, halfWidthDays, smoothingDays, coverageFloor, processingVersion, baseline.fromYear, baseline.toYear, values])).digest('hex')
  const key = { geometryId: geometry.id, feedId: feed.id, statistic }
  const newest = await context.db.first<{ id: number; version: number; sourceHash: string }>(
    `SELECT id, version, source_hash AS sourceHash FROM baselines
     WHERE geometry_id = $geometryId AND feed_id = $feedId AND statistic = $statistic ORDER BY version DESC LIMIT 1`,
    key,
    tx,
  )
  if (newest?.sourceHash === sourceHash) return newest.id
  const years = [...new Set(made.map((view) => yearOf(view.day)))].sort((a, b) => a - b)
  await context.db.run(
    `INSERT INTO baselines (geometry_id, feed_id, statistic, version, half_width_days, smoothing_days, coverage_floor, years, processing_version,
       source_hash, columns, created_at)
     VALUES ($geometryId, $feedId, $statistic, $version, $halfWidthDays, $smoothingDays, $coverageFloor, $years, $processingVersion,
       $sourceHash, $columns, $at)`,
    {
      ...key,
      version: (newest?.version ?? 0) + 1,
      halfWidthDays,
      smoothingDays,
      coverageFloor,
      years: JSON.stringify(years),
      processingVersion,
      sourceHash,
      columns: JSON.stringify(baseline.columns),
      at: context.clock.now(),
    },
    tx,
  )
  const kept = await context.db.first<{ id: number }>(
    `SELECT id FROM baselines WHERE geometry_id = $geometryId AND feed_id = $feedId AND statistic = $statistic ORDER BY version DESC LIMIT 1`,
    key,
    tx,
  )
  return kept!.id
}
