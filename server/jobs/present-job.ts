import type { Job } from '../../shared/schemas/running'
import type { JobRecord } from '../models/job'

const kindNames: Record<string, string> = {
  'process-file': 'read a file',
  'judge-region': 'judge a region',
  'backfill-region': 'read the history of a region',
  'backfill-feed': 'make the history of a feed anew',
  'pull-feed': 'fetch for a feed',
  'reread-views': 'make views anew',
  'make-mask': 'make a water mask',
}

export function presentJob(job: JobRecord): Job {
  const iso = (instant: number) => new Date(instant).toISOString()
  return {
    id: job.id,
    kind: kindNames[job.kind] ?? job.kind,
    subject: job.subject,
    state: job.state,
    done: job.done,
    total: job.total,
    attempts: job.attempts,
    lastError: job.lastError,
    createdAt: iso(job.createdAt),
    updatedAt: iso(job.updatedAt),
    runAfter: job.runAfter === null ? null : iso(job.runAfter),
  }
}
