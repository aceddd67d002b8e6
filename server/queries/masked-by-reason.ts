import type { Context } from '../context'

/** Water hidden in each view, km2, by reason; the order of the series' columns, 0 where a reason hid nothing. */
export async function maskedByReason(
  context: Context,
  views: { geometryId: number; feedId: number; fromDay: number | null; toDay: number | null },
): Promise<Record<string, number[]>> {
  const where = 'geometry_id = $geometryId AND feed_id = $feedId AND ($fromDay IS NULL OR day >= $fromDay) AND ($toDay IS NULL OR day <= $toDay)'
  const bind = { ...views }
  const days = await context.db.all<{ day: number }>(`SELECT day FROM summaries WHERE ${where} ORDER BY day`, bind)
  const rows = await context.db.all<{ day: number; reason: string; areaKm2: number }>(`SELECT day, reason, area_km2 AS areaKm2 FROM summary_reasons WHERE ${where}`, bind)
  const places = new Map(days.map(({ day }, at) => [day, at]))
  const columns = new Map<string, number[]>()
  for (const { day, reason, areaKm2 } of rows) {
    const column = columns.get(reason) ?? days.map(() => 0)
    column[places.get(day)!] = areaKm2
    columns.set(reason, column)
  }
  return Object.fromEntries([...columns].sort(([a], [b]) => a.localeCompare(b)))
}
