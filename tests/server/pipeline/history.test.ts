import { readdir, rm, utimes, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import { steerHistory } from '../../../server/desk/steer-history'
import { standings } from '../../../server/desk/standing'
import { steerJob } from '../../../server/jobs/steer-job'
import { runNextJob } from '../../../server/jobs/run-job'
import { voidLeases } from '../../../server/jobs/void-leases'
import { queueFeedBackfill } from '../../../server/pipeline/backfill-feed'
import { markSuspect } from '../../../server/pipeline/mark-suspect'
import { queueJudging } from '../../../server/pipeline/queue-judging'
import { decodedFolder } from '../../../server/pipeline/decoded-layers'
import { nextViews, type Share } from '../../../server/pipeline/backfill-order'
import { sweepDecoded } from '../../../server/pipeline/sweep-decoded'
import { freshFigures } from '../../../server/pipeline/summarise-views'
import type { Polygon } from 'geojson'
import { drawRegion } from '../../../server/desk/draw-region'
import { newRegion } from '../../../shared/schemas/regions'
import { aFeed, aPerson, aRegion, cleanSea, outline, runJobs, seaFile, send, type SeaStep } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

const cloudy = (seed: number) => (row: number, column: number) => ((row * 31 + column * 17 + seed * 7) % 10 < 4 ? NaN : 0.5 + ((row * 7 + column * 3 + seed) % 10) / 10)
const steps = (month: string, days: number): SeaStep[] =>
  Array.from({ length: days }, (_, i) => ({ at: `2026-${month}-${String(i + 1).padStart(2, '0')}T${i % 2 ? '11' : '13'}:00:00Z`, value: cloudy(i) }))

const shifted = (by: number): Polygon => ({ type: 'Polygon', coordinates: outline.coordinates.map((ring) => ring.map(([lon, lat]) => [lon! + by, lat! + by])) })
const draw = (name: string, by: number) => drawRegion(context, person, newRegion.parse({ name, geometry: shifted(by), timeZone: 'UTC' }))

/** Every figure that is kept, without ids that depend on the order of arrival. */
async function allSummaries() {
  return context.db.all<Record<string, unknown>>(
    `SELECT g.region_id, s.day, s.observed_at, s.cells, s.valid, s.whole_cells, s.whole_valid, s.coverage, s.valid_area_km2, s.mean, s.geometric_mean, s.median, s.p10, s.p25,
       s.p75, s.p90, s.p95, s.max, s.max_lat, s.max_lon, s.sd_log10, s.non_positive, hex(s.histogram) AS histogram
     FROM summaries s JOIN geometries g ON g.id = s.geometry_id ORDER BY 1, 2`,
  )
}

describe('history', () => {
  it('is the same whether layers came one by one, shuffled, or before the region was drawn', async () => {
    await aFeed(context, person)
    const ofMay = steps('05', 12)
    const inOrder = async (files: SeaStep[][]) => {
      for (const file of files) {
        await send(context, await seaFile(file))
        await runJobs(context)
      }
      const found = await allSummaries()
      await context.db.write(async (tx) => {
        await context.db.run('DELETE FROM summaries', {}, tx)
        await context.db.run('DELETE FROM files', {}, tx)
      })
      return found
    }
    await aRegion(context, person)
    const oneByOne = await inOrder(ofMay.map((step) => [step]))
    expect(oneByOne).toHaveLength(12)
    const order = [7, 2, 11, 0, 5, 9, 1, 10, 3, 8, 4, 6]
    expect(await inOrder(order.map((i) => [ofMay[i]!]))).toEqual(oneByOne)
    expect(await inOrder([ofMay])).toEqual(oneByOne)
    await context.db.write((tx) => context.db.run('UPDATE regions SET retired_at = 1', {}, tx))
    await inOrder([])
    await send(context, await seaFile(ofMay))
    await runJobs(context)
    await aRegion(context, person)
    await runJobs(context)
    const behind = await allSummaries()
    expect(behind.map(({ region_id: _, ...figures }) => figures)).toEqual(oneByOne.map(({ region_id: _, ...figures }) => figures))
  })

  it('of several regions is read in one pass, each layer once', async () => {
    await aFeed(context, person)
    await send(context, await seaFile(steps('05', 20)))
    await runJobs(context)
    const regions = [await draw('Here', 0), await draw('There', 0.1), await draw('Yonder', 0.2)]
    const tasks: number[] = []
    const { heavy } = context.workers
    context.workers.heavy = context.workers.second = (task, input, options) => {
      if (task === 'summariseViews') tasks.push((input as { layers: unknown[] }).layers.length)
      return heavy(task, input, options)
    }
    await runNextJob(context)
    // Half of the layers by each of two threads.
    expect(tasks).toEqual([10, 10])
    expect(await context.models.jobs.findAll({ where: { kind: 'backfill-region' }, order: [['id', 'ASC']] })).toMatchObject(regions.map(({ name }) => ({ subject: name, state: 'done', done: 20, total: 20 })))
    await runJobs(context)
    expect(await context.db.first('SELECT COUNT(DISTINCT geometry_id) AS regions, COUNT(*) AS views FROM summaries')).toEqual({ regions: 3, views: 60 })
  })

  it('goes on for the others when one region is paused, and for that one when it is taken up again', async () => {
    await aFeed(context, person)
    await send(context, await seaFile(steps('05', 6)))
    await runJobs(context)
    await draw('Here', 0)
    const paused = await draw('There', 0.1)
    const job = await context.models.jobs.findOne({ where: { kind: 'backfill-region', subject: paused.name }, rejectOnEmpty: true })
    await steerJob(context, person, job.id, 'pause')
    await runJobs(context)
    expect(await allSummaries()).toHaveLength(6)
    await steerJob(context, person, job.id, 'retry')
    await runJobs(context)
    expect(await allSummaries()).toHaveLength(12)
  })

  it('is steered from its region: paused, gone on with, stopped, and the region says so', async () => {
    await aFeed(context, person)
    await send(context, await seaFile(steps('05', 6)))
    await runJobs(context)
    const { id } = await draw('Here', 0)
    const said = async () => {
      const { state, because, progress } = (await standings(context, id)).get(id)!
      return { state, because, progress: progress?.state ?? null }
    }
    await steerHistory(context, person, id, 'pause')
    await runJobs(context)
    expect(await said()).toEqual({ state: 'not ready', because: 'The reading of its history is paused.', progress: 'paused' })
    await steerHistory(context, person, id, 'stop')
    expect(await said()).toMatchObject({ because: 'The reading of its history was stopped before its end.', progress: 'cancelled' })
    await expect(steerHistory(context, person, id, 'pause')).rejects.toMatchObject({ code: 'conflict' })
    await steerHistory(context, person, id, 'go-on')
    await runJobs(context)
    expect(await said()).toMatchObject({ progress: null })
    expect(await allSummaries()).toHaveLength(6)
    await expect(steerHistory(context, person, id, 'pause')).rejects.toMatchObject({ code: 'conflict', message: 'All of its history has been read.' })
  })

  it('that was paused goes on by the day, whatever became of the layers it had read', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile([...steps('01', 31), ...steps('03', 31), ...steps('05', 31)]))
    await send(context, await seaFile([...steps('02', 28), ...steps('04', 30)]))
    await runJobs(context)
    const { id } = await draw('Here', 0)
    const { heavy } = context.workers
    context.workers.heavy = async (task, input, options) => {
      if (task === 'summariseViews') await steerHistory(context, person, id, 'pause').catch(() => undefined)
      return heavy(task, input, options)
    }
    await runNextJob(context)
    context.workers.heavy = heavy
    const job = await context.models.jobs.findOne({ where: { kind: 'backfill-region' }, rejectOnEmpty: true })
    expect(job).toMatchObject({ state: 'paused', done: 128 })
    const newest = await context.db.all<{ id: number }>('SELECT id FROM layers ORDER BY observed_at DESC LIMIT 3')
    for (const layer of newest) await markSuspect(context, person, layer.id, { suspect: true, note: 'stripes' })
    await steerHistory(context, person, id, 'go-on')
    await runJobs(context)
    const read = await context.db.first<{ n: number }>('SELECT COUNT(*) AS n FROM summaries WHERE feed_id = $feedId', { feedId: feed.id })
    expect(read).toEqual({ n: 148 })
  })

  it('of a feed that is being made anew is not judged, and its regions say so', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await seaFile(steps('05', 6)))
    await runJobs(context)
    const said = async () => (await standings(context, region.id)).get(region.id)!.because
    const before = await said()
    await context.db.write((tx) => queueFeedBackfill(context, tx, feed))
    await context.db.write((tx) => queueJudging(context, tx, { feedId: feed.id }))
    await runNextJob(context)
    expect(await said()).toBe(`The history of ${feed.name} is being made anew.`)
    const judgedAt = () => context.db.first('SELECT judged_at AS at FROM standings')
    const judged = await judgedAt()
    context.clock.pass(60_000)
    await runNextJob(context)
    expect(await judgedAt()).toEqual(judged)
    await runJobs(context)
    expect(await judgedAt()).not.toEqual(judged)
    expect(await said()).toBe(before)
  })

  it('goes on from its last mark after the process was killed in the middle', async () => {
    await aFeed(context, person)
    await send(context, await seaFile([...steps('01', 31), ...steps('03', 31), ...steps('05', 31)]))
    await send(context, await seaFile([...steps('02', 28), ...steps('04', 30)]))
    await runJobs(context)
    await draw('Here', 0)
    const { heavy } = context.workers
    let batches = 0
    context.workers.heavy = async (task, input, options) => {
      if (task === 'summariseViews' && ++batches === 2) await new Promise(() => undefined)
      return heavy(task, input, options)
    }
    void runNextJob(context)
    const job = () => context.models.jobs.findOne({ where: { kind: 'backfill-region' }, rejectOnEmpty: true })
    await expect.poll(async () => (await job()).done, { timeout: 20_000 }).toBe(128)
    context.workers.heavy = heavy
    await voidLeases(context)
    await runJobs(context)
    expect(await job()).toMatchObject({ state: 'done', done: 151, total: 151 })
    expect(await allSummaries()).toHaveLength(151)
  })
})

describe('decoded tiles', () => {
  it('give the figures of the original, and are made anew when they are gone or damaged', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await seaFile(steps('05', 3)))
    await runJobs(context)
    const first = await allSummaries()
    const folder = decodedFolder(context.env)
    const packs = (await readdir(folder, { recursive: true, withFileTypes: true })).filter((entry) => entry.isFile()).map((entry) => join(entry.parentPath, entry.name))
    expect(packs).toHaveLength(3)
    await writeFile(packs[0]!, 'no pack')
    await rm(packs[1]!)
    await context.db.write(async (tx) => {
      for (const table of ['summaries', 'view_layers']) await context.db.run(`DELETE FROM ${table}`, {}, tx)
    })
    const geometry = await context.models.geometries.findOne({ where: { regionId: region.id }, rejectOnEmpty: true })
    await drawAgain(geometry.id, region.id)
    expect(await allSummaries()).toEqual(first)
    const fresh = await freshFigures(context, { geometryId: geometry.id, feedId: feed.id, day: Number(first[0]!['day']) })
    expect(fresh).toMatchObject({ median: first[0]!['median'], mean: first[0]!['mean'] })
  })

  it('that no layer asks for any more are swept, the others stay', async () => {
    await aFeed(context, person)
    await send(context, await seaFile(steps('05', 3)))
    await runJobs(context)
    const folder = decodedFolder(context.env)
    const packs = async () => (await readdir(folder, { recursive: true, withFileTypes: true })).filter((entry) => entry.isFile()).map((entry) => join(entry.parentPath, entry.name)).sort()
    const before = await packs()
    const old = new Date(Date.now() - 7_200_000)
    await writeFile(join(before[0]!, '..', 'of-an-earlier-version'), 'no longer')
    await writeFile(join(before[0]!, '..', 'just-written'), 'its layer comes soon')
    for (const path of await packs()) if (!path.endsWith('just-written')) await utimes(path, old, old)
    expect(await sweepDecoded(context)).toBe(1)
    expect(await packs()).toEqual([...before, join(before[0]!, '..', 'just-written')].sort())
    await context.db.write((tx) => context.db.run('DELETE FROM files', {}, tx))
    expect(await sweepDecoded(context)).toBe(3)
  })

  async function drawAgain(geometryId: number, regionId: number) {
    const { queueBackfill } = await import('../../../server/pipeline/backfill-region')
    await context.db.write((tx) => queueBackfill(context, tx, { id: regionId, name: 'again', geometryId }))
    await runJobs(context)
  }
})

describe('the order of history', () => {
  const share = (days: number[], next = 0): Share => ({ keys: days.map((day) => ({ geometryId: 1, feedId: 1, day })), next })

  it('is newest day first, whole days at a time, and who is behind catches up', () => {
    const [ahead, behind] = [share([9, 8, 7, 6, 5], 2), share([9, 8, 7, 6, 5])]
    const views = (most: number) => [...nextViews([ahead, behind], most)].map(([one, keys]) => [one === ahead ? 'ahead' : 'behind', keys.map(({ day }) => day)])
    expect(views(2)).toEqual([['behind', [9, 8]]])
    expect(views(4)).toEqual([['behind', [9, 8, 7, 6]], ['ahead', [7, 6]]])
    expect(views(99)).toEqual([['behind', [9, 8, 7, 6, 5]], ['ahead', [7, 6, 5]]])
  })
})
