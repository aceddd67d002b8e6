import type { z } from 'zod'
import { feedFields, type Feed, type feedChange, type FeedProposal, type NewFeed } from '../../shared/schemas/feeds'
import { audit } from '../accounts/audit'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { FeedRecord } from '../models/feed'
import { queueFeedBackfill } from './backfill-feed'
import { derivedFields } from './derived-feed'
import { changesMatching, changesReading, checkReading } from './feed-reading'
import { queueJudging } from './queue-judging'
import { queueFile } from './receive-file'

const hourMs = 3_600_000

interface LayerSpan {
  feedId: number
  layers: number
  oldest: number
  newest: number
  /** Of those observed by now; null when all are dated ahead. */
  newestEnd: number | null
}

export async function presentFeeds(context: Context, feeds: readonly FeedRecord[]): Promise<Feed[]> {
  const now = context.clock.now()
  const spans = await context.db.all<LayerSpan>(
    `SELECT feed_id AS feedId, count(*) AS layers, min(observed_at) AS oldest, max(observed_at) AS newest,
       max(CASE WHEN observed_at <= $now THEN ifnull(ends_at, observed_at) END) AS newestEnd FROM layers GROUP BY feed_id`,
    { now },
  )
  const byFeed = new Map(spans.map((span) => [span.feedId, span]))
  return feeds.map((feed) => {
    const span = byFeed.get(feed.id)
    const age = span?.newestEnd == null ? null : (now - span.newestEnd) / hourMs
    const { createdAt, ...fields } = feed.get({ plain: true })
    return {
      ...fields,
      createdAt: new Date(createdAt).toISOString(),
      layers: span?.layers ?? 0,
      oldestLayerAt: span ? new Date(span.oldest).toISOString() : null,
      newestLayerAt: span ? new Date(span.newest).toISOString() : null,
      newestAgeHours: age,
      silent: age !== null && age > feed.silentAfterHours,
    }
  })
}

/** A confirmed feed: the file it was proposed from, and every other waiting one, goes back into the queue at once. */
export async function createFeed(context: Context, person: Person, { fileId, ...fields }: NewFeed): Promise<FeedRecord> {
  const feed = await context.db.write(async (tx) => {
    const record = await addFeed(context, tx, person, fields, fileId ?? null)
    await requeueWaiting(context, tx, fileId)
    return record
  })
  context.news.tell({ topic: 'feeds', id: feed.id }, { topic: 'files' })
  context.wake()
  return feed
}

/** Feeds confirmed together from one file, all or none; it goes back into the queue once. */
export async function createFeedsOfFile(context: Context, person: Person, fileId: number, feeds: readonly FeedProposal[]): Promise<FeedRecord[]> {
  const file = await context.models.files.findByPk(fileId)
  if (!file) throw new ApiError('not-found', 'There is no such file.')
  const records = await context.db.write(async (tx) => {
    const made: FeedRecord[] = []
    for (const fields of feeds) made.push(await addFeed(context, tx, person, fields, fileId))
    await requeueWaiting(context, tx, fileId)
    return made
  })
  context.news.tell(...records.map((record) => ({ topic: 'feeds' as const, id: record.id })), { topic: 'files' })
  context.wake()
  return records
}

async function addFeed(context: Context, tx: Transaction, person: Person, fields: Omit<NewFeed, 'fileId'>, fileId: number | null): Promise<FeedRecord> {
  await freeName(context, tx, fields.name)
  const known = fields.derivedFrom === undefined ? await withFileUnit(context, tx, feedFields.parse(fields), fileId) : await derivedFields(context, tx, { ...fields, derivedFrom: fields.derivedFrom })
  checkReading(known)
  const record = await context.models.feeds.create({ ...known, retired: false, createdAt: context.clock.now() }, { transaction: tx })
  if (record.derivedFrom !== null && record.derivedFrom !== undefined) await queueFeedBackfill(context, tx, record)
  await audit(context, tx, { userId: person.id, action: 'feed:create', subject: `feed ${record.id}`, details: { name: fields.name, fileId } })
  return record
}

/** Confirmed from a file that names no unit, a feed says the unit of its files' numbers too: that person looked at them. */
async function withFileUnit(context: Context, tx: Transaction, fields: FeedProposal, fileId: number | null): Promise<FeedProposal> {
  if (fileId === null || fields.fileUnit !== null) return fields
  const file = await context.models.files.findByPk(fileId, { transaction: tx })
  const variable = file?.report?.variables.find(({ name }) => name === fields.variable)
  return variable?.unit === null ? { ...fields, fileUnit: fields.unit } : fields
}

async function requeueWaiting(context: Context, tx: Transaction, fileId?: number): Promise<void> {
  if (fileId !== undefined) await requeueNamed(context, tx, fileId)
  for (const file of await context.models.files.findAll({ where: { status: 'waiting' }, transaction: tx })) await queueFile(context, file, tx)
}

export async function changeFeed(context: Context, person: Person, id: number, { version, ...change }: z.infer<typeof feedChange>): Promise<FeedRecord> {
  const feed = await context.db.write(async (tx) => {
    const record = await context.models.feeds.findByPk(id, { transaction: tx })
    if (!record) throw new ApiError('not-found', 'There is no such feed.')
    if (record.version !== version) throw new ApiError('stale-version', 'Somebody else changed this feed meanwhile. Look at it again.', { version: record.version })
    if (change.name !== undefined && change.name !== record.name) await freeName(context, tx, change.name)
    checkReading({ ...record.get({ plain: true }), ...definedOf(change) })
    if (change.cadence !== undefined && change.cadence !== record.cadence) await cadenceOfDerived(context, tx, record, change.cadence)
    const rereads = changesReading(record, change)
    const rejudges = change.gapFilled !== undefined && change.gapFilled !== record.gapFilled
    const before = record.get({ plain: true })
    await record.update({ ...change, version: version + 1 }, { transaction: tx })
    if (rereads) await queueFeedBackfill(context, tx, record)
    if (rejudges) await queueJudging(context, tx, { feedId: id })
    if (changesMatching(before, record)) await requeueWaiting(context, tx)
    await audit(context, tx, { userId: person.id, action: 'feed:change', subject: `feed ${id}`, details: { ...change } })
    return record
  })
  context.news.tell({ topic: 'feeds', id }, { topic: 'files' })
  context.wake()
  return feed
}

/** What is worked out from a feed comes as often as that feed. */
async function cadenceOfDerived(context: Context, tx: Transaction, { id, derivedFrom }: FeedRecord, cadence: Feed['cadence']): Promise<void> {
  if (derivedFrom !== null) throw new ApiError('not-valid', 'A derived feed has the cadence of the feed it is derived from.', { fields: { cadence: 'Change it on the feed it is derived from.' } })
  await context.models.feeds.update({ cadence }, { where: { derivedFrom: id }, transaction: tx })
}

function definedOf<T extends object>(change: T): { [K in keyof T]?: Exclude<T[K], undefined> } {
  return Object.fromEntries(Object.entries(change).filter(([, value]) => value !== undefined)) as { [K in keyof T]?: Exclude<T[K], undefined> }
}

async function requeueNamed(context: Context, tx: Transaction, fileId: number): Promise<void> {
  const file = await context.models.files.findByPk(fileId, { transaction: tx })
  if (!file) throw new ApiError('not-valid', 'There is no such file.', { fields: { fileId: 'There is no such file.' } })
  if (file.status !== 'waiting' && file.status !== 'refused') {
    throw new ApiError('conflict', `The file ${file.name} is not waiting: it is ${file.status}.`)
  }
  await queueFile(context, file, tx)
}

async function freeName(context: Context, tx: Transaction, name: string): Promise<void> {
  if ((await context.models.feeds.count({ where: { name }, transaction: tx })) === 0) return
  throw new ApiError('conflict', `A feed named ${name} exists already.`, { fields: { name: 'This name is taken.' } })
}
