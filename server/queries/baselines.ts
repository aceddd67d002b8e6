import type { SeasonalBaseline } from '../../shared/science/baseline'
import type { Context } from '../context'

export interface StoredBaseline {
  id: number
  version: number
  statistic: string
  years: number[]
  halfWidthDays: number
  smoothingDays: number
  coverageFloor: number
  processingVersion: string
  columns: SeasonalBaseline
}

type Row = Omit<StoredBaseline, 'years' | 'columns'> & { years: string; columns: string }

const picked = `id, version, statistic, years, half_width_days AS halfWidthDays, smoothing_days AS smoothingDays,
  coverage_floor AS coverageFloor, processing_version AS processingVersion, columns`

/** The newest stored baseline of a region's outline in a feed. */
export async function newestBaseline(context: Context, geometryId: number, feedId: number, statistic: string): Promise<StoredBaseline | null> {
  const row = await context.db.first<Row>(
    `SELECT ${picked} FROM baselines WHERE geometry_id = $geometryId AND feed_id = $feedId AND statistic = $statistic ORDER BY version DESC LIMIT 1`,
    { geometryId, feedId, statistic },
  )
  return row ? { ...row, years: JSON.parse(row.years) as number[], columns: JSON.parse(row.columns) as SeasonalBaseline } : null
}
