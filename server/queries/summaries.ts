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
  await removeViews(context, tx, [...rows, ...empty])
  // As jsonb each row is parsed once, not once a column.
  await context.db.run(
    `INSERT INTO summaries (${columns.join(', ')})
     WITH r AS MATERIALIZED (SELECT jsonb(value) AS value FROM json_each($rows)) SELECT ${picked} FROM r`,
    { rows: JSON.stringify(summaries) },
    tx,
  )
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

/** A region's history is mostly new; only where something of it is there already is each view looked for. */
async function removeViews(context: Context, tx: Transaction, views: readonly { geometryId: number; feedId: number; day: number }[]): Promise<void> {
  const spans = new Map<string, [geometryId: number, feedId: number, first: number, last: number]>()
  for (const { geometryId, feedId, day } of views) {
    const span = spans.get(`${geometryId}:${feedId}`)
    if (!span) spans.set(`${geometryId}:${feedId}`, [geometryId, feedId, day, day])
    else [span[2], span[3]] = [Math.min(span[2], day), Math.max(span[3], day)]
  }
  const there = await context.db.first(
    `SELECT 1 AS one FROM json_each($spans) g CROSS JOIN summaries s
     ON s.geometry_id = g.value ->> 0 AND s.feed_id = g.value ->> 1 AND s.day BETWEEN g.value ->> 2 AND g.value ->> 3 LIMIT 1`,
    { spans: JSON.stringify([...spans.values()]) },
    tx,
  )
  if (!there) return
  const changed = JSON.stringify(views.map((view) => [view.geometryId, view.feedId, view.day]))
  const isChanged = `(geometry_id, feed_id, day) IN (SELECT value ->> 0, value ->> 1, value ->> 2 FROM json_each($changed))`
  for (const table of ['summary_reasons', 'view_layers', 'summaries']) await context.db.run(`DELETE FROM ${table} WHERE ${isChanged}`, { changed }, tx)
}
