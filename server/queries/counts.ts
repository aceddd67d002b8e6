import type { Context } from '../context'

export interface Counts {
  files: number
  layers: number
  summaries: number
  regions: number
  openAlerts: number
  jobsWaiting: number
  jobsFailed: number
  lettersWaiting: number
  lettersFailed: number
}

export async function counts(context: Context): Promise<Counts> {
  const row = await context.db.first<Counts>(
    `SELECT (SELECT count(*) FROM files) AS files, (SELECT count(*) FROM layers) AS layers, (SELECT count(*) FROM summaries) AS summaries,
       (SELECT count(*) FROM regions WHERE retired_at IS NULL) AS regions, (SELECT count(*) FROM alerts WHERE state <> 'closed') AS openAlerts,
       (SELECT count(*) FROM jobs WHERE state IN ('waiting', 'running')) AS jobsWaiting, (SELECT count(*) FROM jobs WHERE state = 'failed') AS jobsFailed,
       (SELECT count(*) FROM letters WHERE state = 'waiting') AS lettersWaiting, (SELECT count(*) FROM letters WHERE state = 'failed') AS lettersFailed`,
  )
  return row!
}
