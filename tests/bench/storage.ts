import { statSync } from 'node:fs'
import { join } from 'node:path'
import { regionSeries } from '../../server/desk/region-series'
import { percentile, report } from './measured'
import { openOffing } from './offing'
import { shapes } from './shapes'

/** What a summary takes in the database, and how fast twenty years of them come out again. */
const fields = process.argv[2]!
const days = 7305
const offing = await openOffing()
const { context, feed } = offing
try {
  const [region] = await offing.draw(shapes(1, { west: -14, east: -2, south: 44, north: 56, least: 0.4, most: 0.9 }, 5))
  await offing.send(join(fields, 'year-0.nc'))
  await offing.work()
  // Twenty years of days as real ones are: the year that was read, again and again.
  const before = await bytes()
  await context.db.write((tx) =>
    context.db.run(
      `WITH RECURSIVE turns(n) AS (SELECT 1 UNION ALL SELECT n + 1 FROM turns WHERE n < 20)
       INSERT INTO summaries (geometry_id, feed_id, day, layer_id, provenance_id, observed_at, ends_at, cells, valid, whole_cells, whole_valid, coverage, valid_area_km2, mean,
         geometric_mean, median, p10, p25, p75, p90, p95, max, max_lat, max_lon, sd_log10, departure, non_positive, histogram)
       SELECT geometry_id, feed_id, day - n * 365, layer_id, provenance_id, observed_at - n * 31536000000, ends_at, cells, valid, whole_cells, whole_valid, coverage, valid_area_km2, mean,
         geometric_mean, median, p10, p25, p75, p90, p95, max, max_lat, max_lon, sd_log10, departure, non_positive, histogram
       FROM summaries, turns WHERE day - n * 365 > (SELECT MAX(day) FROM summaries) - $days`,
      { days },
      tx,
    ),
  )
  const added = await context.db.first<{ n: number }>('SELECT COUNT(*) - 365 AS n FROM summaries')
  const each = ((await bytes()) - before) / added!.n
  const took: number[] = []
  for (let turn = 0; turn < 60; turn++) {
    const started = performance.now()
    const { columns } = await regionSeries(context, region!.id, { feedId: feed.id })
    if (columns.day!.length !== days) throw new Error(`The series has ${columns.day!.length} days.`)
    // The first ones warm up.
    if (turn >= 10) took.push(performance.now() - started)
  }
  report([
    { what: 'a summary in the database', value: each, unit: 'bytes', most: null },
    { what: 'a daily series of 20 years (7,305 rows, all columns) from SQLite, p95', value: percentile(took, 0.95), unit: 'ms', most: 30 },
  ])
} finally {
  await offing.close()
}

async function bytes(): Promise<number> {
  await context.db.all('PRAGMA wal_checkpoint(TRUNCATE)')
  return statSync(join(context.env.dataDir, 'offing.sqlite')).size
}
