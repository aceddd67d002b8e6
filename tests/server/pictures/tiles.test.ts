import type { IncomingMessage } from 'node:http'
import { join } from 'node:path'
import request from 'supertest'
import sharp from 'sharp'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import { LayerRefused } from '../../../server/grids/layer-refused'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { changeFeed } from '../../../server/pipeline/feeds'
import { markSuspect } from '../../../server/pipeline/mark-suspect'
import { okLab, type Rgb } from '../../../shared/ok-lab'
import { rampColour, ramps, screenShares } from '../../../shared/ramps'
import { shareOf } from '../../../shared/colouring'
import type { Person } from '../../../server/accounts/person'
import { layerRows } from '../../../server/queries/layer-rows'
import { aUser, bearer } from '../../support/people'
import { aBandFeed, aDerivedFeed, reflectanceFile } from '../../support/reflectance-sea'
import { aFeed, aPerson, cleanSea, runJobs, seaFile, seaFolder, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
let authorization: string
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
  authorization = await bearer(context, await aUser(context))
})
afterEach(() => context.close())
afterAll(cleanSea)

const get = (path: string) => request(context.app).get(`/api${path}`).set('Authorization', authorization)

/** The pixel of Web Mercator that holds a place, as the slippy-map convention prints it. */
function pixelOf(z: number, lat: number, lon: number) {
  const across = 256 * 2 ** z
  const px = Math.floor(((lon + 180) / 360) * across)
  const py = Math.floor(((1 - Math.asinh(Math.tan((lat * Math.PI) / 180)) / Math.PI) / 2) * across)
  return { x: px >> 8, y: py >> 8, px: px & 255, py: py & 255 }
}

/** The colour a layer has at a place; null where nothing is drawn. */
async function colourAt(layerId: number, lat: number, lon: number, z = 8): Promise<Rgb | null> {
  const { x, y, px, py } = pixelOf(z, lat, lon)
  const reply = await get(`/layers/${layerId}/tiles/${z}/${x}/${y}.png`).buffer(true).parse(bytes).expect(200)
  const { data, info } = await sharp(reply.body as Buffer).ensureAlpha().raw().toBuffer({ resolveWithObject: true })
  const at = info.width === 1 ? 0 : (py * info.width + px) * 4
  return data[at + 3] === 0 ? null : [data[at]!, data[at + 1]!, data[at + 2]!]
}

function bytes(reply: request.Response, done: (error: Error | null, body: Buffer) => void): void {
  const parts: Buffer[] = []
  const incoming = reply as unknown as IncomingMessage
  incoming.on('data', (part: Buffer) => parts.push(part)).on('end', () => done(null, Buffer.concat(parts)))
}

/** 512 shades stand for the ramp, so a colour is met to within a shade. */
function expectColour(seen: Rgb | null, share: number): void {
  const wanted = okLab(rampColour(ramps.sea.light, share))
  expect(seen && Math.hypot(...okLab(seen).map((c, i) => c - wanted[i]!))).toBeLessThan(0.01)
}

const chlorophyll = { scale: 'log', from: 0.03, to: 30 } as const

async function onlyLayer(feedId: number): Promise<number> {
  const rows = await layerRows(context, { feedId }, null, 10)
  expect(rows).toHaveLength(1)
  return rows[0]!.id
}

async function worldFile(longitudes: number[], value: (lon: number, lat: number) => number, latitudes = [-89.5, 0, 89.5]): Promise<string> {
  const path = join(await seaFolder(), 'world.nc')
  const data = Float64Array.from({ length: latitudes.length * longitudes.length }, (_, i) => value(longitudes[i % longitudes.length]!, latitudes[Math.floor(i / longitudes.length)]!))
  const attributes = { units: 'mg m-3', standard_name: 'mass_concentration_of_chlorophyll_a_in_sea_water' }
  await writeNetcdf4(path, { latitudes, longitudes, times: [Date.parse('2026-06-10T12:00:00Z')], variables: [{ name: 'chlor_a', dtype: 'f4', data, attributes }], globalAttributes: { processing_version: 'R1' }, deflate: 1 })
  return path
}

describe('a tile', () => {
  it('shows each cell in the colour of its value, and nothing where a value is missing', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile([{ at: '2026-06-10T12:00:00Z', value: (row, column) => (column === 3 ? NaN : row === 4 ? 10 : 0.3) }]))
    await runJobs(context)
    const layer = await onlyLayer(feed.id)
    expectColour(await colourAt(layer, 50.45, -11.85), shareOf(chlorophyll, 10))
    expectColour(await colourAt(layer, 50.55, -11.85), shareOf(chlorophyll, 0.3))
    expect(await colourAt(layer, 50.45, -11.65)).toBeNull()
    expect(await colourAt(layer, 50.45, -10.5)).toBeNull()
  })

  it('and the point and the legend leave out what lies outside the valid range, as the figures do', async () => {
    const feed = await aFeed(context, person, { validMin: 0.01, validMax: 5 })
    await send(context, await seaFile([{ at: '2026-06-10T12:00:00Z', value: (_, column) => (column < 4 ? 9 : 2) }]))
    await runJobs(context)
    const layer = await onlyLayer(feed.id)
    expect(await colourAt(layer, 50.45, -11.85)).toBeNull()
    expectColour(await colourAt(layer, 50.45, -11.25), shareOf(chlorophyll, 2))
    expect((await get(`/layers/${layer}/point?lat=50.45&lon=-11.85`)).body).toMatchObject({ value: null, row: 4, column: 1 })
    const legend = (await get(`/layers/${layer}/legend`)).body
    expect(legend).toMatchObject({ quantity: 'Chlorophyll', unit: 'mg m-3', cells: 100, valid: 60, looked: 'all', hidden: [{ reason: 'outside the valid range', cells: 40 }], below: 0, above: 0 })
    expect(legend.bins.reduce((sum: number, count: number) => sum + count, 0)).toBe(60)
  })

  it('of a reflectance band and of a screen has the scale of that quantity', async () => {
    const band = await aBandFeed(context, person, 670)
    const screen = await aDerivedFeed(context, person, band.id, { name: 'Turbid', formula: 'turbid-water', formulaVersion: '1' })
    await send(context, await reflectanceFile([{ at: '2026-06-10T12:00:00Z', rrs: { 443: 0.004, 490: 0.003, 510: 0.003, 555: 0.002, 670: (_, column) => (column < 5 ? 0.0003 : 0.003) } }]))
    await runJobs(context)
    const reflectance = { scale: 'log', from: 0.0001, to: 0.03 } as const
    expectColour(await colourAt(await onlyLayer(band.id), 50.45, -11.85), shareOf(reflectance, 0.0003))
    expectColour(await colourAt(await onlyLayer(screen.id), 50.45, -11.85), screenShares.no)
    expectColour(await colourAt(await onlyLayer(screen.id), 50.45, -11.25), screenShares.yes)
    const legend = (await get(`/layers/${await onlyLayer(screen.id)}/legend`)).body
    expect(legend).toMatchObject({ quantity: 'Turbid-water screen', colouring: { scale: 'screen' }, bins: [50, 50] })
  })

  it('draws a strip over the 180th meridian on both sides of it', async () => {
    const feed = await aFeed(context, person)
    await send(context, await worldFile(Array.from({ length: 20 }, (_, i) => 170.5 + i), (lon) => (lon < 180 ? 0.3 : 3), [-1, 0, 1]))
    await runJobs(context)
    const layer = await onlyLayer(feed.id)
    expectColour(await colourAt(layer, 0.2, 179.6, 5), shareOf(chlorophyll, 0.3))
    expectColour(await colourAt(layer, 0.2, -179.6, 5), shareOf(chlorophyll, 3))
    expect(await colourAt(layer, 0.2, 160, 5)).toBeNull()
    const point = (await get(`/layers/${layer}/point?lat=0.2&lon=-179.6`)).body
    expect(point).toMatchObject({ column: 10, cell: { latitude: 0, longitude: -179.5 } })
    expect(point.value).toBeCloseTo(3, 6)
    expect(point.cell.corners).toEqual([[-180, -0.5], [-179, -0.5], [-179, 0.5], [-180, 0.5]])
  })

  it('of a whole globe counted from 0 to 360 is drawn west and east, at every zoom, over its own seam too', async () => {
    const feed = await aFeed(context, person)
    await send(context, await worldFile(Array.from({ length: 36 }, (_, i) => 5 + 10 * i), (lon) => (lon < 180 ? 0.3 : 3)))
    await runJobs(context)
    const layer = await onlyLayer(feed.id)
    for (const z of [0, 1, 4]) {
      expectColour(await colourAt(layer, 1, 20, z), shareOf(chlorophyll, 0.3))
      expectColour(await colourAt(layer, 1, -20, z), shareOf(chlorophyll, 3))
      expectColour(await colourAt(layer, 1, -175, z), shareOf(chlorophyll, 3))
      expectColour(await colourAt(layer, 1, 175, z), shareOf(chlorophyll, 0.3))
    }
  })

  it('is not sent again while it is the same, and has another tag once its feed is read otherwise', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile([{ at: '2026-06-10T12:00:00Z', value: 2 }]))
    await runJobs(context)
    const layer = await onlyLayer(feed.id)
    const { x, y } = pixelOf(8, 50.45, -11.55)
    const path = `/layers/${layer}/tiles/8/${x}/${y}.png`
    const first = await get(path).expect(200)
    expect(first.headers['content-type']).toBe('image/png')
    expect(first.headers['cache-control']).toBe('private, max-age=60')
    const tag = first.headers['etag']!
    expect((await get(path).set('If-None-Match', tag)).status).toBe(304)
    expect((await get(`${path}?theme=night`).set('If-None-Match', tag)).status).toBe(200)
    await changeFeed(context, person, feed.id, { version: feed.version, validMax: 1 })
    const after = await get(path).set('If-None-Match', tag).expect(200)
    expect(after.headers['etag']).not.toBe(tag)
    expect(await colourAt(layer, 50.45, -11.55)).toBeNull()
  })

  it('of a file that has gone bad says so, like the legend and the point', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile([{ at: '2026-06-10T12:00:00Z', value: 2 }]))
    await runJobs(context)
    const layer = await onlyLayer(feed.id)
    context.workers.light = () => Promise.reject(new LayerRefused('damaged', 'The file is damaged: chlor_a cannot be read back whole.', { what: 'chlor_a' }))
    const { x, y } = pixelOf(8, 50.45, -11.55)
    for (const path of [`tiles/8/${x}/${y}.png`, 'legend', 'point?lat=50.45&lon=-11.55']) {
      const { status, body } = await get(`/layers/${layer}/${path}`)
      expect([status, body.error.message]).toEqual([503, 'The stored file of this layer cannot be read any more. The file is damaged: chlor_a cannot be read back whole.'])
    }
  })

  it('that lies nowhere is refused with a sentence that says why', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile([{ at: '2026-06-10T12:00:00Z', value: 2 }]))
    await runJobs(context)
    const layer = await onlyLayer(feed.id)
    const answer = async (path: string) => {
      const { status, body } = await get(`/layers/${layer}/tiles/${path}`)
      return [status, body.error.message]
    }
    expect(await answer('2/4/0.png')).toEqual([404, 'There is no tile 4/0 at zoom 2: columns and rows go from 0 to 3.'])
    expect(await answer('17/0/0.png')).toEqual([404, 'There are no tiles at zoom 17: they go from 0 to 16.'])
    for (const path of ['a/0/0.png', '1/-1/0.png', '1/0/0.5.png', '1/1e0/0.png']) expect((await answer(path))[0]).toBe(400)
    expect(await answer('2/1/1.png?show=departure')).toEqual([400, expect.stringContaining('Ask for show=value.')])
    expect((await get('/layers/987654/tiles/2/1/1.png')).status).toBe(404)
  })
})

describe('what is usual at a cell', () => {
  it('is the median of the same cell within five days of this day of year in earlier years', async () => {
    const feed = await aFeed(context, person)
    const year = (of: number, value: number) => [-6, -5, 0, 5, 6].map((days) => ({ at: new Date(Date.UTC(of, 5, 10 + days, 12)).toISOString(), value: Math.abs(days) > 5 ? 25 : value + days / 10 }))
    await send(context, await seaFile([...year(2024, 1), ...year(2025, 2), { at: '2026-06-10T12:00:00Z', value: 4 }]))
    await runJobs(context)
    const [newest] = await layerRows(context, { feedId: feed.id }, null, 1)
    const plain = (await get(`/layers/${newest!.id}/point?lat=50.45&lon=-11.55`)).body
    expect(plain).toMatchObject({ value: 4, usual: null })
    const { usual } = (await get(`/layers/${newest!.id}/point?lat=50.45&lon=-11.55&usual=true`)).body
    // 0.5, 1, 1.5 and 1.5, 2, 2.5: numpy.median gives 1.5
    expect(usual).toMatchObject({ halfWidthDays: 5, values: 6, years: 2, yearsWithLayers: 2, cut: false })
    expect(usual.median).toBeCloseTo(1.5, 6)
  })

  it('is not made up without earlier years, and leaves other processing versions and suspect layers out', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile([{ at: '2025-06-10T12:00:00Z', value: 1 }], { processingVersion: 'R0', name: 'before.nc' }))
    await send(context, await seaFile([{ at: '2025-06-11T12:00:00Z', value: 2 }, { at: '2026-06-10T12:00:00Z', value: 4 }]))
    await runJobs(context)
    const [newest, doubted] = await layerRows(context, { feedId: feed.id }, null, 3)
    await markSuspect(context, person, doubted!.id, { suspect: true, note: 'stripes' })
    const { usual } = (await get(`/layers/${newest!.id}/point?lat=50.45&lon=-11.55&usual=true`)).body
    expect(usual).toEqual({ halfWidthDays: 5, median: null, values: 0, years: 0, yearsWithLayers: 0, cut: false })
  })
})

describe('the days of a feed', () => {
  it('are those with a layer that no newer file replaced, with the ends of the whole feed', async () => {
    const feed = await aFeed(context, person)
    await send(context, await seaFile(['2026-05-01T12:00:00Z', '2026-06-09T12:00:00Z', '2026-06-09T13:30:00Z', '2026-06-10T12:00:00Z'].map((at) => ({ at, value: 1 }))))
    await runJobs(context)
    const { body } = await get(`/feeds/${feed.id}/days?from=2026-06-01&to=2026-06-09`).expect(200)
    expect(body).toMatchObject({ feedId: feed.id, first: '2026-05-01', last: '2026-06-10' })
    expect(body.days.map((one: { day: string; layers: unknown[] }) => [one.day, one.layers.length])).toEqual([['2026-06-09', 2]])
    const [replaced] = body.days[0].layers as { id: number }[]
    await context.db.write((tx) => context.db.run('UPDATE layers SET replaced_by = file_id WHERE id = $id', { id: replaced!.id }, tx))
    expect((await get(`/feeds/${feed.id}/days?from=2026-06-01&to=2026-06-09`)).body.days[0].layers).toHaveLength(1)
    expect((await get('/feeds/987654/days')).status).toBe(404)
  })
})
