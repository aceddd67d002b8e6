import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import request from 'supertest'
import type { Person } from '../../../server/accounts/person'
import { LayerRefused } from '../../../server/grids/layer-refused'
import type { FeedRecord } from '../../../server/models/feed'
import type { RegionRecord } from '../../../server/models/region'
import { awayText, patchSentence } from '../../../shared/patch-text'
import type { EvidencePatch, RegionPatches, RegionView } from '../../../shared/schemas/patches'
import { aFeed, aPerson, aRegion, cleanSea, quietYears, runJobs, seaFile, send, type SeaStep } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'
import { aUser, bearer } from '../../support/people'

/** Eight by eight whole cells of the sea, 11.9W to 11.1W and 50.1N to 50.9N, rows from south to north; the site in its middle. */
const square = { type: 'Polygon' as const, coordinates: [[[-11.9, 50.1], [-11.1, 50.1], [-11.1, 50.9], [-11.9, 50.9], [-11.9, 50.1]]] }
const site = { name: 'Crow Rock', latitude: 50.55, longitude: -11.55 }

let context: TestContext
let person: Person
let feed: FeedRecord
let region: RegionRecord
let token: string

beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
  feed = await aFeed(context, person)
  region = await aRegion(context, person, { geometry: square, site })
  token = await bearer(context, await aUser(context, { roles: ['researcher'] }))
})
afterEach(() => context.close())
afterAll(cleanSea)

const get = (path: string) => request(context.app).get(`/api/regions/${region.id}/${path}`).set('Authorization', token)
const patches = async (query = '') => (await get(`patches?feedId=${feed.id}${query}`).expect(200)).body as RegionPatches
const view = async (query = '') => (await get(`view?feedId=${feed.id}${query}`).expect(200)).body as RegionView
const arrive = async (steps: SeaStep[], wish = {}) => {
  await send(context, await seaFile(steps, wish))
  await runJobs(context)
}

/** Rows from north to south and columns of the region: one digit a cell, a dot for missing; the sea round it is 0.2. */
const drawn = (picture: string): SeaStep['value'] => {
  const rows = picture.trim().split(/\s+/).reverse()
  return (row, column) => {
    const cell = rows[row - 1]?.[column - 1]
    return cell === undefined ? 0.2 : cell === '.' ? NaN : Number(cell)
  }
}
const calm = '00000000 '.repeat(8)
const small = '00000000 00000000 00000040 00000660 00000000 00000000 00000000 00000000'
const grown = '00000000 00000440 00000440 00000660 00000000 00000000 03000000 00000000'

describe('the patches of a view', () => {
  it('a small bloom in a large region is found, where it is from the site, though the median is usual', async () => {
    await arrive([{ at: '2026-06-10T12:00:00Z', value: drawn(small) }])
    const found = await patches()
    expect(found).toMatchObject({ answer: 'patches', level: { level: 1, from: 'rule' }, view: { day: '2026-06-10', coverage: 1 }, before: null, gone: [], others: { patches: 0 } })
    expect(found.level.why).toMatch(/^1 mg m⁻³, the floor of the rule in force here \(.+, version 1\)\.$/)
    const [patch, ...others] = found.patches
    expect(others).toEqual([])
    expect(patch).toMatchObject({ number: 1, cells: 3, greatest: 6, atLeast: false, touchesEdge: false, change: null })
    expect(patch!.peak).toEqual({ latitude: expect.closeTo(50.55, 9), longitude: expect.closeTo(-11.35, 9) })
    // A fifth of a degree along the parallel: a cos(50.55) / sqrt(1 - e2 sin2(50.55)) x 0.2 pi / 180, the geodesic hardly shorter.
    expect(patch!.peakAway).toEqual({ km: expect.closeTo(14.175, 2), bearing: expect.closeTo(89.92, 1) })
    expect(patch!.nearest).toEqual(patch!.peakAway)
    expect(patch!.areaKm2).toBeCloseTo(found.areaAboveKm2!, 9)
    expect(patch!.outline).toMatchObject({ type: 'MultiLineString' })
    const [ring, ...holes] = patch!.outline.coordinates
    expect([ring!.length, ring!.at(-1), holes]).toEqual([7, ring![0], []])
    const series = (await get(`series?feedId=${feed.id}`).expect(200)).body
    expect(series.columns.median[0]).toBeLessThan(0.3)
    expect(series.columns.areaAboveKm2[0]).toBeCloseTo(patch!.areaKm2, 3)
  })

  it('what became of them is told against the last usable view, not against one that hardly saw', async () => {
    const clouded = drawn('........ '.repeat(7) + '0.......')
    await arrive([{ at: '2026-06-08T12:00:00Z', value: drawn(small) }, { at: '2026-06-09T12:00:00Z', value: clouded }, { at: '2026-06-10T12:00:00Z', value: drawn(grown) }])
    const found = await patches()
    expect(found.before).toMatchObject({ day: '2026-06-08', coverage: 1 })
    const [large, little] = found.patches
    expect(large!.change).toMatchObject({ kind: 'grown', together: [1], beforeKm2: expect.closeTo((await patches('&day=2026-06-08')).areaAboveKm2!, 9) })
    expect(large!.change!.changeKm2).toBeGreaterThan(200)
    expect(large!.change!.moved!.km).toBeGreaterThan(1)
    expect(little).toMatchObject({ number: 2, cells: 1, change: { kind: 'new', beforeKm2: 0 } })
    const back = await patches('&day=2026-06-08')
    expect(back).toMatchObject({ view: { day: '2026-06-08' }, before: null })
    await arrive([{ at: '2026-06-11T12:00:00Z', value: drawn(calm) }])
    const after = await patches()
    expect(after).toMatchObject({ answer: 'none above', patches: [], areaAboveKm2: 0, sentence: 'Nothing in the 100 % of the water that was seen reaches 1 mg m⁻³.' })
    expect(after.gone.map(({ kind, greatest }) => [kind, greatest])).toEqual([['gone', 6], ['gone', 3]])
  })

  it('a patch that touches the outline or cloud is at least so large', async () => {
    await arrive([{ at: '2026-06-10T12:00:00Z', value: drawn('00000005 00000005 00000000 00440000 00440000 000.0000 00000000 20000000') }])
    const found = await patches()
    expect(found.patches.map(({ cells, touchesEdge, touchesUnseen, atLeast }) => [cells, touchesEdge, touchesUnseen, atLeast])).toEqual([[4, false, true, true], [1, true, false, true], [2, true, false, true]].sort((a, b) => Number(b[0]) - Number(a[0])))
  })

  it('another level and a least number of cells can be asked for, and are named', async () => {
    await arrive([{ at: '2026-06-10T12:00:00Z', value: drawn(grown) }])
    expect(await patches('&level=5')).toMatchObject({ level: { level: 5, from: 'asked', why: '5 mg m⁻³, the level asked for.' }, patches: [{ cells: 2 }] })
    expect(await patches('&minimumCells=2')).toMatchObject({ patches: [{ cells: 6 }], others: { patches: 1, cells: 1 }, sentence: expect.stringMatching(/^2 patches at or above 1 mg m⁻³ in/) })
    await get(`patches?feedId=${feed.id}&level=much`).expect(422)
    await get(`patches?feedId=${feed.id}&day=11 June`).expect(422)
  })

  it('two layers of one day are one view, and land on one place', async () => {
    const west = drawn('0000.... '.repeat(3) + '0006.... ' + '0000.... '.repeat(4))
    const east = drawn('....0000 '.repeat(3) + '....7000 ' + '....0000 '.repeat(4))
    await arrive([{ at: '2026-06-10T11:00:00Z', value: west }])
    await arrive([{ at: '2026-06-10T13:00:00Z', value: east }])
    const found = await patches()
    expect(found.view!.layerIds).toHaveLength(2)
    expect(found.patches).toMatchObject([{ cells: 2, greatest: 7, atLeast: false }])
  })

  it('the site inside a patch is no distance away', async () => {
    await arrive([{ at: '2026-06-10T12:00:00Z', value: drawn('00000000 '.repeat(3) + '00055500 00055500' + ' 00000000'.repeat(3)) }])
    expect((await patches()).patches[0]!.nearest).toEqual({ km: 0, bearing: null })
  })

  it('no view, nothing seen, no region, no feed: each is answered plainly', async () => {
    expect(await patches()).toMatchObject({ answer: 'no view', view: null, sentence: 'This feed has no view of this region yet.' })
    expect(await view()).toMatchObject({ view: null, first: null, last: null, previous: null, next: null })
    await arrive([{ at: '2026-06-10T12:00:00Z', value: drawn('........ '.repeat(8)) }])
    expect(await patches()).toMatchObject({ answer: 'nothing seen', patches: [], sentence: 'No water of this region was seen in this view.' })
    expect(await patches('&day=2026-06-01')).toMatchObject({ answer: 'no view', sentence: 'This feed has no view of this region on 2026-06-01.' })
    expect((await get('patches?feedId=999').expect(404)).body.error.message).toBe('There is no such feed.')
    await request(context.app).get(`/api/regions/999/patches?feedId=${feed.id}`).set('Authorization', token).expect(404)
  })

  it('without a site there is no distance; without a rule the level is 1, and it is said', async () => {
    await context.models.regions.update({ site: null }, { where: { id: region.id } })
    await arrive([{ at: '2026-06-10T12:00:00Z', value: drawn(small) }])
    await context.models.rules.update({ activeVersion: null }, { where: { regionId: region.id } })
    const found = await patches()
    expect(found.patches[0]).toMatchObject({ nearest: null, peakAway: null })
    expect(found.level).toEqual({ level: 1, from: 'no rule', why: '1 mg m⁻³, as no rule in force here names a level of this feed.' })
  })
})

describe('one view of a region', () => {
  it('tells where the greatest value is, area by value, and the days beside it', async () => {
    await arrive([{ at: '2026-06-08T12:00:00Z', value: drawn(calm) }, { at: '2026-06-10T12:00:00Z', value: drawn(small) }])
    const shown = await view()
    expect(shown).toMatchObject({ first: '2026-06-08', last: '2026-06-10', previous: '2026-06-08', next: null, unit: 'mg m-3', scale: 'log10' })
    expect(shown.view!.max).toEqual({ value: 6, latitude: expect.closeTo(50.55, 6), longitude: expect.closeTo(-11.35, 6), away: { km: expect.closeTo(14.175, 2), bearing: expect.closeTo(89.92, 1) } })
    expect(shown.view!.areaAboveKm2).toBeCloseTo((await patches()).areaAboveKm2!, 3)
    const { histogram, validAreaKm2, waterAreaKm2 } = shown.view!
    expect(histogram.reduce((sum, bin) => sum + bin.areaKm2, 0)).toBeCloseTo(validAreaKm2, 3)
    expect(waterAreaKm2).toBeCloseTo(validAreaKm2, 6)
    expect(histogram.filter((bin) => bin.areaKm2 > 0).every((bin) => bin.from === null || bin.from < bin.to!)).toBe(true)
    expect(await view('&day=2026-06-08')).toMatchObject({ previous: null, next: '2026-06-10' })
    expect(await view('&day=2026-06-09')).toMatchObject({ view: null, previous: '2026-06-08', next: '2026-06-10' })
  })

  it('names water that was not seen by reason, as a share of the water', async () => {
    const bounded = await aFeed(context, person, { name: 'Bounded', variable: 'chlor_b', validMax: 5 })
    await context.models.feeds.update({ validMax: 5 }, { where: { id: feed.id } })
    await arrive([{ at: '2026-06-10T12:00:00Z', value: drawn(small) }])
    const shown = await view()
    expect(bounded.id).not.toBe(feed.id)
    expect(shown.view!.masked).toEqual([{ reason: 'outside the valid range', areaKm2: expect.any(Number), share: expect.closeTo(2 / 64, 3) }])
    expect(shown.view!.max!.value).toBe(4)
  })
})

describe('an alert', () => {
  const bloom = drawn('44444444 '.repeat(3) + '44444477 ' + '44444444 '.repeat(2) + '00000000 00000000')

  it('keeps the largest patch of the day it was raised on, and its letter names it in one sentence', async () => {
    const officer = await aUser(context, { roles: ['officer'] })
    await context.models.subscriptions.create({ userId: officer.id, allRegions: true, minimumSeverity: 'Minor', delivery: 'at once' })
    await arrive(quietYears([2022, 2023, 2024, 2025], '05-25', 30))
    await arrive([{ at: '2026-06-10T12:00:00Z', value: bloom }, { at: '2026-06-11T12:00:00Z', value: bloom }])
    const [alert] = await context.models.alerts.findAll()
    const { patches: found } = await patches()
    const kept = alert!.evidence.largestPatch!
    expect(kept).toMatchObject({ level: 1, cells: 48, greatest: 7, atLeast: true, siteName: 'Crow Rock', nearest: { km: 0, bearing: null }, patches: 1 })
    expect([kept.areaKm2, kept.peakAway]).toEqual([found[0]!.areaKm2, found[0]!.peakAway])
    const sentence = patchSentence(kept, 'mg m-3')
    expect(sentence).toMatch(/^The largest patch at or above 1 mg m⁻³ covers at least 3\d{3} km², holds Crow Rock and reaches 7 mg m⁻³, 21\.3 km E of it\.$/)
    const [letter] = await context.models.letters.findAll()
    expect(letter!.textPart).toContain(sentence)
    expect(letter!.htmlPart).toContain(sentence)
    await arrive([{ at: '2026-06-11T12:30:00Z', value: drawn(calm) }])
    expect((await context.models.alerts.findAll())[0]!.evidence.largestPatch).toEqual(kept)
  })

  it('that rises keeps the largest patch of the day it rose to', async () => {
    const higher = drawn('99999999 '.repeat(6) + '00000000 00000000')
    await arrive(quietYears([2022, 2023, 2024, 2025], '05-25', 30))
    await arrive([{ at: '2026-06-09T12:00:00Z', value: bloom }, { at: '2026-06-10T12:00:00Z', value: bloom }])
    const [raised] = await context.models.alerts.findAll()
    await arrive([{ at: '2026-06-11T12:00:00Z', value: higher }])
    const [risen] = await context.models.alerts.findAll()
    expect([raised!.evidence.largestPatch!.greatest, risen!.evidence.largestPatch!.greatest]).toEqual([7, 9])
    expect(raised!.severity).not.toBe(risen!.severity)
  })

  it('is raised all the same when its layer cannot be read a second time', async () => {
    const { heavy } = context.workers
    context.workers.heavy = (task, input, options) => (task === 'findPatches' ? Promise.reject(new LayerRefused('reading-failed', 'Gone bad.')) : heavy(task, input, options))
    await arrive(quietYears([2022, 2023, 2024, 2025], '05-25', 30))
    await arrive([{ at: '2026-06-10T12:00:00Z', value: bloom }, { at: '2026-06-11T12:00:00Z', value: bloom }])
    const [alert] = await context.models.alerts.findAll()
    expect(alert!.state).toBe('open')
    expect(alert!.evidence).not.toHaveProperty('largestPatch')
  })

  it('says where it is in plain words', () => {
    const patch: EvidencePatch = { level: 1, areaKm2: 21.4, atLeast: false, cells: 3, greatest: 6.44, latitude: 51.2, longitude: -10.35, siteName: null, nearest: { km: 6.21, bearing: 44 }, peakAway: { km: 9.13, bearing: 70 }, patches: 2 }
    expect(patchSentence(patch, 'mg m-3')).toBe('The largest patch at or above 1 mg m⁻³ covers 21.4 km², begins 6.2 km NE of the site and reaches 6.44 mg m⁻³ 9.1 km ENE of the site.')
    expect(patchSentence({ ...patch, nearest: patch.peakAway, siteName: 'Crow Rock' }, null)).toBe('The largest patch at or above 1 covers 21.4 km² and reaches 6.44, 9.1 km ENE of Crow Rock.')
    expect(patchSentence({ ...patch, nearest: null, peakAway: null }, 'mg m-3')).toBe('The largest patch at or above 1 mg m⁻³ covers 21.4 km² and reaches 6.44 mg m⁻³ at 51.20° N, 10.35° W.')
    expect(awayText({ km: 130.4, bearing: 359 })).toBe('130 km N of the site')
  })
})
