import type { PullRun } from '../../shared/schemas/pulls'
import type { Context } from '../context'
import type { Transaction } from '../db'
import { addRun, forgiveHost, pullOf, refusalsOfHost, restHost, setFailures, setNextDue } from '../queries/pulls'
import { backoffMs } from './schedule'
import type { Tally } from './tally'

/** Writes the line of a run, and when to come again: as scheduled, sooner after a passing fault, later where a server asks for rest. */
export async function finishRun(context: Context, feedId: number, startedAt: number, tally: Tally): Promise<void> {
  const { db } = context
  const now = context.clock.now()
  await db.write(async (tx) => {
    const { fetched, unchanged, notThere, failed, sentence } = tally
    const outcome = outcomeOf(tally)
    await addRun(db, tx, feedId, { startedAt, endedAt: now, outcome, fetched, unchanged, notThere, failed, sentence })
    for (const host of tally.forgiven) if (host !== tally.rest?.host) await forgiveHost(db, tx, host)
    const until = tally.rest ? await letRest(context, tx, tally.rest, now) : tally.postponedUntil
    // It may have been taken away meanwhile.
    const pull = await pullOf(db, feedId, tx)
    if (!pull) return
    const failures = outcome === 'failed' ? pull.failuresInRow + 1 : outcome === 'ok' ? 0 : pull.failuresInRow
    await setFailures(db, tx, feedId, failures)
    if (until !== null) await setNextDue(db, tx, feedId, until)
    else if (outcome === 'failed' && tally.worthAskingSoon) await setNextDue(db, tx, feedId, Math.min(pull.nextDueAt, now + backoffMs(failures)))
  })
}

function outcomeOf(tally: Tally): PullRun['outcome'] {
  if (tally.failed > 0) return 'failed'
  return tally.postponedUntil === null ? 'ok' : 'postponed'
}

/** As long as the server said; where it did not, longer with every refusal. */
async function letRest(context: Context, tx: Transaction, { host, until }: NonNullable<Tally['rest']>, now: number): Promise<number> {
  const refusals = (await refusalsOfHost(context.db, tx, host)) + 1
  const notBefore = until ?? now + backoffMs(refusals)
  await restHost(context.db, tx, host, notBefore, refusals)
  return notBefore
}
