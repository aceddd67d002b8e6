import type { Context } from '../context'
import type { Transaction } from '../db'
import { giveWay, moreUrgent } from '../jobs/give-way'
import { enqueueJob, joinJobs, markProgress } from '../jobs/queue'
import type { JobRecord } from '../models/job'
import type { RegionRecord } from '../models/region'
import { trustedLayerTimes } from '../queries/layers'
import { nextViews, type Share } from './backfill-order'
import { ensureFirstRule } from './first-rule'
import { queueJudging } from './queue-judging'
import { boxesMeet } from './summarise-layers'
import { keepViews, makeViews, type MadeViews, type ViewKey } from './summarise-views'
import { viewDay } from './view-day'

/** Days of a feed read between two marks of progress. */
const daysAtOnce = 128

/** One region's part in a pass over the history. */
interface Part extends Share {
  job: JobRecord
  region: RegionRecord
  /** How many of its views are written, or being written. */
  done: number
}

export async function queueBackfill(context: Context, tx: Transaction, region: { id: number; name: string; geometryId: number }): Promise<void> {
  await enqueueJob(context, tx, {
    kind: 'backfill-region',
    key: String(region.geometryId),
    subject: region.name,
    payload: { regionId: region.id, geometryId: region.geometryId },
    priority: 40,
  })
}

/**
 * Reads the history of newly drawn outlines, newest day first, in small committed batches; the mark of progress is the
 * last whole day done, so a restart goes on from there. Regions that wait for the same join in: each layer is read once
 * for all of them. While one batch is written the next is read, and the one after it prepared.
 */
export async function backfillRegion(context: Context, job: JobRecord): Promise<'done' | 'paused'> {
  const own = await partOf(context, job)
  if (!own) return 'done'
  const parts = [own]
  let writing: Promise<unknown> = Promise.resolve()
  let ahead: Batch | null = null
  try {
    while (own.done < own.keys.length) {
      await joinIn(context, parts)
      if (!(await stillRunning(parts))) return await leave(context, parts, writing)
      const batch: Batch = ahead ?? take(context, parts)
      ahead = own.next < own.keys.length ? take(context, parts) : null
      const made = await batch.made
      await writing
      for (const [part, keys] of batch.views) part.done += keys.length
      const marks = [...batch.views].map(([part, keys]) => ({ part, done: part.done, day: keys.at(-1)!.day }))
      writing = keepViews(context, made, async (tx) => {
        for (const { part, done, day } of marks) {
          await part.job.update({ payload: { ...part.job.payload, readTo: day } }, { transaction: tx })
          await markProgress(context, tx, part.job, done, part.keys.length)
        }
      }).then(() => told(context, parts))
      writing.catch(() => undefined)
      await endOthers(context, parts, writing)
      if (own.done < own.keys.length && (await moreUrgent(context, job))) {
        await writing
        for (const part of parts) await giveWay(context, part.job)
        return 'paused'
      }
    }
    await writing
  } catch (error) {
    await leave(context, parts.slice(1), Promise.resolve())
    throw error
  }
  await leave(context, parts.slice(1), writing)
  await judgeNext(context, own.region)
  return 'done'
}

interface Batch {
  views: Map<Part, ViewKey[]>
  made: Promise<MadeViews>
}

/** The next views of all parts, being made from now on. */
function take(context: Context, parts: readonly Part[]): Batch {
  const views = nextViews(parts, daysAtOnce)
  for (const [part, keys] of views) part.next += keys.length
  const made = makeViews(context, [...views.values()].flat())
  // One that is never waited for, because the work stops before it, may fail unheard.
  made.catch(() => undefined)
  return { views, made }
}

/** Those that still run go back to waiting, to be taken up again at once; the paused and cancelled stay as they are. */
async function leave(context: Context, parts: readonly Part[], writing: Promise<unknown>): Promise<'paused'> {
  await writing
  for (const part of parts) {
    await part.job.reload()
    if (part.job.state === 'running') await giveWay(context, part.job)
  }
  return 'paused'
}

async function joinIn(context: Context, parts: Part[]): Promise<void> {
  const [lead] = parts
  for (const job of await joinJobs(context, lead!.job)) {
    const part = await partOf(context, job)
    if (part) parts.push(part)
    else await context.db.write((tx) => job.update({ state: 'done', leaseOwner: null, leaseUntil: null }, { transaction: tx }))
  }
}

/** Drops those that somebody paused or cancelled; false when that is the one this pass was begun for. */
async function stillRunning(parts: Part[]): Promise<boolean> {
  for (const part of [...parts]) {
    await part.job.reload()
    if (part.job.state !== 'running' && part !== parts[0]) parts.splice(parts.indexOf(part), 1)
  }
  return parts[0]!.job.state === 'running'
}

async function endOthers(context: Context, parts: Part[], writing: Promise<unknown>): Promise<void> {
  for (const part of parts.slice(1).filter(({ done, keys }) => done >= keys.length)) {
    await writing
    await context.db.write((tx) => part.job.update({ state: 'done', leaseOwner: null, leaseUntil: null, updatedAt: context.clock.now() }, { transaction: tx }))
    await judgeNext(context, part.region)
    context.news.tell({ topic: 'jobs', id: part.job.id })
    parts.splice(parts.indexOf(part), 1)
  }
}

async function judgeNext(context: Context, region: RegionRecord): Promise<void> {
  await context.db.write(async (tx) => {
    await ensureFirstRule(context, tx, region)
    await queueJudging(context, tx, { regionId: region.id })
  })
  context.news.tell({ topic: 'regions', id: region.id })
}

function told(context: Context, parts: readonly Part[]): void {
  context.news.tell(...parts.flatMap(({ region, job }) => [{ topic: 'regions' as const, id: region.id }, { topic: 'jobs' as const, id: job.id }]))
}

/** Null when the outline is no longer the one to read for. */
async function partOf(context: Context, job: JobRecord): Promise<Part | null> {
  const geometry = await context.models.geometries.findByPk(Number(job.payload['geometryId']))
  const region = geometry && (await context.models.regions.findByPk(geometry.regionId))
  if (!geometry || !region || region.geometryId !== geometry.id || region.retiredAt !== null) return null
  const keys = await viewsToRead(context, geometry.id, geometry)
  // By the day, not by the number: layers may have gone or come since.
  const readTo = job.payload['readTo']
  const left = readTo === undefined ? 0 : keys.findIndex(({ day }) => day < Number(readTo))
  const done = left < 0 ? keys.length : left
  return { job, region, keys, done, next: done }
}

async function viewsToRead(context: Context, geometryId: number, box: { west: number; south: number; east: number; north: number; centreLongitude: number }): Promise<ViewKey[]> {
  const keys = new Map<string, ViewKey>()
  for (const layer of await trustedLayerTimes(context)) {
    if (!boxesMeet(box, layer)) continue
    const day = viewDay(layer, box.centreLongitude)
    keys.set(`${layer.feedId}:${day}`, { geometryId, feedId: layer.feedId, day })
  }
  return [...keys.values()].sort((a, b) => b.day - a.day || a.feedId - b.feedId)
}
