import type { Context } from '../context'
import type { Transaction } from '../db'
import { LayerRefused } from '../grids/layer-refused'
import type { JobRecord } from '../models/job'
import { refuseFile } from '../pipeline/refuse-file'

/** Runs of a job that ended the process, and got no further each time, before it is given up. */
const mostEnded = 3

/**
 * A restart voids what an earlier process had taken: its work is done again from the last committed mark. A job during
 * which the process ended time and again (the system may kill it for its memory) is given up, else it would end every
 * process that follows.
 */
export async function voidLeases(context: Context): Promise<number> {
  const { voided, givenUp } = await context.db.write(async (tx) => {
    const held = await context.models.jobs.findAll({ where: { state: 'running' }, transaction: tx })
    const givenUp: JobRecord[] = []
    for (const job of held) if (await voidLease(context, job, tx)) givenUp.push(job)
    return { voided: held.length, givenUp }
  })
  for (const job of givenUp) {
    context.log.error({ job: job.id, kind: job.kind, attempts: job.attempts }, 'a job ended Offing time and again and was given up')
    if (job.kind === 'process-file') await refuseItsFile(context, job)
  }
  return voided
}

/** Answers whether it was given up. One that got further than at the last restart starts its count again: it is no trap. */
async function voidLease(context: Context, job: JobRecord, tx: Transaction): Promise<boolean> {
  const free = { leaseOwner: null, leaseUntil: null }
  const twin = await context.models.jobs.findOne({ where: { kind: job.kind, jobKey: job.jobKey, state: 'waiting' }, transaction: tx })
  const before = job.payload['doneWhenEnded']
  const attempts = typeof before === 'number' && job.done > before ? 1 : job.attempts
  if (attempts >= mostEnded) {
    await job.update({ ...free, state: 'failed', attempts, lastError: endedSentence('This job', attempts), updatedAt: context.clock.now() }, { transaction: tx })
    return true
  }
  if (twin) {
    // The newer one is the same work: what is known of it goes along.
    await twin.update({ attempts: Math.max(twin.attempts, attempts), payload: { ...twin.payload, doneWhenEnded: job.done } }, { transaction: tx })
    await job.update({ ...free, state: 'cancelled', lastError: 'Taken over by a newer job.' }, { transaction: tx })
  } else {
    await job.update({ ...free, state: 'waiting', attempts, payload: { ...job.payload, doneWhenEnded: job.done } }, { transaction: tx })
  }
  return false
}

function endedSentence(what: string, times: number): string {
  return `${what} ended Offing ${times} times, so it was given up.`
}

async function refuseItsFile(context: Context, job: JobRecord): Promise<void> {
  const file = await context.models.files.findByPk(Number(job.payload['fileId']))
  if (!file || (file.status !== 'processing' && file.status !== 'received')) return
  await refuseFile(context, file, new LayerRefused('reading-ended', endedSentence('Reading this file', job.attempts), { attempts: job.attempts }))
}
