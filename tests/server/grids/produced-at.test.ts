import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { inspectGrid } from '../../../server/grids/inspect'
import { producedAt } from '../../../server/grids/produced-at'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'

const iso = (attributes: Record<string, unknown>) => {
  const instant = producedAt(attributes)
  return instant === null ? null : new Date(instant).toISOString()
}

describe('when a file was made', () => {
  it.each([
    [{ date_created: '2024-05-02T10:33:12.000Z' }, '2024-05-02T10:33:12.000Z'],
    [{ date_created: '20240502T103312Z' }, '2024-05-02T10:33:12.000Z'],
    [{ DATE_CREATED: '2024-05-02 12:33:12+02:00' }, '2024-05-02T10:33:12.000Z'],
    [{ creation_date: '2024-05-02 UTC', creation_time: '10:33:12 UTC' }, '2024-05-02T10:33:12.000Z'],
    [{ processing_time: '2024123103312000' }, '2024-05-02T10:33:12.000Z'],
    [{ date_created: '2024-05-02' }, '2024-05-02T00:00:00.000Z'],
    [{ date_created: '2024:05:02 10:33:12' }, '2024-05-02T10:33:12.000Z'],
  ])('%j says %s', (attributes, wanted) => expect(iso(attributes)).toBe(wanted))

  it('is the latest of its dates: a correction may keep the first', () => {
    expect(iso({ date_created: '2024-05-02T10:33:12Z', date_modified: '2024-05-09T01:00:00Z' })).toBe('2024-05-09T01:00:00.000Z')
  })

  it.each([{}, { date_created: 'last Tuesday' }, { date_created: '2024-13-45' }, { processing_time: '2024999103312000' }, { history: '2024-05-02' }])(
    '%j says nothing', (attributes) => expect(iso(attributes)).toBeNull())

  let folder: string
  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'offing-made-'))
  })
  afterAll(() => rm(folder, { recursive: true }))

  it('stands in the report of a NetCDF file, and of a TIFF file by its DateTime tag', async () => {
    const path = join(folder, 'made.nc')
    await writeNetcdf4(path, {
      latitudes: [1, 2], longitudes: [1, 2], times: [0], globalAttributes: { date_created: '2024-05-02T10:33:12Z' },
      variables: [{ name: 'chl', dtype: 'f4', data: Float64Array.of(1, 2, 3, 4), attributes: { units: 'mg m-3' } }],
    })
    expect((await inspectGrid(path, 'made.nc')).producedAt).toBe('2024-05-02T10:33:12.000Z')
    const tiff = await readFile(new URL('../../reference/grids/tiff-float32-nan.tif', import.meta.url))
    const at = tiff.readUInt32LE(4)
    const count = tiff.readUInt16LE(at)
    // A directory of its own at the end: the same tags and, at the place its number sorts to, tag 306.
    const entries = Array.from({ length: count }, (_, i) => tiff.subarray(at + 2 + i * 12, at + 14 + i * 12))
    const text = Buffer.from('2024:05:02 10:33:12\0')
    const tag = Buffer.alloc(12)
    tag.writeUInt16LE(306, 0)
    tag.writeUInt16LE(2, 2)
    tag.writeUInt32LE(text.length, 4)
    tag.writeUInt32LE(tiff.length, 8)
    const sorted = [...entries, tag].sort((a, b) => a.readUInt16LE(0) - b.readUInt16LE(0))
    const head = Buffer.alloc(2)
    head.writeUInt16LE(count + 1)
    const changed = Buffer.concat([tiff, text, head, ...sorted, Buffer.alloc(4)])
    changed.writeUInt32LE(tiff.length + text.length, 4)
    await writeFile(join(folder, 'made.tif'), changed)
    expect((await inspectGrid(join(folder, 'made.tif'), 'made.tif')).producedAt).toBe('2024-05-02T10:33:12.000Z')
  })
})
