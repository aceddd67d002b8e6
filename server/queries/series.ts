import { areasAboveKm2 } from '../../shared/science/histogram'
import type { Series, seriesColumnNames } from '../../shared/schemas/series'
import type { Context } from '../context'

export interface SeriesWanted {
  geometryId: number
  feedId: number
  fromDay: number | null
  toDay: number | null
  columns: readonly (typeof seriesColumnNames)[number][]
  /** Level of areaAboveKm2. */
  above: number
}

/** Dates are written by the database: twice seven thousand of them would hold up everybody else here. */
const stored: Record<Exclude<(typeof seriesColumnNames)[number], 'areaAboveKm2'>, string> = {
  layerId: 'layer_id',
  observedAt: `strftime('%Y-%m-%dT%H:%M:%fZ', observed_at / 1000.0, 'unixepoch')`,
  day: `strftime('%Y-%m-%d', day * 86400, 'unixepoch')`,
  coverage: 'coverage',
  cells: 'cells',
  valid: 'valid',
  validAreaKm2: 'valid_area_km2',
  mean: 'mean',
  geometricMean: 'geometric_mean',
  median: 'median',
  p10: 'p10',
  p25: 'p25',
  p75: 'p75',
  p90: 'p90',
  p95: 'p95',
  max: 'max',
  maxLat: 'max_lat',
  maxLon: 'max_lon',
  sdLog10: 'sd_log10',
  departure: 'departure',
}

/** Figures of every view by column, oldest first. */
export async function seriesColumns(context: Context, wanted: SeriesWanted): Promise<Series['columns']> {
  const where = `geometry_id = $geometryId AND feed_id = $feedId AND ($fromDay IS NULL OR day >= $fromDay) AND ($toDay IS NULL OR day <= $toDay)`
  const bind = { geometryId: wanted.geometryId, feedId: wanted.feedId, fromDay: wanted.fromDay, toDay: wanted.toDay }
  const names = wanted.columns
  const plain = names.flatMap((name) => (name in stored ? [`'${name}', json_group_array(${stored[name as keyof typeof stored]})`] : []))
  const row = await context.db.first<{ columns: string }>(
    `SELECT json_object(${plain.join(', ')}) AS columns FROM (SELECT * FROM summaries WHERE ${where} ORDER BY day)`,
    bind,
  )
  const columns = JSON.parse(row!.columns) as Series['columns']
  if (names.includes('areaAboveKm2')) {
    // All of them as one text: thousands of rows with a blob each take longer to hand over than to read.
    const histograms = await context.db.first<{ packed: string | null; lengths: string }>(
      `SELECT group_concat(hex(histogram), '') AS packed, json_group_array(length(histogram)) AS lengths
       FROM (SELECT histogram FROM summaries WHERE ${where} ORDER BY day)`,
      bind,
    )
    const lengths = JSON.parse(histograms!.lengths) as (number | null)[]
    const areas = areasAboveKm2(Buffer.from(histograms!.packed ?? '', 'hex'), lengths.map((length) => length ?? 0), wanted.above)
    columns.areaAboveKm2 = areas.map((area, i) => (lengths[i] === null ? null : area))
  }
  return columns
}
