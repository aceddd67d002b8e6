import { readFileSync } from 'node:fs'
import request from 'supertest'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import { changeRegion } from '../../../server/desk/draw-region'
import { standings } from '../../../server/desk/standing'
import type { Person } from '../../../server/accounts/person'
import type { FeedRecord } from '../../../server/models/feed'
import { regionChange } from '../../../shared/schemas/regions'
import { areaBetweenParallelsKm2 } from '../../../shared/science/wgs84'
import { aUser, bearer } from '../../support/people'
import { aFeed, aPerson, aRegion, cleanSea, outline, quietYears, runJobs, seaFile, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
let feed: FeedRecord

beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
  feed = await aFeed(context, person)
})
afterEach(() => context.close())
afterAll(cleanSea)

const api = async () => request.agent(context.app).set('Authorization', await bearer(context, await aUser(context, { roles: ['analyst'], name: 'Ana Lyst' })))
const box = (west: number, south: number, east: number, north: number) => ({
  type: 'Polygon' as const,
  coordinates: [[[west, south], [east, south], [east, north], [west, north], [west, south]]],
})

describe('an outline sent over HTTP', () => {
  it('is refused with its sentence and the place for the map', async () => {
    const bow = { type: 'Polygon', coordinates: [[[-12, 50], [-11, 51], [-11, 50], [-12, 51], [-12, 50]]] }
    const [sentence, place] = ['The outline crosses itself near 50.500 N, 11.500 W.', { longitude: -11.5, latitude: 50.5 }]
    const { body } = await (await api()).post('/api/regions').send({ name: 'Bow', geometry: bow }).expect(422)
    expect(body.error.details).toMatchObject({ fields: { geometry: sentence }, place })
    const measured = await (await api()).post('/api/regions/measure').send({ geometry: bow }).expect(200)
    expect(measured.body).toEqual({ outline: null, refusal: { sentence, place, reason: null }, feeds: [] })
  })

  it('of land alone is refused, and taken once it is said to be a lake', async () => {
    const land = { name: 'Lake', geometry: box(8, 48, 9, 49) }
    const { body } = await (await api()).post('/api/regions').send(land).expect(422)
    expect(body.error.details.reason).toBe('all-land')
    await (await api()).post('/api/regions').send({ ...land, inland: true }).expect(201)
  })

  it('comes back from regions.geojson cut at 180 degrees, as printed in RFC 7946, 3.1.9', async () => {
    await (await api()).post('/api/regions').send({ name: 'Line', geometry: { type: 'Polygon', coordinates: [[[170, 40], [-170, 40], [-170, 50], [170, 50], [170, 40]]] } }).expect(201)
    const { body } = await (await api()).get('/api/regions.geojson').expect(200)
    const parts = body.features[0].geometry.coordinates as number[][][][]
    // The RFC's own example, each ring from another corner: compared as sets of corners, both counter-clockwise.
    expect(body.features[0].geometry.type).toBe('MultiPolygon')
    expect(parts.map(([ring]) => new Set(ring!.map(String)))).toEqual([
      new Set(['180,40', '180,50', '170,50', '170,40']),
      new Set(['-170,40', '-170,50', '-180,50', '-180,40']),
    ])
    for (const [ring] of parts) {
      const twice = ring!.slice(1).reduce((sum, [x, y], i) => sum + ring![i]![0]! * y! - x! * ring![i]![1]!, 0)
      expect(twice).toBeGreaterThan(0)
    }
    const again = await (await api()).post('/api/regions').send({ name: 'Again', geometry: body.features[0].geometry }).expect(201)
    expect(again.body.areaKm2).toBeCloseTo(areaBetweenParallelsKm2(40, 50, 20), 5)
  })

  it('is exported as GeoJSON and KML, which are read in again as the same area', async () => {
    const region = await aRegion(context, person, { name: 'Tar & <Bay>' })
    const geojson = await (await api()).get(`/api/exports/regions/${region.id}/outline.geojson`).expect(200).expect('content-type', /geo\+json/).buffer(true).parse((res, done) => {
      let text = ''
      res.on('data', (chunk: Buffer) => (text += chunk.toString()))
      res.on('end', () => done(null, text))
    })
    const kml = await (await api()).get(`/api/exports/regions/${region.id}/outline.kml`).expect(200).buffer(true).parse((res, done) => {
      let text = ''
      res.on('data', (chunk: Buffer) => (text += chunk.toString()))
      res.on('end', () => done(null, text))
    })
    for (const text of [geojson.body, kml.body] as string[]) {
      const { body } = await (await api()).post('/api/regions/import').attach('file', Buffer.from(text), 'bay').expect(200)
      expect(body.items).toMatchObject([{ name: 'Tar & <Bay>', found: { geometry: outline, repairs: [] }, refusal: null, regionId: null }])
    }
  })
})

describe('importing', () => {
  const bays = readFileSync(new URL('../../reference/outlines/bays-3035.zip', import.meta.url))

  it('answers what was found without saving, and saves when asked to', async () => {
    const agent = await api()
    const { body } = await agent.post('/api/regions/import').attach('file', bays, 'bays.zip').expect(200)
    expect(body).toMatchObject({ format: 'shapefile', fileName: 'bays.zip', items: [{ name: 'Fjord of Ålesund', regionId: null }, { name: 'Two parts', regionId: null }] })
    expect(await context.models.regions.count()).toBe(0)
    const saved = await agent.post('/api/regions/import?save=true').attach('file', bays, 'bays.zip').expect(200)
    expect(saved.body.items.every((item: { regionId: number | null }) => item.regionId !== null)).toBe(true)
    expect(await context.models.regions.count()).toBe(2)
  })

  it('refuses feature by feature, and says of a file it cannot read why', async () => {
    const mixed = { type: 'FeatureCollection', features: [outline, { type: 'Point', coordinates: [1, 2] }].map((geometry, i) => ({ type: 'Feature', properties: { name: `n${i}` }, geometry })) }
    const agent = await api()
    const { body } = await agent.post('/api/regions/import?save=true').attach('file', Buffer.from(JSON.stringify(mixed)), 'a.json').expect(200)
    expect(body.items[1]).toMatchObject({ name: 'n1', found: null, regionId: null, refusal: { sentence: 'An outline is a Polygon or a MultiPolygon, not a Point: it encloses no water.' } })
    expect(await context.models.regions.count()).toBe(1)
    await agent.post('/api/regions/import').attach('file', Buffer.from('nothing'), 'a.txt').expect(422)
    await agent.post('/api/regions/import').attach('file', Buffer.alloc(10 * 1024 * 1024 + 1), 'a.json').expect(413)
    await agent.post('/api/regions/import').expect(400)
  })
})

describe('measuring while somebody draws', () => {
  it('counts whole water cells and the share near land, with the shore buffer taken off, and saves nothing', async () => {
    await send(context, await seaFile([{ at: '2026-06-10T12:00:00Z', value: 1 }]))
    await runJobs(context)
    const agent = await api()
    const { body } = await agent.post('/api/regions/measure').send({ geometry: outline }).expect(200)
    expect(body.feeds).toMatchObject([{ feedId: feed.id, exact: true, cells: 16, wholeCells: 16, nearLandShare: 0 }])
    expect(body.feeds[0].waterAreaKm2).toBeCloseTo(areaBetweenParallelsKm2(50.2, 50.6, 0.4), 6)
    const elsewhere = await agent.post('/api/regions/measure').send({ geometry: box(-40, 20, -39, 21) }).expect(200)
    expect(elsewhere.body.feeds).toMatchObject([{ cells: 0, wholeCells: 0 }])
    expect(await context.models.regions.count()).toBe(0)
  })
})

const days = (...steps: [string, number][]) => steps.map(([date, value]) => ({ at: `${date}T12:00:00Z`, value }))
const change = async (id: number, wish: Record<string, unknown>) => {
  const region = await context.models.regions.findByPk(id, { rejectOnEmpty: true })
  return changeRegion(context, person, id, regionChange.parse({ version: region.version, ...wish }))
}
const larger = box(-11.9, 50.1, -11.3, 50.7)

describe('editing an outline', () => {
  it('makes a version whose history is read, while the old one keeps its figures and can be looked at', async () => {
    const region = await aRegion(context, person)
    await send(context, await seaFile(days(['2026-06-09', 1], ['2026-06-10', 2])))
    await runJobs(context)
    await change(region.id, { geometry: larger })
    await runJobs(context)
    const { body } = await (await api()).get(`/api/regions/${region.id}/versions`).expect(200)
    expect(body.items).toMatchObject([
      { version: 2, inForce: true, views: 2, createdBy: person.name, geometry: larger },
      { version: 1, inForce: false, views: 2, createdBy: person.name, geometry: outline },
    ])
    const old = await (await api()).get(`/api/exports/regions/${region.id}/outline.geojson?version=1`).expect(200)
    expect(old.headers['content-disposition']).toContain('outline-1.geojson')
    await (await api()).get(`/api/exports/regions/${region.id}/outline.geojson?version=3`).expect(404)
  })

  it('by its shore buffer alone is a version too; by its name alone it is not', async () => {
    const region = await aRegion(context, person)
    await change(region.id, { name: 'Other Water' })
    expect(await context.models.geometries.count({ where: { regionId: region.id } })).toBe(1)
    await change(region.id, { shoreBufferKm: 3 })
    const versions = await context.models.geometries.findAll({ where: { regionId: region.id }, order: [['version', 'ASC']] })
    expect(versions.map(({ shoreBufferKm }) => shoreBufferKm)).toEqual([0, 3])
    expect((await (await api()).get(`/api/regions/${region.id}`)).body.shoreBufferKm).toBe(3)
  })
})

describe('redrawing while an event is running', () => {
  let regionId: number
  beforeEach(async () => {
    regionId = (await aRegion(context, person)).id
    await send(context, await seaFile(quietYears([2022, 2023, 2024, 2025], '05-25', 30)))
    await send(context, await seaFile(days(['2026-06-10', 4], ['2026-06-11', 5])))
    await runJobs(context)
    expect(await context.models.alerts.count()).toBe(1)
  })
  const alert = async () => (await context.models.alerts.findOne())!
  const kinds = async () => (await context.models.alertEntries.findAll({ order: [['id', 'ASC']] })).map(({ kind }) => kind)

  it('asks first: nothing is changed until it is confirmed', async () => {
    const agent = await api()
    const { version } = (await context.models.regions.findByPk(regionId))!
    const { body } = await agent.patch(`/api/regions/${regionId}`).send({ version, geometry: larger }).expect(409)
    expect(body.error).toMatchObject({ code: 'event-running', details: { since: '2026-06-10', alertIds: [(await alert()).id] } })
    expect(await context.models.geometries.count({ where: { regionId } })).toBe(1)
    expect((await context.models.regions.findByPk(regionId))!.version).toBe(version)
    await agent.patch(`/api/regions/${regionId}`).send({ version, name: 'Renamed' }).expect(200)
    await agent.patch(`/api/regions/${regionId}`).send({ version: version + 1, geometry: larger, confirm: true }).expect(200)
  })

  it('ends the event with that reason; it keeps its outline, and its alert goes on with what runs over the new one', async () => {
    const before = await alert()
    await change(regionId, { geometry: larger, confirm: true })
    const event = (await context.models.events.findByPk(before.eventId!))!
    const [first] = await context.models.geometries.findAll({ where: { regionId }, order: [['version', 'ASC']] })
    expect(event).toMatchObject({ phase: 'ended', endedBecause: 'the outline was redrawn as version 2', geometryId: first!.id })
    expect(await alert()).toMatchObject({ state: 'open', phase: 'ended', eventId: event.id })
    await runJobs(context)
    const after = await alert()
    expect(after).toMatchObject({ state: 'open', phase: 'running' })
    expect(after.eventId).not.toBe(event.id)
    expect(await kinds()).toEqual(['raised', 'ended', 'resumed'])
    const [newest] = await context.models.alertEntries.findAll({ order: [['id', 'DESC']], limit: 1 })
    expect(newest!.text).toBe('Goes on over the redrawn outline, version 2: an event is running there since 2026-06-10.')
    expect((await context.models.events.findByPk(event.id))!.geometryId).toBe(first!.id)
    expect(after.evidence.geometryVersion).toBe(1)
    const { body } = await (await api()).get(`/api/regions/${regionId}/events?feedId=${feed.id}`).expect(200)
    expect(body.items.map((item: { geometryVersion: number; endedBecause: string | null }) => [item.geometryVersion, item.endedBecause])).toEqual(
      expect.arrayContaining([[2, null], [1, 'the outline was redrawn as version 2']]),
    )
    const explained = await (await api()).get(`/api/alerts/${after.id}/explanation`).expect(200)
    expect(explained.body.agrees).toBe(true)
  })

  it('leaves the alert with its ended event where nothing runs over the new outline, and says no more', async () => {
    const before = await alert()
    await send(context, await seaFile([{ at: '2026-06-11T13:00:00Z', value: (row, column) => (row < 8 && column < 8 ? NaN : 1) }], { processingVersion: 'R1' }))
    await change(regionId, { geometry: box(-11.2, 50.8, -11, 51), confirm: true })
    await runJobs(context)
    expect(await alert()).toMatchObject({ state: 'open', phase: 'ended', eventId: before.eventId })
    expect(await kinds()).toEqual(['raised', 'ended'])
    await runJobs(context)
    expect(await kinds()).toEqual(['raised', 'ended'])
  })

  it('does not judge half a history: while it is read no event goes and no alert changes', async () => {
    await change(regionId, { geometry: larger, confirm: true })
    const before = (await alert()).version
    await context.db.write((tx) => context.db.run(`UPDATE jobs SET state = 'paused' WHERE kind = 'backfill-region' AND state = 'waiting'`, {}, tx))
    await send(context, await seaFile(days(['2026-06-12', 1])))
    await runJobs(context)
    expect((await alert()).version).toBe(before)
    expect((await standings(context, regionId)).get(regionId)!.because).toBe('The reading of its history is paused.')
  })
})

describe('a region of few whole cells', () => {
  // Two whole cells of a tenth of a degree, and a strip of two more.
  const small = box(-11.8, 50.2, -11.65, 50.4)
  let regionId: number
  beforeEach(async () => {
    regionId = (await aRegion(context, person, { geometry: small, feedId: feed.id })).id
    await send(context, await seaFile(quietYears([2022, 2023, 2024, 2025], '05-25', 30)))
    await send(context, await seaFile([...days(['2026-06-10', 40]), { at: '2026-06-11T12:00:00Z', value: (row: number, column: number) => (row === 2 && column === 2 ? NaN : 50 + column) }]))
    await runJobs(context)
  })

  it('keeps cells, valid cells, mean and greatest value of a view, and no percentiles', async () => {
    const { body } = await (await api()).get(`/api/regions/${regionId}/series?feedId=${feed.id}&from=2026-06-11`).expect(200)
    const { columns } = body
    expect([columns.cells[0], columns.valid[0], columns.max[0]]).toEqual([4, 3, 53])
    expect(columns.mean[0]).toBeGreaterThan(50)
    for (const name of ['median', 'p10', 'p25', 'p75', 'p90', 'p95']) expect(columns[name]).toEqual([null])
  })

  it('raises nothing by itself however high the values are, and its standing says why', async () => {
    expect(await context.models.alerts.count()).toBe(0)
    expect(await context.models.events.count()).toBe(0)
    const standing = (await standings(context, regionId)).get(regionId)!
    expect(standing).toMatchObject({ state: 'not ready', because: 'It is too small for the cells of Chlorophyll: it holds 2 whole water cells, and 5 are needed to say what is usual.' })
  })

  it('gives the single cells of its newest view', async () => {
    const { body } = await (await api()).get(`/api/regions/${regionId}/cells?feedId=${feed.id}`).expect(200)
    expect(body).toMatchObject({ few: true, wholeCells: 2, day: '2026-06-11', unit: 'mg m-3' })
    expect(body.cells.map((cell: { value: number | null; whole: boolean; longitude: number }) => [cell.longitude.toFixed(2), cell.whole, cell.value])).toEqual([
      ['-11.75', true, null],
      ['-11.65', false, 53],
      ['-11.75', true, 52],
      ['-11.65', false, 53],
    ])
  })

  it('gives no cells of a region that holds enough', async () => {
    const large = await aRegion(context, person, { name: 'Large Water' })
    await runJobs(context)
    expect((await (await api()).get(`/api/regions/${large.id}/cells?feedId=${feed.id}`)).body).toMatchObject({ few: false, wholeCells: 16, cells: [] })
  })
})
