import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import { regionSeries } from '../../../server/desk/region-series'
import { deleteFile } from '../../../server/pipeline/delete-file'
import { knownLayer, layerCell, layerTile } from '../../../server/pipeline/layer-pictures'
import { markSuspect } from '../../../server/pipeline/mark-suspect'
import { presentFile } from '../../../server/pipeline/present-file'
import { layerRows } from '../../../server/queries/layer-rows'
import { newFeed } from '../../../shared/schemas/feeds'
import { chlorophyllOfRatio } from '../../../shared/science/optics/band-ratio-chlorophyll'
import { bandRatioSet } from '../../../shared/science/optics/band-ratio-sets'
import { aBandFeed, aDerivedFeed, blueWater, greenWater, reflectanceFile, whiteWater, type Spectrum } from '../../support/reflectance-sea'
import { aFeed, aPerson, aRegion, cleanSea, runJobs, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

const oc4 = bandRatioSet('oc4-seawifs', '2019')
const step = (date: string, rrs: Spectrum, clock = '12:00') => ({ at: `${date}T${clock}:00Z`, rrs })
const medians = async (regionId: number, feedId: number) => (await regionSeries(context, regionId, { feedId, columns: 'day,median,mean,coverage' })).columns
const refusal = (wish: Record<string, unknown>, derivedFrom: number) => aDerivedFeed(context, person, derivedFrom, wish).then(() => 'made', (error: Error) => error.message)

describe('a derived feed', () => {
  it('gives chlorophyll on the grid and time of the bands, whatever other bands have feeds', async () => {
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    const file = await send(context, await reflectanceFile([step('2026-06-09', blueWater), step('2026-06-10', greenWater)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    expect(feed).toMatchObject({ quantity: 'chlorophyll', unit: 'mg m-3', scale: 'log10', processingVersion: 'R1', derivedFrom: source.id, derivedSources: [source.id] })
    await runJobs(context)
    const { day, median } = await medians(region.id, feed.id)
    expect(day).toEqual(['2026-06-09', '2026-06-10'])
    expect(median![0]).toBeCloseTo(chlorophyllOfRatio(2, oc4), 6)
    expect(median![1]).toBeCloseTo(chlorophyllOfRatio(1, oc4), 6)
    // Own quantity before derived, in time order.
    await file.reload()
    expect((await presentFile(context, file)).layers.map(({ feedId }) => feedId)).toEqual([source.id, feed.id, source.id, feed.id])
    expect(await context.models.files.count()).toBe(1)
  })

  it('comes into being with each new file, and again changes nothing when the file is read twice', async () => {
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    await send(context, await reflectanceFile([step('2026-06-08', blueWater)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    const file = await send(context, await reflectanceFile([step('2026-06-10', greenWater)]))
    await runJobs(context)
    const before = await medians(region.id, feed.id)
    expect(before.day).toEqual(['2026-06-08', '2026-06-10'])
    await file.reload()
    expect(file.report!.feeds).toEqual([
      { feedId: source.id, variable: 'Rrs_443', layers: 1 },
      { feedId: feed.id, variable: 'chlor_a', layers: 1 },
    ])
    await context.db.write((tx) => context.db.run(`UPDATE jobs SET state = 'waiting', done = 0 WHERE kind IN ('process-file', 'backfill-feed')`, {}, tx))
    await runJobs(context)
    expect(await medians(region.id, feed.id)).toEqual(before)
    expect(await context.models.layers.count({ where: { feedId: feed.id } })).toBe(2)
  })

  it('has no value in a cell where one band has none', async () => {
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    const holed = { ...blueWater, 510: (_: number, column: number) => (column < 4 ? NaN : 0.003) }
    await send(context, await reflectanceFile([step('2026-06-10', holed)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    expect((await medians(region.id, feed.id)).coverage![0]).toBeCloseTo(0.5, 9)
    expect((await medians(region.id, source.id)).coverage![0]).toBeCloseTo(1, 9)
  })

  it('answers tiles, points and facts like any other layer, and names formula, version and bands', async () => {
    const source = await aBandFeed(context, person, 443)
    await aRegion(context, person)
    await send(context, await reflectanceFile([step('2026-06-10', greenWater)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    const [layer] = await layerRows(context, { feedId: feed.id }, null, 10)
    expect(layer).toMatchObject({ variable: 'chlor_a', unit: 'mg m-3', processingVersion: 'R1' })
    expect(layer!.derived).toMatchObject({ formula: 'oc4-seawifs', formulaVersion: '2019' })
    expect(layer!.derived!.bands.map(({ variable, wavelengthNm }) => [variable, wavelengthNm])).toEqual([['Rrs_443', 443], ['Rrs_490', 490], ['Rrs_510', 510], ['Rrs_555', 555]])
    const known = await knownLayer(context, layer!.id)
    expect((await layerCell(context, known, 50.35, -11.55)).value).toBeCloseTo(chlorophyllOfRatio(1, oc4), 6)
    expect(await layerTile(context, known, { z: 8, x: 119, y: 85, theme: 'light' })).not.toBeNull()
    const provenance = await context.db.first<{ formula: string }>('SELECT p.formula FROM summaries s JOIN provenances p ON p.id = s.provenance_id WHERE s.feed_id = $id', { id: feed.id })
    expect(provenance!.formula).toBe('oc4-seawifs, version 2019, of Rrs_443, Rrs_490, Rrs_510, Rrs_555')
  })

  it('of a screen says by its mean what share of the water is flagged', async () => {
    const source = await aBandFeed(context, person, 555)
    const region = await aRegion(context, person)
    const half = Object.fromEntries([443, 490, 510, 555, 670].map((nm) => [nm, (_: number, column: number) => (column < 4 ? whiteWater : blueWater)[nm] as number]))
    await send(context, await reflectanceFile([step('2026-06-10', half)]))
    await runJobs(context)
    const bright = await aDerivedFeed(context, person, source.id, { name: 'Bright water', formula: 'bright-water', formulaVersion: '1' })
    const turbid = await aDerivedFeed(context, person, source.id, { name: 'Turbid water', formula: 'turbid-water', formulaVersion: '1' })
    await runJobs(context)
    expect((await medians(region.id, bright.id)).mean![0]).toBeCloseTo(0.5, 9)
    expect((await medians(region.id, turbid.id)).mean![0]).toBeCloseTo(0.5, 9)
  })

  it('takes bands from files of their own, of one time and processing version, in whatever order they arrive', async () => {
    for (const nm of [490, 510, 555]) await aBandFeed(context, person, nm)
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    const feed = await aDerivedFeed(context, person, source.id)
    expect(feed.derivedSources).toHaveLength(4)
    const one = (nm: number, date: string, processingVersion = 'R1') =>
      reflectanceFile([step(date, greenWater)], { bands: [nm], name: `rrs${nm}-${date}.nc`, processingVersion }).then((path) => send(context, path))
    for (const nm of [555, 443, 490]) await one(nm, '2026-06-10')
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual([])
    await one(510, '2026-06-10', 'R2')
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual([])
    const last = await one(510, '2026-06-10')
    await runJobs(context)
    expect((await medians(region.id, feed.id)).median![0]).toBeCloseTo(chlorophyllOfRatio(1, oc4), 6)
    // Without one of its bands the layer goes, and its view with it.
    await last.reload()
    await deleteFile(context, person, last.id)
    await runJobs(context)
    expect(await context.models.layers.count({ where: { feedId: feed.id } })).toBe(0)
    expect((await medians(region.id, feed.id)).day).toEqual([])
  })

  it('leaves out layers made of a suspect band, and takes them back in', async () => {
    const source = await aBandFeed(context, person, 443)
    const red = await aBandFeed(context, person, 510)
    const region = await aRegion(context, person)
    await send(context, await reflectanceFile([step('2026-06-09', blueWater), step('2026-06-10', greenWater)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    const layer = await context.models.layers.findOne({ where: { feedId: red.id, step: 1 }, rejectOnEmpty: true })
    await markSuspect(context, person, layer.id, { suspect: true, note: 'stripes' })
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual(['2026-06-09'])
    await markSuspect(context, person, layer.id, { suspect: false, note: '' })
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual(['2026-06-09', '2026-06-10'])
  })

  it('is replaced with the bands it is worked out from, and the lists of layers and the page of the file say so', async () => {
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    const older = await send(context, await reflectanceFile([step('2026-06-10', blueWater)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    const newer = await send(context, await reflectanceFile([step('2026-06-10', greenWater)]), { replaces: { fileId: older.id, wholly: true } })
    await runJobs(context)
    expect((await medians(region.id, feed.id)).median![0]).toBeCloseTo(chlorophyllOfRatio(1, oc4), 6)
    for (const { id } of [source, feed]) expect((await layerRows(context, { feedId: id }, null, 9)).map((row) => [row.fileId, row.replacedBy])).toEqual([[newer.id, null], [older.id, newer.id]])
    expect((await presentFile(context, older)).layers.map(({ replaced }) => replaced)).toEqual([true, true])
  })

  it('is worked out anew from a band that comes in a newer file of its own', async () => {
    for (const nm of [490, 510, 555]) await aBandFeed(context, person, nm)
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    const feed = await aDerivedFeed(context, person, source.id)
    const one = (nm: number, date: string, rrs: Spectrum, older?: { id: number }) =>
      reflectanceFile([step(date, rrs)], { bands: [nm], name: `rrs${nm}.nc` }).then((path) => send(context, path, { replaces: older ? { fileId: older.id, wholly: true } : null }))
    const replacers = async () => (await layerRows(context, { feedId: feed.id }, null, 9)).map((row) => row.replacedBy)
    for (const nm of [443, 490, 555]) await one(nm, '2026-06-10', greenWater)
    const first = await one(510, '2026-06-10', greenWater)
    await runJobs(context)
    const second = await one(510, '2026-06-10', { 510: 0.004 }, first)
    await runJobs(context)
    expect((await medians(region.id, feed.id)).median![0]).toBeCloseTo(chlorophyllOfRatio(2, oc4), 6)
    expect(await replacers()).toEqual([null])
    // A correction that is of another day leaves the layer without a band that counts, and it says by which file.
    const third = await one(510, '2026-06-09', greenWater, second)
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual([])
    expect(await replacers()).toEqual([third.id])
  })

  it('goes with the deleted file that held its bands', async () => {
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    const file = await send(context, await reflectanceFile([step('2026-06-10', greenWater)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    await file.reload()
    await deleteFile(context, person, file.id)
    await runJobs(context)
    expect((await medians(region.id, feed.id)).day).toEqual([])
    expect(await context.models.layers.count()).toBe(0)
  })

  it('is the first feed a region is given a rule for only when there is no measured chlorophyll', async () => {
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    await send(context, await reflectanceFile([step('2026-06-10', greenWater)]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    const rule = await context.models.rules.findOne({ where: { regionId: region.id }, rejectOnEmpty: true })
    expect(rule.feedId).toBe(feed.id)
  })
})

describe('a derived feed is refused with a sentence', () => {
  it('when a band it needs is missing', async () => {
    const source = await aBandFeed(context, person, 443)
    await send(context, await reflectanceFile([step('2026-06-10', blueWater)], { bands: [443, 490, 555] }))
    await runJobs(context)
    expect(await refusal({}, source.id)).toBe(
      'Chlorophyll by band ratio OC4 SeaWiFS, version 2019, needs reflectance at 443, 490, 510, 555 nm. Missing beside Reflectance 443: 510 nm.',
    )
    expect(await refusal({ formula: 'turbidity', formulaVersion: '2015' }, source.id)).toMatch(/Missing beside Reflectance 443: 645 nm, 859 nm/)
  })

  it('when two feeds have the band and none is named; naming one makes it', async () => {
    const source = await aBandFeed(context, person, 443)
    for (const nm of [490, 555]) await aBandFeed(context, person, nm)
    await aBandFeed(context, person, 510)
    const second = await aBandFeed(context, person, 510, { name: 'Second sensor 510' })
    expect(await refusal({}, source.id)).toBe('More than one feed has the band of 510 nm: Reflectance 510, Second sensor 510. Say which in derivedSources.')
    const others = await context.models.feeds.findAll({ where: { variable: ['Rrs_490', 'Rrs_555'] } })
    const feed = await aDerivedFeed(context, person, source.id, { derivedSources: [...others.map((one) => one.id), second.id] })
    expect(feed.derivedSources).toContain(second.id)
  })

  it('when formula, version or source are not what they should be', async () => {
    const source = await aBandFeed(context, person, 443)
    const chlorophyll = await aFeed(context, person)
    expect(await refusal({ formula: 'oc9' }, source.id)).toMatch(/^There is no formula oc9\. There are oc4-seawifs, /)
    expect(await refusal({ formula: 'oc4me', formulaVersion: '1' }, source.id)).toMatch(/^There is no formula oc4me/)
    expect(await refusal({ formulaVersion: '2031' }, source.id)).toBe('oc4-seawifs has no version 2031. It has 4, 6, 2019.')
    expect(await refusal({}, chlorophyll.id)).toBe('Chlorophyll is no feed of reflectance: formulas work on reflectances.')
    expect(await refusal({}, 999)).toBe('There is no feed to derive from.')
    expect(await refusal({ derivedSources: [chlorophyll.id] }, source.id)).toMatch(/is no feed of reflectance with the cadence of Reflectance 443/)
  })

  it('when half of it is said', () => {
    const issues = (body: Record<string, unknown>) => newFeed.safeParse(body).error?.issues.map(({ path, message }) => `${path.join('.')}: ${message}`) ?? []
    expect(issues({ name: 'X', derivedFrom: 3 })).toEqual(['formula: A derived feed needs it.', 'formulaVersion: A derived feed needs it.'])
    expect(issues({ name: 'X' })).toEqual(['quantity: A feed needs it.', 'variable: A feed needs it.', 'scale: A feed needs it.', 'unit: A feed needs it.'])
    expect(issues({ name: 'X', quantity: 'other', variable: 'v', unit: null, scale: 'linear', formula: 'mci' })).toEqual(['formula: Only a derived feed has it: say derivedFrom.'])
  })
})
