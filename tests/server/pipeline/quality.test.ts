import { join } from 'node:path'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import { regionSeries } from '../../../server/desk/region-series'
import { standings } from '../../../server/desk/standing'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { changeFeed } from '../../../server/pipeline/feeds'
import { knownLayer, layerCell } from '../../../server/pipeline/layer-pictures'
import { presentFile } from '../../../server/pipeline/present-file'
import { proposeHiddenFlags } from '../../../server/pipeline/propose-flags'
import { aDerivedFeed, aBandFeed, greenWater, reflectanceFile } from '../../support/reflectance-sea'
import { aFeed, aPerson, aRegion, cleanSea, quietYears, runJobs, sea, seaFolder, seaFile, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

interface Wish {
  value?: (cell: number) => number
  flag?: (column: number) => number
  meanings?: string
  attributes?: Record<string, string>
  title?: string
  at?: string[]
}

/** Chlorophyll with a byte of flags: 1, 2 and 4 by column of the sea. */
async function flaggedFile({ value = () => 2, flag = () => 0, meanings = 'CLOUD BRIGHT GLINT', attributes = { units: 'mg m-3' }, title = 'sea', at = ['2026-06-10T12:00:00Z'] }: Wish): Promise<string> {
  const path = join(await seaFolder(), 'flagged.nc')
  const over = (f: (cell: number) => number) => Float64Array.from({ length: at.length * sea.cells }, (_, i) => f(i % sea.cells))
  await writeNetcdf4(path, {
    latitudes: sea.latitudes,
    longitudes: sea.longitudes,
    times: at.map((one) => Date.parse(one)),
    variables: [
      { name: 'chlor_a', dtype: 'f4', data: over(value), attributes: { ...attributes, ancillary_variables: 'quality' } },
      { name: 'quality', dtype: 'u1', data: over((cell) => flag(cell % 10)), attributes: { flag_masks: '1b, 2b, 4b', flag_meanings: meanings } },
    ],
    globalAttributes: { processing_version: 'R1', title },
    deflate: 1,
  })
  return path
}

const figures = async (regionId: number, feedId: number) => regionSeries(context, regionId, { feedId, columns: 'day,median,coverage', masked: 'true' })

describe('quality flags', () => {
  it('hide the cells of the meanings a feed chose, and no others; the area of each reason is kept', async () => {
    const feed = await aFeed(context, person, { hiddenFlags: ['CLOUD', 'BRIGHT'] })
    const region = await aRegion(context, person)
    // The region is columns 2 to 5: one cloud, one cloud and bright, one glint, one plain.
    const file = await send(context, await flaggedFile({ flag: (column) => [0, 0, 1, 3, 4, 0][column] ?? 0 }))
    await runJobs(context)
    const { columns, maskedByReason } = await figures(region.id, feed.id)
    expect(columns.coverage![0]).toBeCloseTo(0.5, 6)
    const quarter = maskedByReason!['BRIGHT']![0]!
    expect(quarter).toBeGreaterThan(100)
    expect(maskedByReason!['CLOUD']![0]! / quarter).toBeCloseTo(2, 2)
    expect(Object.keys(maskedByReason!)).toEqual(['BRIGHT', 'CLOUD'])
    await file.reload()
    const shown = (await presentFile(context, file)).report!.variables.find(({ name }) => name === 'chlor_a')!
    expect(shown.flags).toEqual([{ meaning: 'CLOUD', cells: 20 }, { meaning: 'BRIGHT', cells: 10 }, { meaning: 'GLINT', cells: 10 }])
    expect(shown.masked).toEqual([{ reason: 'CLOUD', cells: 20 }, { reason: 'BRIGHT', cells: 10 }])
    await feed.reload()
    expect(feed.flagMeanings).toEqual(['CLOUD', 'BRIGHT', 'GLINT'])
  })

  it('are not asked for reasons unless somebody asks', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await flaggedFile({ flag: () => 1 }))
    await runJobs(context)
    expect((await regionSeries(context, region.id, { feedId: feed.id })).maskedByReason).toBeUndefined()
    const { columns, maskedByReason } = await figures(region.id, feed.id)
    expect(columns.coverage![0]).toBeCloseTo(1, 9)
    expect(maskedByReason).toEqual({})
  })

  it('hide a cell in one layer, not in the view where another layer saw it', async () => {
    const feed = await aFeed(context, person, { hiddenFlags: ['CLOUD'] })
    const region = await aRegion(context, person)
    await send(context, await flaggedFile({ flag: () => 1, at: ['2026-06-10T11:00:00Z'] }))
    await send(context, await flaggedFile({ flag: (column) => (column < 4 ? 1 : 0), at: ['2026-06-10T12:30:00Z'] }))
    await runJobs(context)
    const { columns, maskedByReason } = await figures(region.id, feed.id)
    expect(columns.coverage![0]).toBeCloseTo(0.5, 6)
    expect(maskedByReason!['CLOUD']).toHaveLength(1)
  })

  it('are chosen anew: the history is read again, in points too', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await flaggedFile({ flag: (column) => (column < 4 ? 2 : 0) }))
    await runJobs(context)
    expect((await figures(region.id, feed.id)).columns.coverage![0]).toBeCloseTo(1, 9)
    await feed.reload()
    await changeFeed(context, person, feed.id, { version: feed.version, hiddenFlags: ['BRIGHT'] })
    await runJobs(context)
    const { columns, maskedByReason } = await figures(region.id, feed.id)
    expect(columns.coverage![0]).toBeCloseTo(0.5, 6)
    expect(Object.keys(maskedByReason!)).toEqual(['BRIGHT'])
    const layer = await context.models.layers.findOne({ where: { feedId: feed.id }, rejectOnEmpty: true })
    expect((await layerCell(context, await knownLayer(context, layer.id), 50.35, -11.75)).value).toBeNull()
    expect((await layerCell(context, await knownLayer(context, layer.id), 50.35, -11.55)).value).toBeCloseTo(2, 6)
  })

  it('are proposed where they mark land, cloud and failures; bright water is left for a person to say', async () => {
    expect(proposeHiddenFlags(['ATMFAIL', 'LAND', 'COCCOLITH', 'CLDICE', 'TURBIDW', 'cloud_shadow', 'no_cloud', 'cloud_free', 'good', 'sea_ice'])).toEqual(['ATMFAIL', 'LAND', 'CLDICE', 'cloud_shadow', 'sea_ice'])
    const file = await send(context, await flaggedFile({ meanings: 'LAND COCCOLITH CLDICE' }))
    await runJobs(context)
    await file.reload()
    expect(file.proposal).toMatchObject({ hiddenFlags: ['LAND', 'CLDICE'], flagMeanings: ['LAND', 'COCCOLITH', 'CLDICE'], gapFilled: false })
  })

  it('stand beside a reason of their own for values outside the valid range, of a derived feed too', async () => {
    const source = await aBandFeed(context, person, 443)
    const region = await aRegion(context, person)
    await send(context, await reflectanceFile([{ at: '2026-06-10T12:00:00Z', rrs: greenWater }]))
    await runJobs(context)
    const feed = await aDerivedFeed(context, person, source.id)
    await runJobs(context)
    await feed.reload()
    await changeFeed(context, person, feed.id, { version: feed.version, validMax: 1 })
    await runJobs(context)
    const { columns, maskedByReason } = await figures(region.id, feed.id)
    expect(columns.coverage).toEqual([0])
    expect(maskedByReason!['outside the valid range']![0]).toBeGreaterThan(400)
  })
})

describe('gap-filled cells', () => {
  it('are not seen where the file marks them', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    await send(context, await flaggedFile({ flag: (column) => (column < 4 ? 2 : 0), meanings: 'CLOUD gap_filled GLINT' }))
    await runJobs(context)
    const { columns, maskedByReason } = await figures(region.id, feed.id)
    expect(columns.coverage![0]).toBeCloseTo(0.5, 6)
    expect(Object.keys(maskedByReason!)).toEqual(['filled in, not seen'])
    await feed.reload()
    expect(feed.gapFilled).toBe(false)
  })

  it('that no file marks raise no alert: the region is not ready, with the reason', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const years = quietYears([2021, 2022, 2023, 2024, 2025], '05-20', 40)
    await send(context, await seaFile([...years, { at: '2026-06-09T12:00:00Z', value: 20 }, { at: '2026-06-10T12:00:00Z', value: 20 }]))
    await runJobs(context)
    expect((await standings(context, region.id)).get(region.id)!.state).toBe('unusual')
    await feed.reload()
    await changeFeed(context, person, feed.id, { version: feed.version, gapFilled: true })
    await runJobs(context)
    const standing = (await standings(context, region.id)).get(region.id)!
    expect(standing.state).toBe('not ready')
    expect(standing.because).toBe('Chlorophyll is gap-filled, and its files do not say which cells were seen: it cannot raise alerts.')
    expect(await context.models.events.count()).toBe(0)
  })

  it('make a feed say so by themselves when a file says it is gap-filled and not where', async () => {
    const feed = await aFeed(context, person)
    await aRegion(context, person)
    await send(context, await flaggedFile({ title: 'Daily gap-free chlorophyll' }))
    await runJobs(context)
    await feed.reload()
    expect(feed.gapFilled).toBe(true)
  })
})

describe('what a feed says of its numbers', () => {
  it('counts where the file names no unit', async () => {
    const feed = await aFeed(context, person, { fileUnit: 'kg m-3' })
    const region = await aRegion(context, person)
    await send(context, await flaggedFile({ attributes: {}, value: () => 0.000002 }))
    await runJobs(context)
    expect((await figures(region.id, feed.id)).columns.median![0]).toBeCloseTo(2, 6)
  })

  it('does not count where the file says its unit', async () => {
    const feed = await aFeed(context, person, { fileUnit: 'kg m-3' })
    const region = await aRegion(context, person)
    await send(context, await flaggedFile({ value: () => 2 }))
    await runJobs(context)
    expect((await figures(region.id, feed.id)).columns.median![0]).toBeCloseTo(2, 6)
  })

  it('turns base-10 logarithms into values, once', async () => {
    const feed = await aFeed(context, person, { storedLog10: true })
    const region = await aRegion(context, person)
    await send(context, await flaggedFile({ value: () => 0.5, at: ['2026-06-09T12:00:00Z'] }))
    await send(context, await flaggedFile({ value: () => 0.5, attributes: { units: 'log10(mg m-3)' } }))
    await runJobs(context)
    const { columns } = await figures(region.id, feed.id)
    expect(columns.day).toEqual(['2026-06-09', '2026-06-10'])
    for (const median of columns.median!) expect(median).toBeCloseTo(10 ** 0.5, 5)
  })

  it('is refused when no conversion is known, and when the valid range is turned round', async () => {
    await expect(aFeed(context, person, { fileUnit: 'furlong' })).rejects.toThrow('Offing knows no conversion from "furlong" to mg m-3.')
    const feed = await aFeed(context, person, { validMin: 1 })
    await expect(changeFeed(context, person, feed.id, { version: 1, validMax: 0.5 })).rejects.toThrow('The valid range ends before it begins.')
    await expect(changeFeed(context, person, feed.id, { version: 1, fileUnit: 'K' })).rejects.toThrow(/no conversion from "K"/)
  })
})
