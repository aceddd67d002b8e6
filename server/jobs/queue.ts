import type { Context } from '../context'
import type { Transaction } from '../db'
import type { JobPayload, JobRecord } from '../models/job'

export interface NewJob {
  kind: JobKind
  /** Two waiting jobs of one kind and key are one. */
  key: string
  subject: string
  payload: JobPayload
  /** Lower goes first. */
  priority: number
  runAfter?: number
}

/** Jobs of one lane run one after another. Fetching waits for servers elsewhere, so it has a lane that holds up no other. */
export const jobLanes = {
  road: ['process-file', 'judge-region', 'backfill-region', 'backfill-feed', 'reread-views', 'make-mask'],
  pull: ['pull-feed'],
} as const
export type JobLane = keyof typeof jobLanes
export type JobKind = (typeof jobLanes)[JobLane][number]

const leaseMs = 60_000

/** Adds a job in the caller's transaction, unless the same one waits already. */
export async function enqueueJob(context: Context, tx: Transaction, job: NewJob): Promise<void> {
  const at = context.clock.now()
  await context.db.run(
    `INSERT INTO jobs (kind, job_key, subject, payload, state, priority, run_after, created_at, updated_at)
     VALUES ($kind, $key, $subject, $payload, 'waiting', $priority, $runAfter, $at, $at)
     ON CONFLICT (kind, job_key) WHERE state = 'waiting' DO UPDATE SET priority = min(priority, excluded.priority)`,
    { ...job, payload: JSON.stringify(job.payload), runAfter: job.runAfter ?? null, at },
    tx,
  )
}

/** Takes the next due job of a lane with a lease, or answers null. One whose twin still runs waits for that to end. */
export async function takeJob(context: Context, owner: string, lane: JobLane): Promise<JobRecord | null> {
  const now = context.clock.system()
  const due = { now, kinds: JSON.stringify(jobLanes[lane]) }
  const sql = `SELECT id FROM jobs j WHERE state = 'waiting' AND (run_after IS NULL OR run_after <= $now)
    AND kind IN (SELECT value FROM json_each($kinds))
    AND NOT EXISTS (SELECT 1 FROM jobs r WHERE r.state = 'running' AND r.kind = j.kind AND r.job_key = j.job_key)
    ORDER BY priority, id LIMIT 1`
  if (!(await context.db.first<{ id: number }>(sql, due))) return null
  return context.db.write(async (tx) => {
    const next = await context.db.first<{ id: number }>(sql, due, tx)
    if (!next) return null
    const job = await context.models.jobs.findByPk(next.id, { transaction: tx, rejectOnEmpty: true })
    return job.update(
      { state: 'running', attempts: job.attempts + 1, leaseOwner: owner, leaseUntil: now + leaseMs, updatedAt: context.clock.now(), lastError: null },
      { transaction: tx },
    )
  })
}

/** Takes every waiting job of the same kind that is due, to be done along with this one. */
export async function joinJobs(context: Context, lead: JobRecord): Promise<JobRecord[]> {
  const due = { kind: lead.kind, now: context.clock.system() }
  const sql = `SELECT id FROM jobs WHERE state = 'waiting' AND kind = $kind AND (run_after IS NULL OR run_after <= $now) ORDER BY priority, id`
  if (!(await context.db.first<{ id: number }>(sql, due))) return []
  return context.db.write(async (tx) => {
    const joined: JobRecord[] = []
    for (const { id } of await context.db.all<{ id: number }>(sql, due, tx)) {
      const job = await context.models.jobs.findByPk(id, { transaction: tx, rejectOnEmpty: true })
      joined.push(await job.update({ state: 'running', leaseOwner: lead.leaseOwner, leaseUntil: due.now + leaseMs, updatedAt: context.clock.now(), lastError: null }, { transaction: tx }))
    }
    return joined
  })
}

/** Notes how far a job has come, in the transaction that did the work, and renews its lease. */
export async function markProgress(context: Context, tx: Transaction, job: JobRecord, done: number, total: number): Promise<void> {
  await job.update({ done, total, leaseUntil: context.clock.system() + leaseMs, updatedAt: context.clock.now() }, { transaction: tx })
}
