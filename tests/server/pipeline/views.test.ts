import { join } from 'node:path'
import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import type { Person } from '../../../server/accounts/person'
import { drawRegion } from '../../../server/desk/draw-region'
import { regionSeries } from '../../../server/desk/region-series'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { newRegion } from '../../../shared/schemas/regions'
import { aFeed, aPerson, cleanSea, runJobs, seaFolder, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: Person
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
  person = await aPerson(context)
})
afterEach(() => context.close())
afterAll(cleanSea)

interface Pass {
  at: string
  /** End of its period, of a composite. */
  until?: string
  value: (lon: number) => number
}

/** Ten rows of a tenth of a degree from 20N, forty columns of a tenth of a degree from `west` on. */
async function passFile(west: number, { at, until, value }: Pass): Promise<string> {
  const longitudes = Array.from({ length: 40 }, (_, i) => west + 0.05 + i / 10)
  const path = join(await seaFolder(), `pass-${at.replaceAll(':', '')}.nc`)
  await writeNetcdf4(path, {
    latitudes: Array.from({ length: 10 }, (_, i) => 20.05 + i / 10),
    longitudes,
    times: [Date.parse(at)],
    ...(until ? { timeBounds: [[Date.parse(at), Date.parse(until)]] as const } : {}),
    variables: [
      {
        name: 'chlor_a',
        dtype: 'f4',
        data: Float64Array.from({ length: 400 }, (_, cell) => value(longitudes[cell % 40]!)),
        attributes: { units: 'mg m-3', standard_name: 'mass_concentration_of_chlorophyll_a_in_sea_water' },
      },
    ],
    globalAttributes: { processing_version: 'R1' },
  })
  return path
}

async function views(west: number, ring: number[][], passes: readonly Pass[]) {
  const feed = await aFeed(context, person)
  const region = await drawRegion(context, person, newRegion.parse({ name: 'Water', timeZone: 'UTC', geometry: { type: 'Polygon', coordinates: [ring] } }))
  for (const pass of passes) {
    await send(context, await passFile(west, pass))
    await runJobs(context)
  }
  return (await regionSeries(context, region.id, { feedId: feed.id, columns: 'day,cells,valid,coverage,median,observedAt' })).columns
}

const box = (west: number, east: number) => [[west, 20.2], [east, 20.2], [east, 20.6], [west, 20.6], [west, 20.2]]
const eastOf = (edge: number, value: number) => (lon: number) => (lon > edge ? value : NaN)
const westOf = (edge: number, value: number) => (lon: number) => (lon < edge ? value : NaN)

describe('a view', () => {
  it('is made full by two half swaths of one day', async () => {
    const columns = await views(-40, box(-38.4, -37.6), [
      { at: '2026-06-10T13:10:00Z', value: westOf(-38, 2) },
      { at: '2026-06-10T14:50:00Z', value: eastOf(-38, 2) },
    ])
    expect(columns).toMatchObject({ day: ['2026-06-10'], cells: [32], valid: [32], coverage: [1], median: [2] })
  })

  it('is one of two passes an hour apart, on both sides of midnight in Greenwich, across the antimeridian', async () => {
    const passes = [
      { at: '2026-06-09T23:30:00Z', value: westOf(180, 1) },
      { at: '2026-06-10T00:30:00Z', value: eastOf(180, 4) },
    ]
    const columns = await views(178, box(179.65, 180.35), passes)
    // At 180 itself the sun's day is counted as east of the date line.
    expect(columns).toMatchObject({ day: ['2026-06-09'], cells: [32], valid: [32], coverage: [1], observedAt: ['2026-06-09T23:30:00.000Z'] })
  })

  it('across the antimeridian is the same with the outline and the grid spelt the other way', async () => {
    const columns = await views(-182, [[179.65, 20.2], [-179.65, 20.2], [-179.65, 20.6], [179.65, 20.6], [179.65, 20.2]], [
      { at: '2026-06-09T23:30:00Z', value: westOf(-180, 1) },
      { at: '2026-06-10T00:30:00Z', value: eastOf(-180, 4) },
    ])
    expect(columns).toMatchObject({ day: ['2026-06-09'], cells: [32], valid: [32], coverage: [1] })
  })

  it('is two where the sun has set between the passes', async () => {
    const columns = await views(-40, box(-38.4, -37.6), [
      { at: '2026-06-10T13:10:00Z', value: () => 1 },
      { at: '2026-06-11T03:00:00Z', value: () => 4 },
    ])
    expect(columns.day).toEqual(['2026-06-10', '2026-06-11'])
  })

  it('is one of overlapping composites, whichever came first, and of their whole period', async () => {
    const early = { at: '2026-05-09T00:00:00Z', until: '2026-05-17T00:00:00Z', value: westOf(-38, 3) }
    const late = { at: '2026-05-10T00:00:00Z', until: '2026-05-18T00:00:00Z', value: eastOf(-38, 3) }
    const columns = await views(-40, box(-38.4, -37.6), [late, early])
    expect(columns).toMatchObject({ day: ['2026-05-09'], valid: [32], coverage: [1], observedAt: ['2026-05-09T00:00:00.000Z'] })
    expect(await context.db.first('SELECT ends_at AS endsAt FROM summaries')).toEqual({ endsAt: Date.parse('2026-05-18T00:00:00Z') })
  })
})
