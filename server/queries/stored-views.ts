import type { Context } from '../context'

/** One view as it is kept, with the layers it was made from. */
export interface StoredFigures {
  day: number
  observedAt: number
  endsAt: number | null
  coverage: number | null
  cells: number
  valid: number
  validAreaKm2: number
  mean: number | null
  geometricMean: number | null
  median: number | null
  p10: number | null
  p90: number | null
  max: number | null
  maxLat: number | null
  maxLon: number | null
  histogram: Buffer
  /** The water mask its coverage was told by. */
  maskId: number
  layerIds: number[]
}

interface Of {
  geometryId: number
  feedId: number
}

/** The view of a day, or the newest; undefined where there is none. */
export async function storedView(context: Context, { geometryId, feedId }: Of, day: number | null): Promise<StoredFigures | undefined> {
  const row = await context.db.first<Omit<StoredFigures, 'layerIds'> & { layerIds: string }>(
    `SELECT s.day, s.observed_at AS observedAt, s.ends_at AS endsAt, s.coverage, s.cells, s.valid, s.valid_area_km2 AS validAreaKm2, s.mean,
       s.geometric_mean AS geometricMean, s.median, s.p10, s.p90, s.max, s.max_lat AS maxLat, s.max_lon AS maxLon, s.histogram, p.mask_id AS maskId,
       (SELECT json_group_array(v.layer_id) FROM view_layers v WHERE v.geometry_id = s.geometry_id AND v.feed_id = s.feed_id AND v.day = s.day) AS layerIds
     FROM summaries s JOIN provenances p ON p.id = s.provenance_id
     WHERE s.geometry_id = $geometryId AND s.feed_id = $feedId AND ($day IS NULL OR s.day = $day) ORDER BY s.day DESC LIMIT 1`,
    { geometryId, feedId, day },
  )
  return row && { ...row, layerIds: (JSON.parse(row.layerIds) as number[]).sort((a, b) => a - b) }
}

/** The last day before one with a view that reaches a coverage and a number of whole cells. */
export async function usableDayBefore(context: Context, { geometryId, feedId }: Of, day: number, floor: { coverage: number; wholeCells: number }): Promise<number | null> {
  const row = await context.db.first<{ day: number }>(
    `SELECT day FROM summaries WHERE geometry_id = $geometryId AND feed_id = $feedId AND day < $day AND coverage >= $coverage AND whole_valid >= $wholeCells
     ORDER BY day DESC LIMIT 1`,
    { geometryId, feedId, day, ...floor },
  )
  return row?.day ?? null
}

export interface DaysAround {
  first: number | null
  last: number | null
  previous: number | null
  next: number | null
}

/** Days with a view: the ends of the record, and those beside a day. */
export async function daysAround(context: Context, { geometryId, feedId }: Of, day: number | null): Promise<DaysAround> {
  const where = 'geometry_id = $geometryId AND feed_id = $feedId'
  const row = await context.db.first<DaysAround>(
    `SELECT (SELECT min(day) FROM summaries WHERE ${where}) AS first, (SELECT max(day) FROM summaries WHERE ${where}) AS last,
       (SELECT max(day) FROM summaries WHERE ${where} AND day < $day) AS previous, (SELECT min(day) FROM summaries WHERE ${where} AND day > $day) AS next`,
    { geometryId, feedId, day },
  )
  return row!
}

/** Water hidden in one view, km2, by reason, the most first. */
export async function reasonsOf(context: Context, { geometryId, feedId }: Of, day: number): Promise<{ reason: string; areaKm2: number }[]> {
  return context.db.all<{ reason: string; areaKm2: number }>(
    `SELECT reason, area_km2 AS areaKm2 FROM summary_reasons WHERE geometry_id = $geometryId AND feed_id = $feedId AND day = $day ORDER BY area_km2 DESC, reason`,
    { geometryId, feedId, day },
  )
}
