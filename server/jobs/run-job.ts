import { randomUUID } from 'node:crypto'
import type { Context } from '../context'
import type { JobRecord } from '../models/job'
import { backfillFeed } from '../pipeline/backfill-feed'
import { backfillRegion } from '../pipeline/backfill-region'
import { LayerRefused } from '../grids/layer-refused'
import { judgeRegionJob } from '../pipeline/judge-region'
import { makeMask } from '../pipeline/masks/make-mask'
import { processFile } from '../pipeline/process-file'
import { refuseFile, refuseStored } from '../pipeline/refuse-file'
import { rereadViews } from '../pipeline/reread-views'
import { pullFeed } from '../pull/pull-feed'
import { takeJob, type JobKind, type JobLane } from './queue'

const handlers: Record<JobKind, (context: Context, job: JobRecord) => Promise<'done' | 'paused'>> = {
  'process-file': processFile,
  'backfill-region': backfillRegion,
  'backfill-feed': backfillFeed,
  'reread-views': rereadViews,
  'judge-region': judgeRegionJob,
  'make-mask': makeMask,
  'pull-feed': pullFeed,
}

const mostAttempts = 5
const retryAfterMs = [1_000, 5_000, 30_000, 120_000]

export const processOwner = randomUUID()

/** Runs one due job of a lane to its end; answers false when none was due. */
export async function runNextJob(context: Context, lane: JobLane = 'road'): Promise<boolean> {
  const job = await takeJob(context, processOwner, lane)
  if (!job) return false
  context.news.tell({ topic: 'jobs', id: job.id })
  try {
    const outcome = await handlers[job.kind as JobKind](context, job)
    if (outcome === 'done') await finish(context, job, { state: 'done', leaseOwner: null, leaseUntil: null })
  } catch (error) {
    if (error instanceof LayerRefused) await refuseStored(context, error)
    await fail(context, job, error)
  }
  context.news.tell({ topic: 'jobs', id: job.id })
  return true
}

async function finish(context: Context, job: JobRecord, change: Parameters<JobRecord['update']>[0]): Promise<void> {
  await context.db.write(async (tx) => {
    await job.reload({ transaction: tx })
    if (job.state !== 'running') return
    await job.update({ ...change, updatedAt: context.clock.now() }, { transaction: tx })
  })
}

/** A fault that is not the file's own: tried again a few times, then shown as failed until somebody retries it. */
async function fail(context: Context, job: JobRecord, error: unknown): Promise<void> {
  context.log.error({ err: error, job: job.id, kind: job.kind }, 'a job failed')
  const lastError = error instanceof Error ? error.message : String(error)
  const again = job.attempts < mostAttempts
  const wait = retryAfterMs[Math.min(job.attempts - 1, retryAfterMs.length - 1)]!
  await context.db.write(async (tx) => {
    await job.reload({ transaction: tx })
    if (job.state !== 'running') return
    const twin = again ? await context.models.jobs.count({ where: { kind: job.kind, jobKey: job.jobKey, state: 'waiting' }, transaction: tx }) : 0
    await job.update(
      {
        state: again && twin === 0 ? 'waiting' : 'failed',
        runAfter: again ? context.clock.system() + wait : null,
        leaseOwner: null,
        leaseUntil: null,
        lastError,
        updatedAt: context.clock.now(),
      },
      { transaction: tx },
    )
  })
  if (job.state === 'failed' && job.kind === 'process-file') await giveUpFile(context, job, lastError)
}

/** A file that no attempt could read is refused: it waits for nothing, and can be looked at, sent again or deleted. */
async function giveUpFile(context: Context, job: JobRecord, reason: string): Promise<void> {
  const file = await context.models.files.findByPk(Number(job.payload['fileId']))
  if (!file || file.status !== 'processing') return
  const sentence = `Reading this file failed ${job.attempts} times by a fault of Offing itself. It was logged; send the file again to have it tried again.`
  await refuseFile(context, file, new LayerRefused('reading-failed', sentence, { attempts: job.attempts, reason: reason.slice(0, 300) }))
}
