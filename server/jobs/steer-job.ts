import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { JobRecord, JobState } from '../models/job'

const allowed: Record<'retry' | 'pause' | 'cancel', readonly JobState[]> = {
  retry: ['failed', 'paused', 'cancelled'],
  pause: ['waiting', 'running'],
  cancel: ['waiting', 'running', 'paused', 'failed'],
}
/** Those that read a whole history look at their state between batches. */
const stoppable: ReadonlySet<string> = new Set(['backfill-region', 'backfill-feed', 'make-mask'])
const result = { retry: 'waiting', pause: 'paused', cancel: 'cancelled' } as const

/** Retry, pause or cancel. A running job looks at its state between batches and stops there; what it committed stays. */
export async function steerJob(context: Context, person: Person, id: number, act: keyof typeof result): Promise<JobRecord> {
  const job = await context.db.write(async (tx) => {
    const record = await context.models.jobs.findByPk(id, { transaction: tx })
    if (!record) throw new ApiError('not-found', 'There is no such job.')
    if (!allowed[act].includes(record.state)) throw new ApiError('conflict', `The job is ${record.state}.`)
    if (record.state === 'running' && !stoppable.has(record.kind)) throw new ApiError('conflict', 'Only the reading of history can be stopped on the way; this job ends by itself.')
    if (act === 'retry' && (await context.models.jobs.count({ where: { kind: record.kind, jobKey: record.jobKey, state: 'waiting' }, transaction: tx })) > 0) {
      throw new ApiError('conflict', 'The same job waits already.')
    }
    await record.update({ state: result[act], runAfter: null, leaseOwner: null, leaseUntil: null, ...(act === 'retry' ? { attempts: 0, lastError: null } : {}), updatedAt: context.clock.now() }, { transaction: tx })
    await audit(context, tx, { userId: person.id, action: `job:${act}`, subject: `job ${id}`, details: { kind: record.kind, of: record.subject } })
    return record
  })
  context.news.tell({ topic: 'jobs', id })
  context.wake()
  return job
}
