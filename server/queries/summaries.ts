import type { Context } from '../context'
import type { Transaction } from '../db'
import type { ViewFigures } from '../workers/tasks'

export interface SummaryRow {
  geometryId: number
  feedId: number
  day: number
  layerIds: number[]
  observedAt: number
  endsAt: number | null
  provenanceId: number
  maxLat: number | null
  maxLon: number | null
  figures: ViewFigures
}

const columns = [
  'geometry_id', 'feed_id', 'day', 'layer_id', 'provenance_id', 'observed_at', 'ends_at', 'cells', 'valid', 'whole_cells', 'whole_valid',
  'coverage', 'valid_area_km2', 'mean', 'geometric_mean', 'median', 'p10', 'p25', 'p75', 'p90', 'p95', 'max', 'max_lat', 'max_lon',
  'sd_log10', 'non_positive', 'histogram',
] as const

/** Replaces the figures of the given views, with the layers each was made from; views without layers go. */
export async function writeSummaries(
  context: Context,
  tx: Transaction,
  rows: readonly SummaryRow[],
  empty: readonly { geometryId: number; feedId: number; day: number }[],
): Promise<void> {
  const summaries = rows.map((row) => {
    const f = row.figures
    return [
      row.geometryId, row.feedId, row.day, row.layerIds[0], row.provenanceId, row.observedAt, row.endsAt, f.cells, f.valid, f.wholeCells, f.wholeValid,
      f.coverage, f.validAreaKm2, f.mean, f.geometricMean, f.median, f.p10, f.p25, f.p75, f.p90, f.p95, f.max, row.maxLat, row.maxLon,
      f.sdLog10, f.nonPositive, Buffer.from(f.histogram).toString('hex'),
    ]
  })
  const picked = columns.map((_, i) => (i === columns.length - 1 ? `unhex(r.value ->> ${i})` : `r.value ->> ${i}`)).join(', ')
  const changed = JSON.stringify([...rows, ...empty].map((row) => [row.geometryId, row.feedId, row.day]))
  const isChanged = `(geometry_id, feed_id, day) IN (SELECT value ->> 0, value ->> 1, value ->> 2 FROM json_each($changed))`
  await context.db.run(`DELETE FROM summary_reasons WHERE ${isChanged}`, { changed }, tx)
  await context.db.run(`DELETE FROM view_layers WHERE ${isChanged}`, { changed }, tx)
  await context.db.run(`DELETE FROM summaries WHERE ${isChanged}`, { changed }, tx)
  await context.db.run(`INSERT INTO summaries (${columns.join(', ')}) SELECT ${picked} FROM json_each($rows) r`, { rows: JSON.stringify(summaries) }, tx)
  const links = rows.flatMap((row) => row.layerIds.map((layerId) => [row.geometryId, row.feedId, row.day, layerId]))
  await context.db.run(
    `INSERT INTO view_layers (geometry_id, feed_id, day, layer_id)
     SELECT value ->> 0, value ->> 1, value ->> 2, value ->> 3 FROM json_each($links)`,
    { links: JSON.stringify(links) },
    tx,
  )
  const reasons = rows.flatMap((row) => row.figures.masked.map(({ reason, areaKm2 }) => [row.geometryId, row.feedId, row.day, reason, areaKm2]))
  if (reasons.length === 0) return
  await context.db.run(
    `INSERT INTO summary_reasons (geometry_id, feed_id, day, reason, area_km2)
     SELECT value ->> 0, value ->> 1, value ->> 2, value ->> 3, value ->> 4 FROM json_each($reasons)`,
    { reasons: JSON.stringify(reasons) },
    tx,
  )
}
