import { join } from 'node:path'
import { afterAll, describe, expect, it } from 'vitest'
import { regionSeries } from '../../server/desk/region-series'
import { writeNetcdf4 } from '../../server/grids/write/netcdf4'
import { maskBits } from '../../server/pipeline/masks/mask-in-force'
import { presentMasks } from '../../server/pipeline/masks/present-masks'
import { putInForce } from '../../server/pipeline/masks/put-in-force'
import { queueMask } from '../../server/pipeline/masks/queue-mask'
import { newMask } from '../../shared/schemas/masks'
import { bitAt } from '../../shared/science/water-mask'
import { aFeed, aPerson, aRegion, cleanSea, runJobs, seaFolder, send } from '../support/sea'
import { createTestContext } from '../support/test-context'
import numpy from './values/water-mask.json'

afterAll(cleanSea)

const { rows, columns, layers } = numpy
const isValid = (layer: number, cell: number) => (31 * layer + 17 * cell + layer * cell) % 101 < cell % 23

async function stack(): Promise<string> {
  const path = join(await seaFolder(), 'stack.nc')
  const cells = rows * columns
  await writeNetcdf4(path, {
    latitudes: Array.from({ length: rows }, (_, row) => 50.05 + row / 10),
    longitudes: Array.from({ length: columns }, (_, column) => -13.15 + column / 10),
    times: Array.from({ length: layers }, (_, layer) => Date.parse('2025-01-01T12:00:00Z') + layer * 86_400_000),
    variables: [{ name: 'chlor_a', dtype: 'f4', data: Float64Array.from({ length: layers * cells }, (_, i) => (isValid(Math.floor(i / cells), i % cells) ? 1 : NaN)), attributes: { units: 'mg m-3' } }],
    globalAttributes: { processing_version: 'R1' },
    deflate: 1,
  })
  return path
}

describe('a water mask by valid share agrees with numpy', () => {
  it('in each cell, two of them valid in exactly 5 % of the layers, and in the coverage of regions', async () => {
    const context = await createTestContext({ at: new Date('2026-06-11T15:00:00Z') })
    try {
      const person = await aPerson(context)
      const feed = await aFeed(context, person)
      await send(context, await stack())
      const regions = await Promise.all(
        Object.entries(numpy.regions).map(async ([name, { box, ...expected }]) => {
          const [south, north, west, east] = box as [number, number, number, number]
          const geometry = { type: 'Polygon', coordinates: [[[west, south], [east, south], [east, north], [west, north], [west, south]]] }
          return { region: await aRegion(context, person, { name, geometry }), expected }
        }),
      )
      await runJobs(context)
      const { items } = await presentMasks(context, feed.id)
      await queueMask(context, person, feed.id, newMask.parse({ gridId: items[0]!.gridId, kind: 'valid share' }))
      await runJobs(context)
      const [mask, outline] = (await presentMasks(context, feed.id)).items[0]!.masks
      const bits = (await maskBits(context, mask!.id))!
      expect(Array.from(numpy.water, (_, cell) => bitAt(bits, cell))).toEqual(numpy.water)
      expect(numpy.exactly).toBe(2)
      await putInForce(context, person, mask!.id, { insteadOf: outline!.id })
      await runJobs(context)
      for (const { region, expected } of regions) {
        const { columns: found } = await regionSeries(context, region.id, { feedId: feed.id, columns: 'day,coverage' })
        const coverage = found.coverage!
        expect(coverage).toHaveLength(layers)
        for (const [i, day] of numpy.days.entries()) expect(Math.abs(coverage[day]! / expected.coverage[i]! - 1)).toBeLessThan(1e-9)
      }
    } finally {
      await context.close()
    }
  })
})
