import { join } from 'node:path'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import { writeGeotiff } from '../../../server/grids/write/geotiff'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import type { FileRecord } from '../../../server/models/file'
import { changeFeed, createFeed } from '../../../server/pipeline/feeds'
import type { Arrival } from '../../../server/pipeline/receive-file'
import { newFeed } from '../../../shared/schemas/feeds'
import { aBandFeed, aDerivedFeed } from '../../support/reflectance-sea'
import { aFeed, aPerson, aRegion, cleanSea, runJobs, sea, seaFolder, send } from '../../support/sea'
import { regionSeries } from '../../../server/desk/region-series'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

type Held = Record<string, { units?: string; long_name?: string; standard_name?: string }>

async function fileOf(held: Held, { value = 2, name = 'sea-20260610.nc', said = { processing_version: 'R1' } }: { value?: number; name?: string; said?: Record<string, string> } = {}): Promise<string> {
  const path = join(await seaFolder(), name)
  await writeNetcdf4(path, {
    latitudes: sea.latitudes,
    longitudes: sea.longitudes,
    times: [Date.parse('2026-06-10T12:00:00Z')],
    variables: Object.entries(held).map(([variable, attributes]) => ({ name: variable, dtype: 'f4', data: new Float64Array(sea.cells).fill(value), attributes: { ...attributes } })),
    globalAttributes: said,
    deflate: 1,
  })
  return path
}

async function taken(path: string, wish: Partial<Arrival> = {}): Promise<FileRecord> {
  const file = await send(context, path, wish)
  await runJobs(context)
  return file.reload()
}

const pattern = { fileNamePattern: 'sea-{yyyy}{MM}{dd}.nc' }
const noUnit = (variable: string) => `${variable} may be meant for the feed Chlorophyll, but its numbers have no unit; say the unit of the file’s numbers on the feed.`

describe('a lone variable of another name', () => {
  it.each([
    [{ chlor_a_rmsd: { units: 'mg m-3' } }],
    [{ chlor_a_bias: {} }],
    [{ Rrs_443: { units: 'sr-1' } }],
  ] as [Held][])('that is known not to be the feed’s is not taken by the name of the file: %j', async (held) => {
    await aFeed(context, person, { ...pattern, fileUnit: 'mg m-3' })
    const file = await taken(await fileOf(held))
    expect(file.status).toBe('waiting')
    expect(await context.models.layers.count()).toBe(0)
  })

  it('is refused where the file was sent to the feed and holds the error of another variable', async () => {
    const feed = await aFeed(context, person)
    const file = await taken(await fileOf({ chlor_a_rmsd: { units: 'mg m-3' } }), { feedId: feed.id })
    expect(file).toMatchObject({ status: 'refused', refusal: { code: 'not-this-feed' } })
  })

  it.each(['by its pattern', 'by its number'])('waits without a unit until the feed, found %s, says the unit of its files', async (how) => {
    const feed = await aFeed(context, person, pattern)
    const file = await taken(await fileOf({ sst: {} }), how === 'by its number' ? { feedId: feed.id } : {})
    expect(file).toMatchObject({ status: 'waiting', waitingFor: noUnit('sst') })
    if (how === 'by its pattern') expect(file.report!.missed!.map((one) => one.why)).toEqual(['reads chlor_a in mg m-3; this file has sst without a unit. Say the unit of the file’s numbers on the feed.'])
    expect(await context.models.layers.count()).toBe(0)
  })

  it('is taken without a unit where the feed says the unit of its files', async () => {
    await aFeed(context, person, { ...pattern, fileUnit: 'mg m-3' })
    expect((await taken(await fileOf({ green: {} }))).status).toBe('processed')
  })

  it('is not taken for logarithms because those of the feed are', async () => {
    await aFeed(context, person, { ...pattern, variable: 'log10_chl', storedLog10: true })
    expect((await taken(await fileOf({ chl: { units: 'mg m-3' } }))).status).toBe('waiting')
  })

  it('is not taken for a band of another wavelength', async () => {
    const feed = await aFeed(context, person, { quantity: 'reflectance', variable: 'Rrs_443', unit: 'sr-1', scale: 'linear' })
    expect((await taken(await fileOf({ Rrs_555: { units: 'sr-1' } }), { feedId: feed.id })).status).toBe('refused')
  })
})

describe('a variable of the feed’s own name without a unit', () => {
  it('waits until the feed says the unit of its files, though another of the file serves a feed', async () => {
    await aFeed(context, person)
    await aFeed(context, person, { name: 'Warmth', quantity: 'other', variable: 'sst', unit: 'K', scale: 'linear' })
    const file = await taken(await fileOf({ chlor_a: {}, sst: { units: 'K' } }))
    expect(file).toMatchObject({ status: 'waiting', waitingFor: noUnit('chlor_a') })
    expect(await context.models.layers.count()).toBe(0)
  })

  it('is taken by a feed that has no unit', async () => {
    await aFeed(context, person, { quantity: 'other', variable: 'turbidity', unit: null, scale: 'linear' })
    expect((await taken(await fileOf({ turbidity: {} }))).status).toBe('processed')
  })

  it('is proposed with the unit its name makes likely, for a person to confirm; the next such file is taken then', async () => {
    const region = await aRegion(context, person)
    const first = await taken(await fileOf({ chlor_a: {} }))
    expect(first.proposal).toMatchObject({ quantity: 'chlorophyll', variable: 'chlor_a', unit: 'mg m-3', fileUnit: 'mg m-3', scale: 'log10' })
    const feed = await createFeed(context, person, newFeed.parse({ ...first.proposal, fileUnit: 'kg m-3', fileId: first.id }))
    await runJobs(context)
    expect((await first.reload()).status).toBe('processed')
    const { columns } = await regionSeries(context, region.id, { feedId: feed.id, columns: 'day,median' })
    expect(columns.median![0]).toBeCloseTo(2e6, 0)
    expect((await taken(await fileOf({ chlor_a: {} }, { value: 3 }))).status).toBe('processed')
  })

  it('is taken by a feed confirmed from such a file: that says the unit, and goes for the next picture too', async () => {
    const picture = async (day: string) => {
      const path = join(await seaFolder(), `chl_${day}.tif`)
      await writeGeotiff(path, { rows: 10, columns: 10, west: -12, north: 51, lonStep: 0.1, latStep: 0.1, values: new Float64Array(100).fill(Number(day.slice(-2))) })
      return path
    }
    const first = await taken(await picture('20260609'))
    expect(first.proposal).toMatchObject({ variable: 'band 1', unit: null, fileNamePattern: 'chl_{yyyy}{MM}{dd}.tif' })
    const feed = await createFeed(context, person, newFeed.parse({ ...first.proposal, name: 'Pictures', quantity: 'chlorophyll', unit: 'mg m-3', scale: 'log10', fileId: first.id }))
    expect(feed.fileUnit).toBe('mg m-3')
    await runJobs(context)
    expect((await first.reload()).status).toBe('processed')
    expect((await taken(await picture('20260610'))).status).toBe('processed')
  })
})

describe('a variable named like a logarithm', () => {
  it.each([['log10_chl', '1'], ['log10_chl', 'log10(mg m-3)'], ['chl_log10', undefined], ['lg_chl', undefined]])(
    '%s in %s is proposed as chlorophyll stored as log10, and read as values once it is confirmed',
    async (variable, units) => {
      const region = await aRegion(context, person)
      const file = await taken(await fileOf({ [variable]: units === undefined ? {} : { units } }, { value: 0.5 }))
      expect(file.proposal).toMatchObject({ quantity: 'chlorophyll', variable, unit: 'mg m-3', scale: 'log10', storedLog10: true })
      expect(file.report!.variables[0]!.conversion).toContain('stored as base-10 logarithm')
      const feed = await createFeed(context, person, newFeed.parse({ ...file.proposal, fileId: file.id }))
      await runJobs(context)
      expect((await file.reload()).status).toBe('processed')
      const { columns } = await regionSeries(context, region.id, { feedId: feed.id, columns: 'day,median' })
      // Common tables give 10^0.5 = 3.16228.
      expect(columns.median![0]).toBeCloseTo(3.16228, 4)
    },
  )
})

describe('what the producer says of a file', () => {
  it('is proposed: its version and that it is reprocessed', async () => {
    const said = { product_version: '6.0', title: 'Chlorophyll, reprocessed' }
    expect((await taken(await fileOf({ chlor_a: { units: 'mg m-3' } }, { said }))).proposal).toMatchObject({ stage: 'reprocessed', processingVersion: '6.0' })
  })

  it('is near-real-time and version 1 where it says nothing', async () => {
    expect((await taken(await fileOf({ chlor_a: { units: 'mg m-3' } }, { said: {} }))).proposal).toMatchObject({ stage: 'near-real-time', processingVersion: '1' })
  })
})

describe('a feed that is changed', () => {
  it('has a new cadence, and so has what is worked out from it; a derived feed alone has none of its own', async () => {
    const feed = await aBandFeed(context, person, 490)
    await aBandFeed(context, person, 443)
    await aBandFeed(context, person, 510)
    await aBandFeed(context, person, 555)
    const derived = await aDerivedFeed(context, person, feed.id)
    await changeFeed(context, person, feed.id, { version: feed.version, cadence: '8-day' })
    expect([(await feed.reload()).cadence, (await derived.reload()).cadence]).toEqual(['8-day', '8-day'])
    await expect(changeFeed(context, person, derived.id, { version: derived.version, cadence: 'daily' })).rejects.toThrow('A derived feed has the cadence of the feed it is derived from.')
  })

  it('takes the waiting files whose name fits its new pattern', async () => {
    const feed = await aFeed(context, person, { fileNamePattern: 'other-{yyyy}{MM}{dd}.nc' })
    const file = await taken(await fileOf({ chlor_a: { units: 'mg m-3' } }))
    expect(file.status).toBe('waiting')
    await changeFeed(context, person, feed.id, { version: feed.version, ...pattern })
    await runJobs(context)
    expect((await file.reload()).status).toBe('processed')
  })

  it('takes the waiting files whose unit it says now, each number in that unit', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const file = await taken(await fileOf({ chlor_a: {} }, { value: 0.000002 }))
    expect(file.status).toBe('waiting')
    await changeFeed(context, person, feed.id, { version: feed.version, fileUnit: 'kg m-3' })
    await runJobs(context)
    expect((await file.reload()).status).toBe('processed')
    expect((await regionSeries(context, region.id, { feedId: feed.id, columns: 'day,median' })).columns.median![0]).toBeCloseTo(2, 6)
  })
})
