import { afterAll, afterEach, beforeEach, describe, expect, it } from 'vitest'
import { regionSeries } from '../../../server/desk/region-series'
import { aFeed, aPerson, aRegion, cleanSea, runJobs, seaFile, send } from '../../support/sea'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
beforeEach(async () => {
  context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
})
afterEach(() => context.close())
afterAll(cleanSea)

describe('a granule over one half of a region', () => {
  it('covers one half of it, on the first day and on those its kept weights are used for', async () => {
    const person = await aPerson(context)
    const feed = await aFeed(context, person)
    // The grid ends at 12W.
    const half = await aRegion(context, person, { name: 'Half', geometry: { type: 'Polygon', coordinates: [[[-12.4, 50.2], [-11.6, 50.2], [-11.6, 50.6], [-12.4, 50.6], [-12.4, 50.2]]] } })
    const whole = await aRegion(context, person, { name: 'Whole' })
    for (const at of ['2026-06-09T12:00:00Z', '2026-06-10T12:00:00Z']) {
      await send(context, await seaFile([{ at, value: 2 }]))
      await runJobs(context)
    }
    const coverage = async (id: number) => (await regionSeries(context, id, { feedId: feed.id, columns: 'day,coverage' })).columns.coverage
    const found = await coverage(half.id)
    expect(found).toHaveLength(2)
    for (const one of found!) expect(one).toBeCloseTo(0.5, 6)
    expect(await coverage(whole.id)).toEqual([1, 1])
  })
})
