import { readFile } from 'node:fs/promises'
import { join } from 'node:path'
import { fromArrayBuffer } from 'geotiff'
import { NetCDFReader } from 'netcdfjs'
import { describe, expect, it } from 'vitest'
import { openGridSource } from '../../../server/grids/read/open'

const folder = 'tests/reference/grids'

async function ours(name: string, variable: string, step = 0): Promise<Float64Array> {
  const source = await openGridSource(join(folder, name), name)
  try {
    const { rows, columns } = source.variables.find((one) => one.name === variable)!.grid
    return await source.readWindow(variable, step, { row: 0, column: 0, rows, columns })
  } finally {
    source.close()
  }
}

/** Values of both where ours has one, as float32 keeps them; at least some, or nothing was compared. */
function expectSame(own: Float64Array, other: ArrayLike<number>): void {
  expect(other.length).toBe(own.length)
  const seen = [...own.keys()].filter((i) => Number.isFinite(own[i]))
  expect(seen.length).toBeGreaterThan(10)
  for (const i of seen) expect(Math.abs(own[i]! - other[i]!)).toBeLessThanOrEqual(1e-6 * Math.abs(other[i]!))
}

describe('our readers and those of npm packages', () => {
  it.each(['classic-float.nc', 'classic-valid-min-max.nc'])('give the same values of %s (netcdfjs)', async (name) => {
    const reader = new NetCDFReader(await readFile(join(folder, name)))
    const stored = (reader.getDataVariable('chlor_a') as unknown as (number | number[])[]).flat()
    const listed = reader.variables.find((one) => one.name === 'chlor_a')!.attributes as { name: string; value: unknown }[]
    const attributes = new Map(listed.map((one) => [one.name, one.value]))
    const scale = Number(attributes.get('scale_factor') ?? 1)
    const offset = Number(attributes.get('add_offset') ?? 0)
    const own = await ours(name, 'chlor_a')
    expectSame(own, stored.slice(0, own.length).map((value) => value * scale + offset))
  })

  it.each(['tiff-float32-nan.tif', 'tiff-float32-deflate-predictor3-tiled.tif', 'tiff-int32-lzw.tif', 'tiff-utm32.tif'])(
    'give the same values of %s (geotiff)',
    async (name) => {
      const bytes = await readFile(join(folder, name))
      const tiff = await fromArrayBuffer(bytes.buffer.slice(bytes.byteOffset, bytes.byteOffset + bytes.byteLength) as ArrayBuffer)
      const image = await tiff.getImage()
      const [band] = (await image.readRasters()) as unknown as ArrayLike<number>[]
      const metadata = (await image.getGDALMetadata(0)) as { SCALE?: string; OFFSET?: string } | null
      const scale = Number(metadata?.SCALE ?? 1)
      const offset = Number(metadata?.OFFSET ?? 0)
      const source = await openGridSource(join(folder, name), name)
      const [variable] = source.variables
      source.close()
      expectSame(await ours(name, variable!.name), Array.from(band!, (value) => value * scale + offset))
    },
  )
})
