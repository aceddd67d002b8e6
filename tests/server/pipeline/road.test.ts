import { readFile, rm, writeFile } from 'node:fs/promises'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import { regionSeries } from '../../../server/desk/region-series'
import { decodedFolder } from '../../../server/pipeline/decoded-layers'
import { deleteFile } from '../../../server/pipeline/delete-file'
import { createFeed } from '../../../server/pipeline/feeds'
import { markSuspect } from '../../../server/pipeline/mark-suspect'
import { storedPath } from '../../../server/pipeline/stored-files'
import { forgetSource } from '../../../server/workers/open-sources'
import { feedFields, newFeed } from '../../../shared/schemas/feeds'
import { aFeed, aPerson, aRegion, cleanSea, runJobs, seaFile, send, type SeaStep } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person

beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

const day = (date: string, value: Parameters<typeof seaFile>[0][number]['value'], clock = '12:00') => ({ at: `${date}T${clock}:00Z`, value })

async function medians(regionId: number, feedId: number) {
  const { columns } = await regionSeries(context, regionId, { feedId, columns: 'day,median,coverage' })
  return columns
}

describe('the road of a layer', () => {
  it('gives every region its figures, and then says processed', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const file = await send(context, await seaFile([day('2026-06-10', 2), day('2026-06-11', (row, column) => (column < 4 ? NaN : row))]))
    expect(file.status).toBe('received')
    await runJobs(context)
    await file.reload()
    expect(file.status).toBe('processed')
    const { columns } = await regionSeries(context, region.id, { feedId: feed.id })
    expect(columns.day).toEqual(['2026-06-10', '2026-06-11'])
    expect(columns.cells).toEqual([16, 16])
    expect(columns.valid).toEqual([16, 8])
    expect(columns.median![0]).toBe(2)
    // Rows 2 to 5 of columns 4 and 5: northern cells weigh a little less, so the middle lies at row 3.
    expect(columns.median![1]).toBe(3)
    expect(columns.max).toEqual([2, 5])
    expect(columns.maxLat![1]).toBeCloseTo(50.55, 9)
    expect(columns.coverage![0]).toBeCloseTo(1, 12)
    expect(columns.coverage![1]).toBeCloseTo(0.5, 12)
  })

  it('lets a file that fits no feed wait with a proposal that makes the feed as it stands', async () => {
    const file = await send(context, await seaFile([day('2026-06-10', 2)]))
    await runJobs(context)
    await file.reload()
    expect(file.status).toBe('waiting')
    expect(file.waitingFor).toMatch(/fits no feed yet/)
    expect(file.proposal).toMatchObject({ quantity: 'chlorophyll', variable: 'chlor_a', unit: 'mg m-3', scale: 'log10', processingVersion: 'R1' })
    await createFeed(context, person, newFeed.parse({ ...file.proposal, fileId: file.id }))
    await file.reload()
    expect(file.status).toBe('received')
    await runJobs(context)
    await file.reload()
    expect(file.status).toBe('processed')
  })

  it('refuses what it cannot read with a code and a sentence, and goes on with the next file', async () => {
    await aFeed(context, person)
    const good = await seaFile([day('2026-06-10', 2)])
    const bad = good.replace('sea.nc', 'notes.nc')
    await writeFile(bad, 'dear all, the data are late')
    const refused = await send(context, bad)
    const processed = await send(context, good)
    await runJobs(context)
    await refused.reload()
    await processed.reload()
    expect(refused.status).toBe('refused')
    expect(refused.refusal).toMatchObject({ code: 'unknown-format', message: expect.stringContaining('text') })
    expect(processed.status).toBe('processed')
  })

  it('takes the same bytes once', async () => {
    const feed = await aFeed(context, person)
    const path = await seaFile([day('2026-06-10', 2)])
    const first = await send(context, path)
    await runJobs(context)
    const again = await send(context, path, { name: 'renamed.nc' })
    await runJobs(context)
    expect(again.id).toBe(first.id)
    expect(await context.models.layers.count({ where: { feedId: feed.id } })).toBe(1)
  })

  it('queues a refused or waiting file again when it is sent with more said of it', async () => {
    const path = await seaFile([day('2026-06-10', 2)])
    const waiting = await send(context, path)
    await runJobs(context)
    const feed = await context.models.feeds.create(
      { ...feedFields.parse({ name: 'Other', quantity: 'chlorophyll', variable: 'chl', unit: 'mg m-3', scale: 'log10' }), retired: false, createdAt: 0 },
    )
    const again = await send(context, path, { feedId: feed.id })
    expect(again.id).toBe(waiting.id)
    expect(again.status).toBe('received')
    await runJobs(context)
    await again.reload()
    // Named for a feed, the file's only chlorophyll serves it, though its name is another.
    expect(again.status).toBe('processed')
  })

  it('makes one view of two layers of one local solar day, cell by cell', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await seaFile([day('2026-06-10', (_, column) => (column < 4 ? 1 : NaN), '11:00')]))
    await send(context, await seaFile([day('2026-06-10', (_, column) => (column < 4 ? NaN : 4), '12:30')]))
    await runJobs(context)
    const columns = await medians(region.id, feed.id)
    expect(columns.day).toEqual(['2026-06-10'])
    expect(columns.coverage![0]).toBeCloseTo(1, 12)
    expect(await context.models.layers.count()).toBe(2)
  })

  it('comes to the same figures in whatever order layers arrive, and when everything is run twice', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const [early, late] = [await seaFile([day('2026-06-10', 1, '11:00')]), await seaFile([day('2026-06-10', 4, '12:30')])]
    for (const path of [late, early]) await send(context, path)
    await runJobs(context)
    const before = await medians(region.id, feed.id)
    // The mean of log10 of 1 and 4.
    expect(before.median![0]).toBeCloseTo(2, 6)
    for (const file of await context.models.files.findAll()) {
      await context.db.write(async (tx) => {
        await context.db.run(`UPDATE jobs SET state = 'waiting' WHERE kind = 'process-file' AND job_key = $key`, { key: String(file.id) }, tx)
      })
    }
    await runJobs(context)
    expect(await medians(region.id, feed.id)).toEqual(before)
    expect(await context.models.layers.count()).toBe(2)
  })

  it('lets a later processing version win the cell', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await seaFile([day('2026-06-10', 5)], { processingVersion: 'R10' }))
    await send(context, await seaFile([day('2026-06-10', 1)], { processingVersion: 'R9' }))
    await runJobs(context)
    expect((await medians(region.id, feed.id)).median).toEqual([5])
  })

  it('lets the file made last win where two show the same instant, in whatever order they arrive', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const made = (value: SeaStep['value'], madeAt: string) => seaFile([day('2026-06-10', value)], { madeAt })
    const paths = [await made(5, '2026-06-10T20:00:00Z'), await made((row) => (row < 4 ? 3 : NaN), '2026-06-11T09:00:00Z'), await made(100, '2026-06-10T18:00:00Z')]
    for (const order of [[0, 1, 2], [2, 1, 0], [1, 2, 0]]) {
      for (const i of order) {
        await send(context, paths[i]!)
        await runJobs(context)
      }
      const { columns } = await regionSeries(context, region.id, { feedId: feed.id })
      // Where the last made sees nothing, the one before it serves.
      expect(columns).toMatchObject({ day: ['2026-06-10'], valid: [16], max: [5], p10: [3] })
      for (const file of await context.models.files.findAll()) await deleteFile(context, person, file.id)
      await runJobs(context)
      expect(await context.models.layers.count()).toBe(0)
    }
  })

  it('keeps a refused file as it came, until somebody deletes it', async () => {
    const bad = (await seaFile([day('2026-06-10', 2)])).replace('sea.nc', 'notes.nc')
    await writeFile(bad, 'dear all, the data are late')
    const file = await send(context, bad)
    await runJobs(context)
    const stored = storedPath(context.env, file.checksum)
    expect(await readFile(stored, 'utf8')).toBe('dear all, the data are late')
    await deleteFile(context, person, file.id)
    await expect(readFile(stored)).rejects.toThrow('ENOENT')
    expect(await context.models.files.count()).toBe(0)
  })

  it('takes out what a file gave before it turned out damaged, so that no other file is refused for it', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const path = await seaFile([day('2026-06-09', 3), day('2026-06-10', (row, column) => 1 + ((row * 7 + column * 3) % 10) / 10)])
    const bytes = await readFile(path)
    // The second step's chunk is the last zlib stream of the values.
    const starts = [...bytes.keys()].filter((at) => bytes[at] === 0x78 && bytes[at + 1] === 0x01)
    bytes.fill(0xa5, starts.at(-1)! + 4, starts.at(-1)! + 30)
    const hurt = path.replace('sea.nc', 'hurt.nc')
    await writeFile(hurt, bytes)
    const refused = await send(context, hurt)
    await runJobs(context)
    await refused.reload()
    expect(refused).toMatchObject({ status: 'refused', refusal: { code: 'damaged', message: 'The file is damaged: chlor_a cannot be read back whole.' } })
    expect(await context.models.layers.count()).toBe(0)
    const good = await send(context, await seaFile([day('2026-06-10', 2)]))
    await runJobs(context)
    await good.reload()
    expect(good.status).toBe('processed')
    expect(await medians(region.id, feed.id)).toMatchObject({ day: ['2026-06-10'], median: [2] })
  })

  it('refuses a stored file whose bytes went bad since, and not the one that shares its day', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const rotten = await send(context, await seaFile([day('2026-06-10', (row, column) => 1 + ((row * 7 + column * 3) % 10) / 10, '11:00')]))
    await runJobs(context)
    const stored = storedPath(context.env, rotten.checksum)
    await forgetSource(stored)
    await writeFile(stored, (await readFile(stored)).subarray(0, 2000))
    await rm(decodedFolder(context.env), { recursive: true })
    const good = await send(context, await seaFile([day('2026-06-10', 2, '12:30')]))
    await runJobs(context)
    await rotten.reload()
    expect(rotten.status).toBe('refused')
    context.clock.pass(5_000)
    await runJobs(context)
    await good.reload()
    expect(good.status).toBe('processed')
    expect(await medians(region.id, feed.id)).toMatchObject({ day: ['2026-06-10'], median: [2] })
  })

  it('refuses a file that no attempt could read, so that it waits for nothing', async () => {
    await aFeed(context, person)
    const { heavy } = context.workers
    const path = await seaFile([day('2026-06-10', 2)])
    const file = await send(context, path)
    context.workers.heavy = () => Promise.reject(new Error('no memory for it'))
    for (let attempt = 0; attempt < 5; attempt++) {
      await runJobs(context)
      context.clock.pass(200_000)
    }
    await file.reload()
    expect(file).toMatchObject({ status: 'refused', refusal: { code: 'reading-failed', details: { attempts: 5, reason: 'no memory for it' } } })
    context.workers.heavy = heavy
    await send(context, path)
    await runJobs(context)
    await file.reload()
    expect(file.status).toBe('processed')
  })

  it('reads the history of a newly drawn region', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile([day('2026-06-09', 3), day('2026-06-10', 2)]))
    await runJobs(context)
    const region = await aRegion(context, person)
    expect((await medians(region.id, feed.id)).day).toEqual([])
    await runJobs(context)
    expect((await medians(region.id, feed.id)).median).toEqual([3, 2])
  })

  it('leaves a suspect layer out, and takes it back in', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await seaFile([day('2026-06-09', 3), day('2026-06-10', 2)]))
    await runJobs(context)
    const layer = await context.models.layers.findOne({ where: { step: 1 }, rejectOnEmpty: true })
    await markSuspect(context, person, layer.id, { suspect: true, note: 'stripes' })
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual(['2026-06-09'])
    await markSuspect(context, person, layer.id, { suspect: false, note: '' })
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual(['2026-06-09', '2026-06-10'])
  })

  it('takes a deleted file out of every view it was part of', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const gone = await send(context, await seaFile([day('2026-06-10', 4, '11:00')]))
    await send(context, await seaFile([day('2026-06-10', 1, '12:30')]))
    await runJobs(context)
    await deleteFile(context, person, gone.id)
    await runJobs(context)
    expect((await medians(region.id, feed.id)).median).toEqual([1])
    expect(await context.models.layers.count()).toBe(1)
  })

  it('does not judge where nothing was seen: a region outside the grid has no view', async () => {
    const feed = await aFeed(context, person)
    const far = await aRegion(context, person, {
      geometry: { type: 'Polygon', coordinates: [[[-20, 50.2], [-19, 50.2], [-19, 50.6], [-20, 50.6], [-20, 50.2]]] },
    })
    await send(context, await seaFile([day('2026-06-10', 1)]))
    await runJobs(context)
    expect((await medians(far.id, feed.id)).day).toEqual([])
  })
})
