import { join } from 'node:path'
import sharp from 'sharp'
import request from 'supertest'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import { explainAlert } from '../../../server/desk/explain-alert'
import { regionSeries } from '../../../server/desk/region-series'
import { singleCells } from '../../../server/desk/single-cells'
import { isLand } from '../../../server/geography/land'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { runNextJob } from '../../../server/jobs/run-job'
import { steerJob } from '../../../server/jobs/steer-job'
import { deleteFile } from '../../../server/pipeline/delete-file'
import { maskBits } from '../../../server/pipeline/masks/mask-in-force'
import { maskChangeOf } from '../../../server/pipeline/masks/mask-change'
import { maskTile } from '../../../server/pipeline/masks/mask-tiles'
import { presentMasks } from '../../../server/pipeline/masks/present-masks'
import { putInForce } from '../../../server/pipeline/masks/put-in-force'
import { queueMask } from '../../../server/pipeline/masks/queue-mask'
import { markSuspect } from '../../../server/pipeline/mark-suspect'
import { maskInks } from '../../../shared/mask-picture'
import { bitAt } from '../../../shared/science/water-mask'
import { newMask, type GridMasks } from '../../../shared/schemas/masks'
import { aUser, bearer } from '../../support/people'
import { aFeed, aPerson, aRegion, cleanSea, quietYears, runJobs, seaFile, seaFolder, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

/**
 * Ten by ten cells of a hundredth of a degree in a haven that the 1:50 m outline takes for land: cell 0 is the south-west
 * one. Rows from the south.
 */
const haven = {
  latitudes: Array.from({ length: 10 }, (_, i) => 51.655 + i / 100),
  longitudes: Array.from({ length: 10 }, (_, i) => -5.095 + i / 100),
}
/** Whether each cell of the haven is water in the outline. */
const outlineHas = haven.latitudes.flatMap((latitude) => haven.longitudes.map((longitude) => !isLand(longitude, latitude)))
/** Four by four whole cells: rows 2 to 5, columns 2 to 5. */
const inner = { type: 'Polygon' as const, coordinates: [[[-5.08, 51.67], [-5.04, 51.67], [-5.04, 51.71], [-5.08, 51.71], [-5.08, 51.67]]] }
/** Open sea to the west of it, all water in the outline. */
const open = {
  latitudes: haven.latitudes,
  longitudes: Array.from({ length: 10 }, (_, i) => -6.095 + i / 100),
}
const inOpen = { type: 'Polygon' as const, coordinates: [[[-6.08, 51.67], [-6.04, 51.67], [-6.04, 51.71], [-6.08, 51.71], [-6.08, 51.67]]] }

interface Wish {
  from?: string
  days: number
  /** Whether a cell is valid on the nth day. */
  valid: (row: number, column: number, day: number) => boolean
  at?: typeof haven
  name?: string
  more?: Parameters<typeof writeNetcdf4>[1]['variables']
  attributes?: Record<string, string>
}

async function daysFile({ from = '2025-01-01', days, valid, at = haven, name = 'days.nc', more = [], attributes = {} }: Wish): Promise<string> {
  const path = join(await seaFolder(), name)
  const data = new Float64Array(days * 100)
  for (let day = 0; day < days; day++) for (let cell = 0; cell < 100; cell++) data[day * 100 + cell] = valid(Math.floor(cell / 10), cell % 10, day) ? 1 + cell / 100 : NaN
  await writeNetcdf4(path, {
    ...at,
    times: Array.from({ length: days }, (_, day) => Date.parse(`${from}T12:00:00Z`) + day * 86_400_000),
    variables: [{ name: 'chlor_a', dtype: 'f4', data, attributes: { units: 'mg m-3', ...attributes } }, ...more],
    globalAttributes: { processing_version: 'R1' },
    deflate: 1,
  })
  return path
}

const wish = (gridId: number, more: Record<string, unknown> = {}) => newMask.parse({ gridId, kind: 'valid share', from: '2025-01-01', to: '2025-12-31', ...more })

async function onlyGrid(feedId: number): Promise<GridMasks> {
  const { items } = await presentMasks(context, feedId)
  expect(items).toHaveLength(1)
  return items[0]!
}

async function make(feedId: number, more: Record<string, unknown> = {}): Promise<GridMasks> {
  await queueMask(context, person, feedId, wish((await onlyGrid(feedId)).gridId, more))
  await runJobs(context)
  return onlyGrid(feedId)
}

async function force(feedId: number, version: number): Promise<GridMasks> {
  const grid = await onlyGrid(feedId)
  const now = grid.masks.find((mask) => mask.inForce)!
  await putInForce(context, person, grid.masks.find((mask) => mask.version === version)!.id, { insteadOf: now.id })
  await runJobs(context)
  return onlyGrid(feedId)
}

async function waterCells(maskId: number): Promise<number[]> {
  const bits = (await maskBits(context, maskId))!
  return Array.from({ length: 100 }, (_, cell) => cell).filter((cell) => bitAt(bits, cell) === 1)
}

const coverage = async (regionId: number, feedId: number) => (await regionSeries(context, regionId, { feedId, columns: 'day,coverage' })).columns.coverage!

describe('a mask by valid share', () => {
  it('takes a haven for water that the outline takes for land, from a cell valid in exactly 5 % of the layers on', async () => {
    expect(isLand(-5.05, 51.7)).toBe(true)
    const feed = await aFeed(context, person)
    // Of 40 layers: column 0 never valid, column 1 once, column 2 twice, the rest always.
    await send(context, await daysFile({ days: 40, valid: (_, column, day) => column > 2 || day < column }))
    await runJobs(context)
    const { masks, making } = await make(feed.id)
    expect(making).toMatchObject({ kind: 'valid share', layers: 40, outcome: 'made', version: 2, job: { state: 'done', done: 40, total: 40 } })
    const [mask, outline] = masks
    expect(mask).toMatchObject({ version: 2, kind: 'valid share', inForce: false, from: '2025-01-01', to: '2025-12-31', minShare: 0.05, layers: 40, waterCells: 80, lost: outlineHas.filter((is, cell) => is && cell % 10 < 2).length, gained: outlineHas.filter((is, cell) => !is && cell % 10 >= 2).length, note: '', madeBy: person.name })
    expect(outline).toMatchObject({ version: 1, kind: 'land outline', inForce: true })
    expect(await waterCells(mask!.id)).toEqual(Array.from({ length: 100 }, (_, cell) => cell).filter((cell) => cell % 10 >= 2))
    expect(mask!.gained).toBeGreaterThan(50)
  })

  it('is what coverage is of: a cell never valid inside the outline’s water is not counted', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person, { geometry: inOpen })
    // Two columns of the region are never valid: the outline has them as water, so half of the region was never seen.
    await send(context, await daysFile({ days: 20, at: open, valid: (_, column) => column >= 4 }))
    await runJobs(context)
    expect((await coverage(region.id, feed.id))[0]).toBeCloseTo(0.5, 3)
    const made = await make(feed.id)
    expect(made.masks[0]).toMatchObject({ waterCells: 60, gained: 0, lost: 40 })
    expect((await coverage(region.id, feed.id))[0]).toBeCloseTo(0.5, 3)
    const change = await maskChangeOf(context, made.masks[0]!.id)
    expect(change).toMatchObject({ regionsInAll: 1, views: 20, runningEvents: 0, openAlerts: 0 })
    expect(change.regions[0]!.waterKm2Then / change.regions[0]!.waterKm2Now).toBeCloseTo(0.5, 3)
    await force(feed.id, 2)
    expect(new Set((await coverage(region.id, feed.id)).map((share) => share!.toFixed(9)))).toEqual(new Set(['1.000000000']))
    const kept = await context.db.all<{ kind: string; version: number; views: number }>(
      'SELECT m.kind, m.version, count(*) AS views FROM summaries s JOIN provenances p ON p.id = s.provenance_id JOIN masks m ON m.id = p.mask_id GROUP BY m.id',
    )
    expect(kept).toEqual([{ kind: 'valid share', version: 2, views: 20 }])
  })

  it('counts what the feed lets count: neither hidden nor out of range', async () => {
    const feed = await aFeed(context, person, { validMax: 1.495 })
    await send(context, await daysFile({ days: 20, valid: () => true }))
    await runJobs(context)
    expect((await make(feed.id)).masks[0]!.waterCells).toBe(50)
  })

  it('is the same, bit for bit, in whatever order the files came', async () => {
    const files = await Promise.all(
      Array.from({ length: 6 }, (_, i) =>
        daysFile({ from: `2025-0${i + 1}-01`, days: 7, name: `part-${i}.nc`, valid: (row, column, day) => (row * 31 + column * 17 + day * (column + i)) % 41 < column }),
      ),
    )
    const results: { checksum: string; cells: number[]; layersChecksum: string }[] = []
    for (const order of [[0, 1, 2, 3, 4, 5], [5, 3, 1, 4, 0, 2]]) {
      const feed = await aFeed(context, person, { name: `Order ${order.join('')}` })
      await Promise.all((await context.models.feeds.findAll()).filter(({ id }) => id !== feed.id).map((other) => context.db.write((tx) => other.update({ retired: true }, { transaction: tx }))))
      for (const i of order) {
        await send(context, files[i]!, { feedId: feed.id })
        await runJobs(context)
      }
      const [mask] = (await make(feed.id)).masks
      const row = await context.db.first<{ layersChecksum: string }>('SELECT layers_checksum AS layersChecksum FROM masks WHERE id = $id', { id: mask!.id })
      results.push({ checksum: mask!.checksum, cells: await waterCells(mask!.id), ...row! })
    }
    expect(results[0]!.cells.length).toBeGreaterThan(20)
    expect(results[0]!.cells.length).toBeLessThan(90)
    expect(results[1]).toEqual(results[0])
  })
})

describe('a mask once made', () => {
  it('is frozen: layers that come later in its period change nothing; made again it is the next version', async () => {
    const feed = await aFeed(context, person)
    await send(context, await daysFile({ days: 20, valid: (_, column) => column >= 5 }))
    await runJobs(context)
    const first = (await make(feed.id)).masks[0]!
    const cells = await waterCells(first.id)
    await send(context, await daysFile({ from: '2025-06-01', days: 20, name: 'late.nc', valid: () => true }))
    await runJobs(context)
    const later = (await onlyGrid(feed.id)).masks
    expect(later[0]).toEqual(first)
    expect(await waterCells(first.id)).toEqual(cells)
    const again = await make(feed.id)
    expect(again.masks.map(({ version, waterCells: count, layers }) => [version, count, layers])).toEqual([[3, 100, 40], [2, 50, 20], [1, null, null]])
  })

  it('is no new version when made again from the same layers, and that is said', async () => {
    const feed = await aFeed(context, person)
    await send(context, await daysFile({ days: 20, valid: (_, column) => column >= 5 }))
    await runJobs(context)
    await make(feed.id)
    const again = await make(feed.id)
    expect(again.masks.map(({ version }) => version)).toEqual([2, 1])
    expect(again.making).toMatchObject({ outcome: 'same', version: 2 })
    expect((await make(feed.id, { minShare: 0.5 })).masks.map(({ version }) => version)).toEqual([3, 2, 1])
  })

  it('goes into force and out again; figures and standing follow, and the audit keeps who did it', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person, { geometry: inner, inland: true })
    // Of the region only its column 5 is valid in most layers; column 4 in a single one.
    await send(context, await daysFile({ days: 40, valid: (_, column, day) => column === 5 || column > 5 || (column === 4 && day === 0) }))
    await runJobs(context)
    const before = await coverage(region.id, feed.id)
    expect((await singleCells(context, region.id, feed.id)).few).toBe(false)
    await make(feed.id)
    const forced = await force(feed.id, 2)
    expect(forced.masks.find(({ version }) => version === 2)).toMatchObject({ inForce: true, inForceBy: person.name, inForceSince: expect.stringMatching(/^2026-06-11T15:00/) })
    expect((await coverage(region.id, feed.id))[1]).toBeCloseTo(1, 9)
    // Four whole water cells by this mask: too few for percentiles.
    expect(await singleCells(context, region.id, feed.id)).toMatchObject({ few: true, wholeCells: 4 })
    const { columns } = await regionSeries(context, region.id, { feedId: feed.id, columns: 'day,median' })
    expect(new Set(columns.median)).toEqual(new Set([null]))
    const back = await force(feed.id, 1)
    expect(back.masks.map(({ inForce }) => inForce)).toEqual([false, true])
    expect(await coverage(region.id, feed.id)).toEqual(before)
    expect((await singleCells(context, region.id, feed.id)).few).toBe(false)
    const audited = await context.models.audit.findAll({ where: { subject: `feed ${feed.id}` }, order: [['id', 'ASC']] })
    expect(audited.filter(({ action }) => action.startsWith('mask:')).map(({ action, details }) => [action, details['mask'], details['insteadOf']])).toEqual([
      ['mask:make', 'valid share', undefined],
      ['mask:in-force', 'valid share, version 2', 'land outline, version 1'],
      ['mask:in-force', 'land outline, version 1', 'valid share, version 2'],
    ])
  })
})

describe('a region that a mask leaves without water', () => {
  it('counts all its cells, as it does by the outline', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person, { geometry: inOpen })
    await send(context, await daysFile({ days: 20, at: open, valid: (_, column) => column < 2 }))
    await send(context, await daysFile({ from: '2026-05-01', days: 1, name: 'now.nc', at: open, valid: (_, column) => column < 4 }))
    await runJobs(context)
    await make(feed.id)
    await force(feed.id, 2)
    expect((await coverage(region.id, feed.id)).at(-1)).toBeCloseTo(0.5, 3)
  })
})

describe('a mask that takes the ground from under an alert', () => {
  it('ends it with the mask named, sends no letter, and the alert can still be computed again by the mask it was raised by', async () => {
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person)
    const west = (_row: number, column: number) => (column < 4 ? 20 : NaN)
    const east = (_row: number, column: number) => (column < 4 ? NaN : 1)
    await send(context, await seaFile(Array.from({ length: 10 }, (_, i) => ({ at: `2020-01-${10 + i}T12:00:00Z`, value: east })), { name: 'east.nc' }))
    await send(context, await seaFile([...quietYears([2021, 2022, 2023, 2024, 2025], '05-20', 40), { at: '2026-06-09T12:00:00Z', value: west }, { at: '2026-06-10T12:00:00Z', value: west }]))
    await runJobs(context)
    const alert = await context.models.alerts.findOne({ where: { regionId: region.id }, rejectOnEmpty: true })
    expect(alert).toMatchObject({ state: 'open', phase: 'running' })
    expect(alert.evidence.waterMask).toBe('land outline, version 1')
    const letters = await context.models.letters.count()
    const made = await make(feed.id, { from: '2020-01-01', to: '2020-12-31' })
    expect(await maskChangeOf(context, made.masks[0]!.id)).toMatchObject({ runningEvents: 1, openAlerts: 1, regions: [{ id: region.id, allThen: false }] })
    await alert.reload()
    expect(alert.phase).toBe('running')
    await force(feed.id, 2)
    await alert.reload()
    expect(alert).toMatchObject({ state: 'open', phase: 'ended', eventId: null })
    const entries = await context.models.alertEntries.findAll({ where: { alertId: alert.id }, order: [['id', 'ASC']] })
    expect(entries.at(-1)).toMatchObject({ kind: 'rejudged', text: 'By the water mask now in force (valid share, version 2) the rule no longer finds an event here.' })
    expect(await context.models.letters.count()).toBe(letters)
    expect(await explainAlert(context, alert)).toMatchObject({ agrees: true, differences: [] })
  })
})

describe('a grid too large to be counted whole', () => {
  it('is counted where somebody watches, and elsewhere as the land outline has it, which the mask says', async () => {
    const side = 2100
    const path = join(await seaFolder(), 'large.nc')
    const data = new Float64Array(side * side).fill(NaN)
    // The region is rows and columns 1000 to 1019; its western half is valid, all else is not.
    for (let row = 1000; row < 1020; row++) data.fill(1, row * side + 1000, row * side + 1010)
    await writeNetcdf4(path, {
      latitudes: Array.from({ length: side }, (_, i) => 45 + (i + 0.5) / 500),
      longitudes: Array.from({ length: side }, (_, i) => -20 + (i + 0.5) / 500),
      times: [Date.parse('2025-06-01T12:00:00Z')],
      variables: [{ name: 'chlor_a', dtype: 'f4', data, attributes: { units: 'mg m-3' } }],
      globalAttributes: { processing_version: 'R1' },
      deflate: 1,
    })
    const feed = await aFeed(context, person)
    const region = await aRegion(context, person, { geometry: { type: 'Polygon', coordinates: [[[-18, 47], [-17.96, 47], [-17.96, 47.04], [-18, 47.04], [-18, 47]]] } })
    await send(context, path)
    await runJobs(context)
    expect((await coverage(region.id, feed.id))[0]).toBeCloseTo(0.5, 3)
    const { masks, watchedOnly } = await make(feed.id)
    expect(watchedOnly).toBe(true)
    const bits = (await maskBits(context, masks[0]!.id))!
    const at = (row: number, column: number) => bitAt(bits, row * side + column)
    expect([at(1005, 1005), at(1005, 1015), at(100, 100), at(2000, 1000)]).toEqual([1, 0, 1, 1])
    expect(masks[0]!.note).toBe(`The grid is too large to be counted whole: only tiles that hold a region were. ${side * side - 64 * 64} cells were not counted; there the mask is the land outline.`)
    await force(feed.id, 2)
    expect((await coverage(region.id, feed.id))[0]).toBeCloseTo(1, 9)
  })
})

describe('making a mask', () => {
  it('stops where somebody pauses it and goes on from there, with the same outcome', async () => {
    const feed = await aFeed(context, person)
    const valid = (row: number, column: number, day: number) => (row * 7 + column * 3 + day) % 23 < column / 4
    await send(context, await daysFile({ days: 150, valid }))
    await runJobs(context)
    const plain = (await make(feed.id)).masks[0]!
    await queueMask(context, person, feed.id, wish((await onlyGrid(feed.id)).gridId))
    const job = await context.models.jobs.findOne({ where: { kind: 'make-mask', state: 'waiting' }, rejectOnEmpty: true })
    const stop = context.news.listen(({ topic, id }) => {
      if (topic === 'jobs' && id === job.id && !paused) paused = job.reload().then(() => (job.done > 0 ? steerJob(context, person, job.id, 'pause') : (paused = undefined)))
    })
    let paused: Promise<unknown> | undefined
    await runNextJob(context)
    stop()
    await paused
    await job.reload()
    expect(job).toMatchObject({ state: 'paused', total: 150 })
    expect(job.done).toBeGreaterThan(0)
    expect(job.done).toBeLessThan(150)
    await steerJob(context, person, job.id, 'retry')
    await runJobs(context)
    expect((await onlyGrid(feed.id)).making).toMatchObject({ outcome: 'same', version: plain.version })
  })

  it('begins anew without a layer that was taken back before it was done', async () => {
    const feed = await aFeed(context, person)
    await send(context, await daysFile({ days: 20, name: 'good.nc', valid: (_, column) => column >= 5 }))
    const bad = await send(context, await daysFile({ from: '2025-03-01', days: 2, name: 'bad.nc', valid: () => true }))
    await runJobs(context)
    const { gridId } = await onlyGrid(feed.id)
    await queueMask(context, person, feed.id, wish(gridId, { minShare: 0.04 }))
    const layers = await context.models.layers.findAll({ where: { fileId: bad.id } })
    await markSuspect(context, person, layers[0]!.id, { suspect: true, note: '' })
    await deleteFile(context, person, bad.id)
    await runJobs(context)
    expect((await onlyGrid(feed.id)).masks[0]).toMatchObject({ layers: 20, waterCells: 50 })
  })

  it('goes by the full calendar years where no period is named, and says so where there is none', async () => {
    const feed = await aFeed(context, person)
    await send(context, await daysFile({ from: '2026-02-01', days: 3, valid: () => true }))
    await runJobs(context)
    const grid = await onlyGrid(feed.id)
    expect(grid.fullYears).toBeNull()
    const unnamed = newMask.parse({ gridId: grid.gridId, kind: 'valid share' })
    await expect(queueMask(context, person, feed.id, unnamed)).rejects.toThrow('There is no full calendar year of layers yet: name a period.')
    await send(context, await daysFile({ from: '2023-12-31', days: 2, name: 'old.nc', valid: () => true }))
    await runJobs(context)
    expect((await onlyGrid(feed.id)).fullYears).toEqual({ from: '2024-01-01', to: '2025-12-31' })
    await queueMask(context, person, feed.id, unnamed)
    await runJobs(context)
    expect((await onlyGrid(feed.id)).masks[0]).toMatchObject({ from: '2024-01-01', to: '2025-12-31', layers: 1 })
  })

  it('is refused in words: no layers in the period, a turned period, one being made already', async () => {
    const feed = await aFeed(context, person)
    await send(context, await daysFile({ days: 2, valid: () => true }))
    await runJobs(context)
    const { gridId } = await onlyGrid(feed.id)
    await expect(queueMask(context, person, feed.id, wish(gridId, { from: '2020-01-01', to: '2020-12-31' }))).rejects.toThrow('No trusted layer of Chlorophyll lies between 2020-01-01 and 2020-12-31.')
    await expect(queueMask(context, person, feed.id, wish(gridId, { kind: 'own' }))).rejects.toThrow('The files of Chlorophyll carry no land flag and no land or sea mask that Offing understands.')
    expect(newMask.safeParse({ gridId, kind: 'own', from: '2025-02-01', to: '2025-01-01' }).error?.issues[0]?.message).toBe('The period ends before it begins.')
    expect(newMask.safeParse({ gridId, kind: 'own', from: '2025-02-01' }).error?.issues[0]?.message).toBe('A period has a first and a last day.')
    await queueMask(context, person, feed.id, wish(gridId))
    await expect(queueMask(context, person, feed.id, wish(gridId))).rejects.toThrow('A water mask of Chlorophyll is being made already.')
  })
})

describe('a mask of the files’ own', () => {
  const land = (cell: number) => cell % 10 < 3
  const each = (days: number, f: (cell: number, day: number) => number) => Float64Array.from({ length: days * 100 }, (_, i) => f(i % 100, Math.floor(i / 100)))

  it('is what their land flag says, and cells without flags are as the outline has them', async () => {
    const feed = await aFeed(context, person)
    const flags = { name: 'quality', dtype: 'u1' as const, data: each(3, (cell) => (cell === 99 ? NaN : Number(land(cell)) * 2 + (cell % 2))), attributes: { flag_masks: '1b, 2b', flag_meanings: 'CLOUD LAND' } }
    await send(context, await daysFile({ days: 3, valid: () => true, more: [flags], attributes: { ancillary_variables: 'quality' } }))
    await runJobs(context)
    expect((await onlyGrid(feed.id)).own).toBe('the flag LAND of quality')
    const [mask] = (await make(feed.id, { kind: 'own' })).masks
    expect(mask).toMatchObject({ kind: 'own', minShare: null, layers: 3 })
    const cells = await waterCells(mask!.id)
    expect(cells.filter((cell) => cell !== 99)).toEqual(Array.from({ length: 99 }, (_, cell) => cell).filter((cell) => !land(cell)))
  })

  it.each([['land_binary_mask', 1], ['sea_binary_mask', 0]])('is what a variable named %s says', async (standardName, landIs) => {
    const feed = await aFeed(context, person)
    const lsm = { name: 'lsm', dtype: 'i2' as const, data: each(2, (cell) => (land(cell) ? landIs : 1 - landIs)), attributes: { standard_name: standardName, units: '1' } }
    await send(context, await daysFile({ days: 2, valid: () => true, more: [lsm] }), { feedId: feed.id })
    await runJobs(context)
    expect((await onlyGrid(feed.id)).own).toBe(`the variable lsm (${standardName})`)
    const [mask] = (await make(feed.id, { kind: 'own' })).masks
    expect(await waterCells(mask!.id)).toEqual(Array.from({ length: 100 }, (_, cell) => cell).filter((cell) => !land(cell)))
  })
})

describe('the picture of a mask', () => {
  it('shows water that the outline has as land, and land that it has as water, each stroked its own way', async () => {
    const feed = await aFeed(context, person)
    await send(context, await daysFile({ days: 20, valid: (_, column) => column >= 5 }))
    await runJobs(context)
    const [made, outline] = (await make(feed.id)).masks
    const inks = async (maskId: number, theme: 'light' | 'night') => {
      // The tile of zoom 10 that holds the whole haven.
      const { picture } = await maskTile(context, maskId, { z: 10, x: 497, y: 339, theme })
      const { data } = await sharp(Buffer.from((await picture())!)).raw().toBuffer({ resolveWithObject: true })
      const counts = new Map<string, number>()
      for (let i = 0; i < data.length; i += 4) if (data[i + 3] === 255) counts.set(`${data[i]} ${data[i + 1]} ${data[i + 2]}`, (counts.get(`${data[i]} ${data[i + 1]} ${data[i + 2]}`) ?? 0) + 1)
      return counts
    }
    for (const theme of ['light', 'night'] as const) {
      const { water, land, gained, lost } = maskInks[theme]
      const seen = await inks(made!.id, theme)
      // Two of six pixels are strokes.
      for (const [ground, wanted] of [[gained, made!.gained!], [lost, made!.lost!]] as const) {
        const strokes = seen.get(ground.stroke.join(' '))!
        expect(strokes / [...seen.values()].reduce((sum, count) => sum + count, 0)).toBeCloseTo(wanted / 300, 1)
      }
      expect([...(await inks(outline!.id, theme)).keys()].sort()).toEqual([water.fill.join(' '), land.fill.join(' ')].sort())
    }
  })
})

describe('over the interface', () => {
  it('an analyst makes a mask, an admin puts it in force, and who decided by an old sight of it is told', async () => {
    const feed = await aFeed(context, person)
    await send(context, await daysFile({ days: 20, valid: (_, column) => column >= 5 }))
    await runJobs(context)
    const { gridId, masks } = await onlyGrid(feed.id)
    const analyst = await bearer(context, await aUser(context, { roles: ['analyst'] }))
    const admin = await bearer(context, await aUser(context, { roles: ['admin'] }))
    const post = (path: string, who: string, body: object) => request(context.app).post(`/api${path}`).set('Authorization', who).send(body)
    const asked = await post(`/feeds/${feed.id}/masks`, analyst, { gridId, kind: 'valid share' }).expect(202)
    expect(asked.body.items[0].making).toMatchObject({ from: '2025-01-01', to: '2025-12-31', layers: 20, job: { state: 'waiting' }, outcome: null })
    await runJobs(context)
    const made = (await onlyGrid(feed.id)).masks[0]!
    await post(`/masks/${made.id}/in-force`, analyst, { insteadOf: masks[0]!.id }).expect(403)
    const forced = await post(`/masks/${made.id}/in-force`, admin, { insteadOf: masks[0]!.id }).expect(202)
    expect(forced.body.remaking).toMatchObject({ state: 'waiting', done: 0 })
    const stale = await post(`/masks/${masks[0]!.id}/in-force`, admin, { insteadOf: masks[0]!.id }).expect(409)
    expect(stale.body.error.code).toBe('stale-version')
    const twice = await post(`/masks/${made.id}/in-force`, admin, { insteadOf: made.id }).expect(409)
    expect(twice.body.error.message).toBe('This water mask is in force already.')
    const tile = await request(context.app).get(`/api/masks/${made.id}/tiles/9/248/169.png`).set('Authorization', analyst).expect(200)
    expect(tile.type).toBe('image/png')
    await request(context.app).get(`/api/masks/${made.id}/tiles/9/248/169.png`).set('Authorization', analyst).set('If-None-Match', tile.headers['etag'] as string).expect(304)
  })
})
