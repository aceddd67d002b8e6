import { readFile } from 'node:fs/promises'
import { Writable } from 'node:stream'
import { pino } from 'pino'
import request from 'supertest'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import { createApp } from '../../../server/app'
import type { Person } from '../../../server/accounts/person'
import { regionSeries } from '../../../server/desk/region-series'
import { voidLeases } from '../../../server/jobs/void-leases'
import { runNextJob } from '../../../server/jobs/run-job'
import type { FeedRecord } from '../../../server/models/feed'
import { createGate } from '../../../server/pull/gate'
import { keepPull, pullNow } from '../../../server/pull/keep-pull'
import { networkOf, useNetwork } from '../../../server/pull/network'
import { presentPull } from '../../../server/pull/present-pull'
import { queueDuePulls } from '../../../server/pull/queue-pulls'
import { layerRows } from '../../../server/queries/layer-rows'
import { deleteFile } from '../../../server/pipeline/delete-file'
import { changeFeed } from '../../../server/pipeline/feeds'
import { presentFile } from '../../../server/pipeline/present-file'
import { pullSettings } from '../../../shared/schemas/pulls'
import { aUser, bearer } from '../../support/people'
import { startProvider, type Provider } from '../../support/provider'
import { aFeed, aPerson, aRegion, cleanSea, runJobs, seaFile } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let provider: Provider
let person: Person
let feed: FeedRecord
const minute = 60_000
const secrets = ['open-sesame', 'b64-and-plain', Buffer.from('ana:open-sesame').toString('base64')]

beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  context.env.pullAllowPrivate = true
  provider = await startProvider()
  person = await aPerson(context)
  feed = await aFeed(context, person)
})
afterEach(async () => {
  await provider.close()
  await context.close()
})
afterAll(cleanSea)

async function letPull(wish: Record<string, unknown> = {}): Promise<void> {
  await keepPull(context, person, feed.id, pullSettings.parse({ address: `${provider.url}/chl-{yyyy}{MM}{dd}.nc`, lookBackDays: 2, ...wish }))
}

/** What the ticker does: what is due is queued, then fetched. */
async function pullWhatIsDue(): Promise<void> {
  await queueDuePulls(context)
  while (await runNextJob(context, 'pull'));
}

async function pull() {
  await pullNow(context, person, feed.id)
  while (await runNextJob(context, 'pull'));
  return state()
}

const state = () => presentPull(context, feed.id)
const lastRun = async () => (await state()).lastRun
const dayFile = async (day: string, value: number, processingVersion = 'R1') => readFile(await seaFile([{ at: `2026-06-${day}T12:00:00Z`, value }], { processingVersion }))
const pathOf = (day: string) => `/chl-202606${day}.nc`
const names = async () => (await context.models.files.findAll({ order: [['id', 'ASC']] })).map((file) => file.name)

describe('a feed that fetches for itself', () => {
  it('takes what is there down the road, and asks for the rest again until it falls out of the days looked back', async () => {
    const region = await aRegion(context, person)
    await letPull()
    provider.put(pathOf('09'), await dayFile('09', 3))
    expect((await pull()).lastRun).toMatchObject({ outcome: 'ok', fetched: 1, notThere: 2, unchanged: 0, failed: 0, sentence: null })
    provider.put(pathOf('11'), await dayFile('11', 2))
    expect((await pull()).lastRun).toMatchObject({ outcome: 'ok', fetched: 1, notThere: 1, unchanged: 1 })
    await runJobs(context)
    const files = await context.models.files.findAll()
    expect(files.map(({ name, status, origin, feedId }) => ({ name, status, origin, feedId }))).toEqual(
      ['09', '11'].map((day) => ({ name: `chl-202606${day}.nc`, status: 'processed', origin: 'pull', feedId: feed.id })),
    )
    expect((await regionSeries(context, region.id, { feedId: feed.id })).columns).toMatchObject({ day: ['2026-06-09', '2026-06-11'], median: [3, 2] })
    context.clock.pass(24 * 60 * minute)
    provider.calls.length = 0
    await pull()
    expect(provider.pathsAsked()).toEqual(['12', '11', '10'].map(pathOf))
  })

  it('takes new bytes under an old name as a new file, and the same bytes again as nothing', async () => {
    const region = await aRegion(context, person)
    await letPull()
    const first = await dayFile('10', 5, 'R1')
    provider.put(pathOf('10'), first)
    await pull()
    // Without an ETag the server sends it again, and only its checksum tells that it is the same.
    provider.put(pathOf('10'), (response) => void response.writeHead(200).end(first))
    expect((await pull()).lastRun).toMatchObject({ outcome: 'ok', fetched: 0, unchanged: 1, notThere: 2 })
    expect(await names()).toEqual(['chl-20260610.nc'])
    provider.put(pathOf('10'), await dayFile('10', 1, 'R2'))
    expect((await pull()).lastRun).toMatchObject({ fetched: 1 })
    await runJobs(context)
    expect((await regionSeries(context, region.id, { feedId: feed.id })).columns.median).toEqual([1])
    expect(await names()).toEqual(['chl-20260610.nc', 'chl-20260610.nc'])
  })

  it('lets new bytes under a dated name replace the old file wholly, whatever they say of themselves, and remembers it', async () => {
    const region = await aRegion(context, person)
    await letPull()
    provider.put(pathOf('10'), await dayFile('10', 100))
    await pull()
    await runJobs(context)
    // The correction blanks most of the day, and holds another day no more.
    provider.put(pathOf('10'), await readFile(await seaFile([{ at: '2026-06-10T12:00:00Z', value: (row) => (row < 4 ? 1 : NaN) }])))
    await pull()
    await runJobs(context)
    const { columns } = await regionSeries(context, region.id, { feedId: feed.id })
    expect(columns).toMatchObject({ day: ['2026-06-10'], max: [1], valid: [8] })
    const [older, newer] = await context.models.files.findAll({ order: [['id', 'ASC']] })
    const shown = await presentFile(context, older!)
    expect(shown.layers).toMatchObject([{ feedId: feed.id, replaced: true }])
    expect(shown.replacedBy).toEqual([{ id: newer!.id, name: 'chl-20260610.nc', at: expect.stringMatching(/^2026-06-11T15/), layers: 1 }])
    expect((await layerRows(context, { feedId: feed.id }, null, 10)).map((row) => [row.fileId, row.replacedBy])).toEqual([[newer!.id, null], [older!.id, newer!.id]])
    expect((await presentFile(context, newer!)).replaces).toEqual({ id: older!.id, name: 'chl-20260610.nc' })
    // Without the correction the older file is what there is.
    await deleteFile(context, person, newer!.id)
    await runJobs(context)
    expect((await regionSeries(context, region.id, { feedId: feed.id })).columns).toMatchObject({ max: [100], valid: [16] })
    expect((await presentFile(context, older!)).replacedBy).toEqual([])
  })

  it('keeps the old file where its correction cannot be read, and takes old bytes back where an address returns to them', async () => {
    const region = await aRegion(context, person)
    const median = async () => (await regionSeries(context, region.id, { feedId: feed.id })).columns.median
    await letPull()
    const [first, second] = [await dayFile('10', 5), await dayFile('10', 2)]
    for (const [bytes, wanted] of [[first, 5], [second, 2], [first, 5], [second.subarray(0, 3000), 5], [second, 2]] as const) {
      provider.put(pathOf('10'), bytes)
      await pull()
      await runJobs(context)
      expect(await median()).toEqual([wanted])
    }
    expect(await context.models.layers.count()).toBe(2)
  })

  it('replaces nothing but the instants both hold where the name does not say its day', async () => {
    const region = await aRegion(context, person)
    await letPull({ address: `${provider.url}/latest.nc` })
    const days = (...values: [string, number][]) => seaFile(values.map(([day, value]) => ({ at: `2026-06-${day}T12:00:00Z`, value })))
    provider.put('/latest.nc', await readFile(await days(['08', 8], ['09', 9])))
    await pull()
    await runJobs(context)
    provider.put('/latest.nc', await readFile(await days(['09', 3], ['10', 4])))
    await pull()
    await runJobs(context)
    expect((await regionSeries(context, region.id, { feedId: feed.id })).columns).toMatchObject({ day: ['2026-06-08', '2026-06-09', '2026-06-10'], median: [8, 3, 4] })
  })

  it('takes the time its server says for the time a file was made', async () => {
    await letPull()
    const bytes = await dayFile('10', 5)
    provider.put(pathOf('10'), (response) => void response.writeHead(200, { 'last-modified': 'Thu, 11 Jun 2026 03:04:05 GMT' }).end(bytes))
    await pull()
    await runJobs(context)
    const layer = await context.models.layers.findOne({ rejectOnEmpty: true })
    expect(new Date(layer.producedAt!).toISOString()).toBe('2026-06-11T03:04:05.000Z')
  })

  it('notes once a day that an address is still asked for, so that it is not forgotten', async () => {
    await letPull({ address: `${provider.url}/latest.nc` })
    provider.put('/latest.nc', await dayFile('10', 5))
    await pull()
    const askedAt = async () => (await context.db.first<{ askedAt: number }>('SELECT asked_at AS askedAt FROM pulled_addresses'))!.askedAt
    const first = await askedAt()
    context.clock.pass(60 * minute)
    await pull()
    expect(await askedAt()).toBe(first)
    context.clock.pass(24 * 60 * minute)
    expect((await pull()).lastRun).toMatchObject({ unchanged: 1, fetched: 0 })
    expect(await askedAt()).toBeGreaterThan(first + 24 * 60 * minute)
  })

  it('dates a file without a time by its address', async () => {
    await letPull({ address: `${provider.url}/{yyyy}/{DDD}/chl.tif` })
    provider.put('/2026/161/chl.tif', Buffer.from('a raster without a date'))
    await pull()
    const file = await context.models.files.findOne({ rejectOnEmpty: true })
    expect([file.name, new Date(file.observedAt!).toISOString()]).toEqual(['chl.tif', '2026-06-10T00:00:00.000Z'])
  })

  it('comes when it is due, once for all the times it missed, and says when it comes next', async () => {
    await letPull({ everyHours: 6, atMinute: 20 })
    expect((await state()).nextDueAt).toBe('2026-06-11T18:20:00.000Z')
    await pullWhatIsDue()
    expect(provider.calls).toEqual([])
    context.clock.moveTo(Date.parse('2026-06-12T07:00:00Z'))
    await pullWhatIsDue()
    await pullWhatIsDue()
    expect((await state()).runs).toHaveLength(1)
    expect((await state()).nextDueAt).toBe('2026-06-12T12:20:00.000Z')
  })

  it('asks again sooner after a passing fault, and shows the third failure in a row', async () => {
    await letPull({ everyHours: 24, lookBackDays: 0 })
    provider.put(pathOf('11'), (response) => response.writeHead(500).end())
    expect(await pull()).toMatchObject({ failuresInRow: 1, failing: false, lastRun: { outcome: 'failed', failed: 1, sentence: 'chl-20260611.nc: 127.0.0.1:' + provider.port + ' answers with status 500.' } })
    for (const wait of [5, 10]) {
      context.clock.pass(wait * minute - 5_000)
      await pullWhatIsDue()
      context.clock.pass(10_000)
      await pullWhatIsDue()
    }
    expect(await state()).toMatchObject({ failuresInRow: 3, failing: true })
    expect((await state()).runs).toHaveLength(3)
    provider.put(pathOf('11'), await dayFile('11', 2))
    expect(await pull()).toMatchObject({ failuresInRow: 0, failing: false, lastRun: { fetched: 1 } })
  })

  it('leaves a server alone for as long as it asks, every feed of it', async () => {
    await letPull({ lookBackDays: 1 })
    provider.put(pathOf('11'), (response) => response.writeHead(429, { 'retry-after': '600' }).end())
    const refused = await pull()
    expect(refused.lastRun).toMatchObject({ outcome: 'failed', sentence: expect.stringContaining('asked too often') })
    expect(Date.parse(refused.nextDueAt!) - Date.parse(refused.lastRun!.startedAt)).toBeGreaterThanOrEqual(600_000)
    expect(provider.pathsAsked()).toEqual([pathOf('11')])
    const other = await aFeed(context, person, { name: 'Other', fileNamePattern: 'other-*' })
    await keepPull(context, person, other.id, pullSettings.parse({ address: `${provider.url}/other.nc` }))
    await pullNow(context, person, other.id)
    expect((await pull()).lastRun).toMatchObject({ outcome: 'postponed', sentence: expect.stringMatching(/asked to be left alone until 2026-06-11 15:\d\d UTC/) })
    expect(await presentPull(context, other.id)).toMatchObject({ failuresInRow: 0, lastRun: { outcome: 'postponed' } })
    expect(provider.calls).toHaveLength(1)
    provider.put(pathOf('11'), await dayFile('11', 2))
    context.clock.pass(605_000)
    await pullWhatIsDue()
    expect(provider.calls.length).toBeGreaterThan(1)
    expect(await lastRun()).toMatchObject({ outcome: 'ok', fetched: 1 })
  })

  it('goes on with the other days when one file is too large', async () => {
    await letPull()
    const good = await dayFile('10', 2)
    context.env.maxUploadBytes = good.length
    provider.put(pathOf('11'), Buffer.alloc(good.length + 1))
    provider.put(pathOf('10'), good)
    expect((await pull()).lastRun).toMatchObject({ outcome: 'failed', fetched: 1, failed: 1, notThere: 1, sentence: expect.stringMatching(/^chl-20260611\.nc: .* larger than/) })
  })

  it('does not hold up the road while a server is slow', async () => {
    let release: () => void = () => undefined
    const asked = new Promise<void>((resolve) => {
      provider.put(pathOf('11'), (response) => {
        release = () => void response.writeHead(404).end()
        resolve()
      })
    })
    await letPull({ lookBackDays: 0 })
    await pullNow(context, person, feed.id)
    const pulling = runNextJob(context, 'pull')
    await asked
    await pullNow(context, person, feed.id)
    // The same feed is not fetched for twice at a time, and the road does not know of it.
    expect(await runNextJob(context, 'pull')).toBe(false)
    expect(await runNextJob(context, 'road')).toBe(false)
    expect((await state()).running).toBe(true)
    release()
    await pulling
  })

  it('loses nothing when it is stopped on the way: the job is done again', async () => {
    await letPull({ lookBackDays: 0 })
    const file = await dayFile('11', 2)
    provider.put(pathOf('11'), () => networkOf(context).stopping.abort())
    await pullNow(context, person, feed.id)
    await runNextJob(context, 'pull')
    expect((await state()).runs).toEqual([])
    useNetwork(context, {})
    provider.put(pathOf('11'), file)
    expect(await voidLeases(context)).toBe(1)
    await runNextJob(context, 'pull')
    expect(await lastRun()).toMatchObject({ outcome: 'ok', fetched: 1 })
  })

  it('fetches nothing for a retired feed', async () => {
    await letPull()
    await changeFeed(context, person, feed.id, { version: feed.version, retired: true })
    context.clock.pass(24 * 60 * minute)
    await pullWhatIsDue()
    expect(provider.calls).toEqual([])
    await expect(pullNow(context, person, feed.id)).rejects.toMatchObject({ code: 'conflict' })
  })
})

describe('what may be fetched', () => {
  it('is neither http nor a private address unless the setting says so', async () => {
    context.env.pullAllowPrivate = false
    useNetwork(context, {})
    await expect(letPull()).rejects.toMatchObject({ code: 'not-valid', details: { fields: { address: expect.stringContaining('Only https') } } })
    await expect(letPull({ address: 'https://192.168.1.10/chl.nc' })).rejects.toMatchObject({ details: { fields: { address: expect.stringContaining('private') } } })
    useNetwork(context, { gate: createGate({ allowPrivate: false, resolve: async () => [{ address: '10.0.0.7', family: 4 }] }) })
    await letPull({ address: 'https://provider.example/chl.nc' })
    expect((await pull()).lastRun).toMatchObject({ outcome: 'failed', sentence: expect.stringContaining('provider.example stands for 10.0.0.7') })
  })
})

describe('credentials', () => {
  const basic = { kind: 'basic', user: 'ana', password: 'open-sesame' }

  it('reach the provider, and never come back: not in replies, not in the table, the audit or the logs', async () => {
    const lines: string[] = []
    const sink = new Writable({ write: (chunk, _encoding, done) => (lines.push(String(chunk)), done()) })
    context.log = pino({ level: 'trace' }, sink)
    const app = createApp(context)
    const admin = await bearer(context, await aUser(context, { roles: ['admin'] }))
    const path = `/api/feeds/${feed.id}/pull`
    const put = (body: object) => request(app).put(path).set('Authorization', admin).send(body)
    const address = `${provider.url}/chl-{yyyy}{MM}{dd}.nc`
    const kept = await put({ address, lookBackDays: 0, credentials: basic }).expect(200)
    expect(kept.body.settings.credentials).toBe('basic')
    const now = await request(app).post(`${path}/now`).set('Authorization', admin).expect(202)
    expect(now.body.running).toBe(true)
    provider.put(pathOf('11'), (response) => response.writeHead(500).end())
    while (await runNextJob(context, 'pull'));
    const bearerKept = await put({ address, lookBackDays: 0, version: 1, credentials: { kind: 'bearer', token: 'b64-and-plain' } }).expect(200)
    await request(app).post(`${path}/now`).set('Authorization', admin).expect(202)
    while (await runNextJob(context, 'pull'));
    expect(provider.calls.map((call) => call.headers.authorization)).toEqual([`Basic ${secrets[2]}`, 'Bearer b64-and-plain'])
    const got = await request(app).get(path).set('Authorization', admin).expect(200)
    const refused = await put({ address, version: 2, credentials: { kind: 'bearer', token: 'b64-and-plain\u0001' } }).expect(422)
    const tables = await Promise.all(['feed_pulls', 'pull_runs', 'audit', 'jobs', 'pulled_addresses'].map((table) => context.db.all(`SELECT * FROM ${table}`)))
    const everything = JSON.stringify([kept.body, now.body, bearerKept.body, got.body, refused.body, tables, lines])
    expect(everything).toContain('feed:pull')
    expect(lines.length).toBeGreaterThan(0)
    for (const secret of secrets) expect(everything).not.toContain(secret)
  })

  it('stay when they are left out, go when they are taken away, and never move to another server', async () => {
    await letPull({ credentials: basic })
    await letPull({ version: 1, lookBackDays: 0 })
    await pull()
    expect(provider.calls.at(-1)!.headers.authorization).toBe(`Basic ${secrets[2]}`)
    await expect(letPull({ version: 2, address: 'http://127.0.0.1:9/chl.nc' })).rejects.toMatchObject({ code: 'not-valid', details: { fields: { credentials: expect.stringContaining('another server') } } })
    await letPull({ version: 2, lookBackDays: 0, credentials: null })
    await pull()
    expect(provider.calls.at(-1)!.headers.authorization).toBeUndefined()
    await expect(letPull({ version: 2 })).rejects.toMatchObject({ code: 'stale-version' })
  })

  it('that can no longer be read are asked for in words, and nothing is asked without them', async () => {
    await letPull({ credentials: basic })
    context.env.sessionSecret = 'another secret 0123456789 abcdefghij'
    expect((await pull()).lastRun).toMatchObject({ outcome: 'failed', sentence: expect.stringContaining('SESSION_SECRET has changed') })
    expect(provider.calls).toEqual([])
  })
})
