import type { RuleStatistic } from '../../shared/science/rule'
import type { Context } from '../context'
import type { Transaction } from '../db'

export interface StoredView {
  day: number
  layerId: number
  observedAt: number
  endsAt: number | null
  cells: number
  coverage: number | null
  wholeValid: number
  processingVersion: string
  statistics: Record<Exclude<RuleStatistic, 'departure'>, number | null>
}

interface Row extends Omit<StoredView, 'statistics'> {
  median: number | null
  geometricMean: number | null
  mean: number | null
  p90: number | null
}

/** Every view of a region in a feed, by day, with what a rule looks at. */
export async function judgeableViews(context: Context, geometryId: number, feedId: number, tx?: Transaction): Promise<StoredView[]> {
  const rows = await context.db.all<Row>(
    `SELECT s.day, s.layer_id AS layerId, s.observed_at AS observedAt, s.ends_at AS endsAt, s.cells, s.coverage, s.whole_valid AS wholeValid,
       p.processing_version AS processingVersion, s.median, s.geometric_mean AS geometricMean, s.mean, s.p90
     FROM summaries s JOIN provenances p ON p.id = s.provenance_id
     WHERE s.geometry_id = $geometryId AND s.feed_id = $feedId ORDER BY s.day`,
    { geometryId, feedId },
    tx,
  )
  return rows.map(({ median, geometricMean, mean, p90, ...row }) => ({ ...row, statistics: { median, geometricMean, mean, p90 } }))
}
