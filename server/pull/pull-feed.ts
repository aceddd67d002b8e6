import { addressesOf, type Slot } from '../../shared/address-pattern'
import type { Context } from '../context'
import { markProgress } from '../jobs/queue'
import type { JobRecord } from '../models/job'
import { pullOf, type PullRow } from '../queries/pulls'
import { authorizationOf, unseal } from './credentials'
import { fileNameOf } from './file-name-of'
import { finishRun } from './finish-run'
import { HostRests, PullFailed, PullStopped } from './pull-failed'
import { pullAddress } from './pull-address'
import { emptyTally, noteFailure, type Tally } from './tally'

const mostFailures = 3

/** One pull of a feed: every address of its days is asked for what is new or corrected, and a line says what came of it. */
export async function pullFeed(context: Context, job: JobRecord): Promise<'done' | 'paused'> {
  const feedId = Number(job.payload['feedId'])
  const pull = await pullOf(context.db, feedId)
  const feed = await context.models.feeds.findByPk(feedId)
  if (!pull || !feed || feed.retired) return 'done'
  const startedAt = context.clock.now()
  const tally = emptyTally()
  try {
    await askAll(context, job, pull, tally)
  } catch (error) {
    if (error instanceof PullStopped) return 'paused'
    throw error
  } finally {
    if (tally.fetched > 0) context.wake()
  }
  await finishRun(context, feedId, startedAt, tally)
  context.news.tell({ topic: 'feeds', id: feedId })
  return 'done'
}

async function askAll(context: Context, job: JobRecord, pull: PullRow, tally: Tally): Promise<void> {
  const slots = addressesOf(pull.address, { now: context.clock.now(), lookBackDays: pull.lookBackDays, stepMinutes: pull.stepMinutes })
  for (const [done, slot] of slots.entries()) {
    await context.db.write((tx) => markProgress(context, tx, job, done, slots.length))
    const goOn = await askOne(context, pull, slot, tally)
    if (!goOn || tally.failed >= mostFailures) return
  }
  await context.db.write((tx) => markProgress(context, tx, job, slots.length, slots.length))
}

/** Answers whether the next address is worth asking. */
async function askOne(context: Context, pull: PullRow, slot: Slot, tally: Tally): Promise<boolean> {
  try {
    const authorization = pull.credentials === null ? null : authorizationOf(unseal(context.env.sessionSecret, pull.feedId, pull.credentials))
    const outcome = await pullAddress(context, pull, slot, { authorization, forgiven: tally.forgiven })
    tally[outcome] += 1
    return true
  } catch (error) {
    if (error instanceof PullStopped) throw error
    if (error instanceof HostRests) {
      tally.postponedUntil = error.until
      tally.sentence ??= error.message
      return false
    }
    const fault = error instanceof PullFailed ? error : ourOwn(context, pull, error)
    noteFailure(tally, fault, fileNameOf(new URL(slot.address)))
    return !fault.endsRun
  }
}

/** Logged without what was asked: an address may hold more than its provider meant to show. */
function ourOwn(context: Context, pull: PullRow, error: unknown): PullFailed {
  context.log.error({ err: error, feed: pull.feedId }, 'fetching failed by a fault of our own')
  return new PullFailed('Something went wrong in Offing itself while fetching. It was logged.', { endsRun: true })
}
