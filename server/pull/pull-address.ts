import { namesItsDay, type Slot } from '../../shared/address-pattern'
import type { Context } from '../context'
import { receiveFile } from '../pipeline/receive-file'
import { dropFile } from '../pipeline/stored-files'
import { feedHasBytes, givenElsewhere, hostRestsUntil, keepPulledAddress, pulledAddress, touchPulledAddress, type PullRow } from '../queries/pulls'
import { fetchFile } from './fetch-file'
import { fileNameOf } from './file-name-of'
import { networkOf } from './network'
import { HostRests } from './pull-failed'
import type { Counts } from './tally'

const dayMs = 86_400_000

interface With {
  authorization: string | null
  forgiven: Set<string>
}

/**
 * Asks one address. New bytes go down the road of every file; bytes the feed has are nothing, whatever a server says of
 * them. What is remembered of the address is written last: a crash before that only means asking once more.
 */
export async function pullAddress(context: Context, pull: PullRow, slot: Slot, { authorization, forgiven }: With): Promise<Exclude<keyof Counts, 'failed'>> {
  const { db, clock } = context
  const url = new URL(slot.address)
  const before = await pulledAddress(db, pull.feedId, slot.address)
  const fetched = await fetchFile(context.env, networkOf(context), {
    url,
    authorization,
    known: before && { etag: before.etag, lastModified: before.lastModified },
    now: clock.now(),
    mayAsk: async (host) => {
      const until = await hostRestsUntil(db, host)
      if (until === null) return
      if (until > clock.now()) throw new HostRests(host, until)
      forgiven.add(host)
    },
  })
  if (fetched.kind === 'unchanged') {
    // Once a day is enough to tell an address still asked for from one that no pull comes back to.
    if (before && clock.now() - before.askedAt > dayMs) await db.write((tx) => touchPulledAddress(db, tx, pull.feedId, slot.address, clock.now()))
    return 'unchanged'
  }
  if (fetched.kind === 'not-there') return 'notThere'
  const { arrived, validators } = fetched
  // New bytes under a name that has its day correct what it gave before; under another name they may be of another day.
  const changed = before !== null && before.fileId !== null && before.checksum !== arrived.checksum && !(await givenElsewhere(db, pull.feedId, slot.address, before.checksum))
  const replaces = changed ? { fileId: before.fileId!, wholly: namesItsDay(pull.address) } : null
  const known = before?.checksum === arrived.checksum || (replaces === null && (await feedHasBytes(db, pull.feedId, arrived.checksum)))
  const modifiedAt = validators.lastModified === null ? null : instantOf(validators.lastModified)
  const arrival = { name: fileNameOf(url), arrived, origin: 'pull' as const, userId: null, feedId: pull.feedId, observedAt: observedAt(pull, slot), modifiedAt, replaces }
  const file = known ? null : await receiveFile(context, arrival)
  await dropFile(arrived)
  await db.write((tx) =>
    keepPulledAddress(db, tx, { feedId: pull.feedId, address: slot.address, ...validators, checksum: arrived.checksum, fileId: file?.id ?? null, askedAt: clock.now() }),
  )
  return known ? 'unchanged' : 'fetched'
}

function instantOf(httpDate: string): number | null {
  const ms = Date.parse(httpDate)
  return Number.isNaN(ms) ? null : ms
}

/** For a file without a time of its own: the day its address names. Where it names an hour, the feed's file-name pattern has to say it. */
function observedAt(pull: PullRow, slot: Slot): number | null {
  return namesItsDay(pull.address) && !pull.address.includes('{HH}') ? slot.at : null
}
