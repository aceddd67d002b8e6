import { addressesOf } from '../../shared/address-pattern'
import type { FeedPull, PullRun } from '../../shared/schemas/pulls'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { pullIsQueued, pullOf, runsOf, type PullRow, type RunRow } from '../queries/pulls'

const shownRuns = 20
const failuresThatShow = 3

/** What a feed fetches and how that goes; of the credentials, only that there are some. */
export async function presentPull(context: Context, feedId: number): Promise<FeedPull> {
  if ((await context.models.feeds.count({ where: { id: feedId } })) === 0) throw new ApiError('not-found', 'There is no such feed.')
  const pull = await pullOf(context.db, feedId)
  const runs = (await runsOf(context.db, feedId, shownRuns)).map(presentRun)
  return {
    feedId,
    settings: pull && settingsOf(pull),
    example: pull && (addressesOf(pull.address, { ...pull, now: context.clock.now(), lookBackDays: 0 })[0]?.address ?? null),
    running: pull !== null && (await pullIsQueued(context.db, feedId)),
    nextDueAt: pull && iso(pull.nextDueAt),
    failuresInRow: pull?.failuresInRow ?? 0,
    failing: (pull?.failuresInRow ?? 0) >= failuresThatShow,
    lastRun: runs[0] ?? null,
    runs,
  }
}

function settingsOf({ address, everyHours, atMinute, lookBackDays, stepMinutes, credentialsKind, version }: PullRow): FeedPull['settings'] {
  return { address, everyHours, atMinute, lookBackDays, stepMinutes, credentials: credentialsKind, version }
}

function presentRun(run: RunRow): PullRun {
  return { ...run, startedAt: iso(run.startedAt), endedAt: iso(run.endedAt) }
}

const iso = (instant: number) => new Date(instant).toISOString()
