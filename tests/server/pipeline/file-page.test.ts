import { join } from 'node:path'
import sharp from 'sharp'
import request from 'supertest'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import type { GridFileVariable } from '../../../server/grids/write/grid-file'
import { writeGeotiff } from '../../../server/grids/write/geotiff'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { presentFile } from '../../../server/pipeline/present-file'
import type { FileRecord } from '../../../server/models/file'
import { bearer, aUser } from '../../support/people'
import { greenWater, reflectanceFile } from '../../support/reflectance-sea'
import { aFeed, aPerson, aRegion, cleanSea, runJobs, sea, seaFile, seaFolder, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

const at = '2026-06-10T12:00:00Z'
const standardName = 'mass_concentration_of_chlorophyll_a_in_sea_water'
const field = (name: string, attributes: Record<string, string>, value = 1): GridFileVariable => ({ name, dtype: 'f4', data: new Float64Array(sea.cells).fill(value), attributes })

async function fileOf(variables: GridFileVariable[], name = 'kinds.nc'): Promise<string> {
  const path = join(await seaFolder(), name)
  await writeNetcdf4(path, { latitudes: sea.latitudes, longitudes: sea.longitudes, times: [Date.parse(at)], variables, globalAttributes: { processing_version: 'R1' }, deflate: 1 })
  return path
}

async function taken(path: string, wish: Parameters<typeof send>[2] = {}): Promise<FileRecord> {
  const file = await send(context, path, wish)
  await runJobs(context)
  await file.reload()
  return file
}

describe('the proposal of a file', () => {
  it('is of the quantity, never of its error, bias, uncertainty, count or flags', async () => {
    const file = await taken(
      await fileOf([
        field('chlor_a_rmsd', { units: 'mg m-3' }),
        field('CHL_error', { units: 'mg m-3' }),
        field('chl_bias', { units: 'mg m-3' }),
        field('chl_count', { units: 'mg m-3' }),
        field('pigment', { units: 'mg m-3', standard_name: `${standardName} standard_error` }),
        field('CHL', { units: 'mg m-3', standard_name: standardName }),
      ]),
    )
    expect(file.proposal).toMatchObject({ variable: 'CHL', quantity: 'chlorophyll' })
    const shown = await presentFile(context, file)
    expect(shown.others).toEqual([])
    expect(shown.report!.variables.filter((one) => one.tellsOfAnother).map((one) => one.name)).toEqual(['chlor_a_rmsd', 'CHL_error', 'chl_bias', 'chl_count', 'pigment'])
  })

  it.each([
    ['chlor_a_rmsd', {}], ['CHL_error', {}], ['chl_bias', {}], ['chl_count', {}], ['pigment', { standard_name: `${standardName} standard_error` }],
    ['obs', { long_name: 'Number of observations' }], ['quality', { flag_meanings: 'CLOUD', flag_masks: '1b' }],
  ])('is none for a file with nothing but %s, and says so', async (name, attributes) => {
    const file = await taken(await fileOf([field(name, { units: 'mg m-3', ...attributes })]))
    expect(file.status).toBe('waiting')
    expect(file.proposal).toBeNull()
    expect(file.waitingFor).toBe('It fits no feed, and none is proposed: it holds only the errors, counts or flags of other variables.')
  })

  it('is of the only quantity beside its error, though nobody told Offing of it', async () => {
    const file = await taken(await fileOf([field('turbidity', { units: 'FNU' }), field('turbidity_error', { units: '%' })]))
    expect(file.proposal).toMatchObject({ variable: 'turbidity', unit: 'FNU', quantity: 'other', scale: 'linear' })
  })

  it('says how many regions its grid meets, those outside left out', async () => {
    await aRegion(context, person)
    await aRegion(context, person, { name: 'Far Off', geometry: { type: 'Polygon', coordinates: [[[-40, 30], [-39, 30], [-39, 31], [-40, 31], [-40, 30]]] } })
    const file = await taken(await seaFile([{ at, value: 2 }]))
    expect((await presentFile(context, file)).wouldGive).toEqual({ regions: [{ id: expect.any(Number), name: 'Quiet Water' }], ofRegions: 2 })
  })
})

describe('bands of reflectance', () => {
  it('are proposed together, confirmed at once, and the file is read once by all of them', async () => {
    await aRegion(context, person)
    const file = await taken(await reflectanceFile([{ at, rrs: greenWater }]))
    const shown = await presentFile(context, file)
    const proposals = [shown.proposal!, ...shown.others]
    expect(proposals.map((one) => [one.variable, one.name])).toEqual([443, 490, 510, 555, 670].map((nm) => [`Rrs_${nm}`, `Reflectance ${nm} nm, daily`]))

    const authorization = await bearer(context, await aUser(context, { roles: ['analyst'] }))
    const chosen = proposals.filter((one) => one.variable !== 'Rrs_510')
    const reply = await request(context.app).post(`/api/files/${file.id}/feeds`).set('Authorization', authorization).send({ feeds: chosen })
    expect(reply.status).toBe(201)
    expect(reply.body.items.map((feed: { name: string }) => feed.name)).toEqual(chosen.map((one) => one.name))
    const jobs = await context.models.jobs.count({ where: { kind: 'process-file', jobKey: String(file.id), state: 'waiting' } })
    expect(jobs).toBe(1)
    await runJobs(context)
    await file.reload()
    expect(file.status).toBe('processed')
    expect(file.report!.feeds.map((one) => one.variable)).toEqual(['Rrs_443', 'Rrs_490', 'Rrs_555', 'Rrs_670'])
    expect(await context.models.layers.count({ where: { fileId: file.id } })).toBe(4)
  })

  it('are made all or none: a name taken twice makes no feed, and the file goes on waiting', async () => {
    const file = await taken(await reflectanceFile([{ at, rrs: greenWater }]))
    const { proposal, others } = await presentFile(context, file)
    const authorization = await bearer(context, await aUser(context, { roles: ['analyst'] }))
    const reply = await request(context.app).post(`/api/files/${file.id}/feeds`).set('Authorization', authorization).send({ feeds: [proposal, { ...others[0], name: proposal!.name }] })
    expect(reply.status).toBe(409)
    expect(reply.body.error.message).toContain('exists already')
    expect(await context.models.feeds.count()).toBe(0)
    await file.reload()
    expect(file.status).toBe('waiting')
  })

  it('are not made of a file that does not wait, nor of none', async () => {
    const feed = await aFeed(context, person)
    const file = await taken(await seaFile([{ at, value: 2 }]))
    const authorization = await bearer(context, await aUser(context, { roles: ['analyst'] }))
    const post = (id: number) =>
      request(context.app).post(`/api/files/${id}/feeds`).set('Authorization', authorization).send({ feeds: [{ name: 'Other', quantity: 'chlorophyll', variable: feed.variable, unit: 'mg m-3', scale: 'log10' }] })
    expect((await post(file.id)).status).toBe(409)
    expect((await post(98765)).status).toBe(404)
    expect(await context.models.feeds.count()).toBe(1)
  })
})

describe('a file that waits', () => {
  it('says what each feed would have needed', async () => {
    await aFeed(context, person, { name: 'Chlorophyll, daily' })
    await aFeed(context, person, { name: 'Second sensor', fileNamePattern: 'second-*.nc' })
    await aFeed(context, person, { name: 'Temperature', quantity: 'other', variable: 'sst', unit: 'K', scale: 'linear' })
    const file = await taken(await fileOf([field('CHL', { units: 'mg m-3' }), field('CHL_error', { units: '%' })]))
    expect(file.report!.missed!.map(({ feed, why }) => `${feed} ${why}`)).toEqual([
      'Chlorophyll, daily reads chlor_a in mg m-3; this file has CHL in mg m-3.',
      'Second sensor takes files named second-*.nc, and kinds.nc is not.',
      'Temperature reads sst in K; this file has CHL in mg m-3.',
    ])
  })

  it('because two feeds read the same says which, and proposes no third', async () => {
    await aFeed(context, person, { name: 'One' })
    await aFeed(context, person, { name: 'Two' })
    const file = await taken(await seaFile([{ at, value: 2 }]))
    expect(file.waitingFor).toBe('chlor_a fits more than one feed: One, Two. Say which one it belongs to.')
    expect(file.proposal).toBeNull()
  })

  it('can be looked at before anything is confirmed, without the cells that would be hidden', async () => {
    const path = join(await seaFolder(), 'look.nc')
    await writeNetcdf4(path, {
      latitudes: sea.latitudes, longitudes: sea.longitudes, times: [Date.parse(at)], deflate: 1,
      variables: [
        { name: 'chlor_a', dtype: 'f4', data: new Float64Array(sea.cells).fill(1), attributes: { units: 'mg m-3', ancillary_variables: 'quality' } },
        { name: 'quality', dtype: 'u1', data: Float64Array.from({ length: sea.cells }, (_, i) => (i % 10 < 5 ? 1 : 0)), attributes: { flag_masks: '1b', flag_meanings: 'CLOUD' } },
      ],
    })
    const file = await taken(path)
    const authorization = await bearer(context, await aUser(context, { roles: ['researcher'] }))
    // At zoom 4 the sea lies in one tile, 22.5W to 0 and 41N to 55.8N.
    const tile = (query: string) => request(context.app).get(`/api/files/${file.id}/tiles/4/7/5.png?${query}`).set('Authorization', authorization)
    const opaque = async (query: string) => {
      const reply = await tile(query).buffer(true)
      expect(reply.status).toBe(200)
      const { data } = await sharp(reply.body as Buffer).raw().toBuffer({ resolveWithObject: true })
      return data.filter((_, i) => i % 4 === 3 && data[i] === 255).length
    }
    const all = await opaque('variable=chlor_a')
    const half = await opaque('variable=chlor_a&hidden=CLOUD')
    expect(half / all).toBeCloseTo(0.5, 1)
    const first = await tile('variable=chlor_a')
    expect((await tile('variable=chlor_a').set('If-None-Match', first.headers['etag'] as string)).status).toBe(304)
    expect((await tile('variable=nosuch')).status).toBe(404)
    expect((await request(context.app).get(`/api/files/${file.id}/tiles/3/99/1.png?variable=chlor_a`).set('Authorization', authorization)).status).toBe(404)
  })
})

describe('a time the file does not have', () => {
  const raster = async () => {
    const path = join(await seaFolder(), 'sea.tif')
    await writeGeotiff(path, { rows: 10, columns: 10, west: -12, north: 51, lonStep: 0.1, latStep: 0.1, values: new Float64Array(100).fill(2), description: 'chlor_a', unit: 'mg m-3' })
    return path
  }

  it.each([['pull', 'the address'], ['upload', 'the form']] as const)('given by a %s came from %s', async (origin, from) => {
    await aFeed(context, person)
    const file = await taken(await raster(), { origin, observedAt: Date.parse(at) })
    expect(file.status).toBe('processed')
    expect(file.report!.feeds).toEqual([expect.objectContaining({ variable: 'chlor_a', layers: 1, timeFrom: from })])
  })
})
