import { stringify } from 'csv-stringify/sync'
import { seriesColumnNames, type Series } from '../../shared/schemas/series'

/** A series as CSV: one row a view, an empty field for what is missing. */
export function seriesCsv(series: Series): string {
  const names = seriesColumnNames.filter((name) => series.columns[name] !== undefined)
  const length = series.columns[names[0]!]?.length ?? 0
  const rows = Array.from({ length }, (_, i) => names.map((name) => series.columns[name]![i] ?? ''))
  return stringify([names, ...rows])
}
