import { addressAt } from '../../shared/address-pattern'
import type { PullSettings } from '../../shared/schemas/pulls'
import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { FeedRecord } from '../models/feed'
import { pullOf, removePull, writePull, type PullRow } from '../queries/pulls'
import { seal } from './credentials'
import { networkOf } from './network'
import { PullFailed } from './pull-failed'
import { queuePull } from './queue-pulls'
import { nextDue } from './schedule'

/** Sets what a feed fetches for itself. */
export async function keepPull(context: Context, person: Person, feedId: number, settings: PullSettings): Promise<void> {
  const url = fetchable(context, settings.address)
  await context.db.write(async (tx) => {
    await livingFeed(context, tx, feedId)
    const before = await pullOf(context.db, feedId, tx)
    if ((before?.version ?? null) !== settings.version) {
      throw new ApiError('stale-version', 'Somebody else changed what this feed fetches meanwhile. Look at it again.', { version: before?.version ?? null })
    }
    const { address, everyHours, atMinute, lookBackDays, stepMinutes } = settings
    const now = context.clock.now()
    await writePull(context.db, tx, {
      feedId, address, everyHours, atMinute, lookBackDays, stepMinutes,
      ...credentialsOf(context, feedId, url, before, settings),
      nextDueAt: nextDue(settings, now),
      failuresInRow: 0,
      createdAt: before?.createdAt ?? now,
      version: (before?.version ?? 0) + 1,
    })
    const credentials = settings.credentials === undefined ? 'as before' : (settings.credentials?.kind ?? 'none')
    await audit(context, tx, { userId: person.id, action: 'feed:pull', subject: `feed ${feedId}`, details: { address, everyHours, atMinute, lookBackDays, stepMinutes, credentials } })
  })
  context.news.tell({ topic: 'feeds', id: feedId })
}

/** Ends it: nothing is fetched any more, and the credentials are gone. */
export async function dropPull(context: Context, person: Person, feedId: number): Promise<void> {
  await context.db.write(async (tx) => {
    const before = await existingPull(context, tx, feedId)
    await removePull(context.db, tx, feedId)
    await audit(context, tx, { userId: person.id, action: 'feed:pull-end', subject: `feed ${feedId}`, details: { address: before.address } })
  })
  context.news.tell({ topic: 'feeds', id: feedId })
}

/** Queues a pull at once, whatever the schedule says. */
export async function pullNow(context: Context, person: Person, feedId: number): Promise<void> {
  await context.db.write(async (tx) => {
    const feed = await livingFeed(context, tx, feedId)
    await existingPull(context, tx, feedId)
    await queuePull(context, tx, feed)
    await audit(context, tx, { userId: person.id, action: 'feed:pull-now', subject: `feed ${feedId}` })
  })
  context.news.tell({ topic: 'feeds', id: feedId })
  context.wake()
}

function fetchable(context: Context, address: string): URL {
  const url = new URL(addressAt(address, context.clock.now()))
  try {
    networkOf(context).gate.check(url)
    return url
  } catch (error) {
    if (error instanceof PullFailed) throw new ApiError('not-valid', error.message, { fields: { address: error.message } })
    throw error
  }
}

/**
 * What is stored stays with the server it was given for: else whoever may change the address could have it sent to a
 * server of their own, and read there what nobody is to read here.
 */
function credentialsOf(context: Context, feedId: number, url: URL, before: PullRow | null, { credentials }: PullSettings): Pick<PullRow, 'credentialsKind' | 'credentials'> {
  if (credentials) return { credentialsKind: credentials.kind, credentials: seal(context.env.sessionSecret, feedId, credentials) }
  if (credentials === null || !before?.credentials) return { credentialsKind: 'none', credentials: null }
  if (new URL(addressAt(before.address, 0)).origin !== url.origin) {
    const sentence = 'The address is on another server now: give the credentials again, or take them away.'
    throw new ApiError('not-valid', sentence, { fields: { credentials: sentence } })
  }
  return { credentialsKind: before.credentialsKind, credentials: before.credentials }
}

async function livingFeed(context: Context, tx: Transaction, feedId: number): Promise<FeedRecord> {
  const feed = await context.models.feeds.findByPk(feedId, { transaction: tx })
  if (!feed) throw new ApiError('not-found', 'There is no such feed.')
  if (feed.retired) throw new ApiError('conflict', `${feed.name} is retired: it fetches nothing.`)
  if (feed.derivedFrom !== null) throw new ApiError('conflict', `${feed.name} is worked out from another feed: it has no files of its own to fetch.`)
  return feed
}

async function existingPull(context: Context, tx: Transaction, feedId: number): Promise<PullRow> {
  const pull = await pullOf(context.db, feedId, tx)
  if (!pull) throw new ApiError('not-found', 'This feed fetches nothing for itself.')
  return pull
}
