import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { writeNetcdf4 } from '../../../server/grids/write/netcdf4'
import { startWorkers, type Workers } from '../../../server/workers/workers'

const bundle = new URL('../../../dist/server/worker.js', import.meta.url).pathname
const damagedFiles = 50

let folder: string
let good: string
let workers: Workers
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-workers-'))
  good = join(folder, 'good.nc')
  await writeNetcdf4(good, {
    latitudes: Array.from({ length: 40 }, (_, i) => 50 + i / 10), longitudes: Array.from({ length: 50 }, (_, i) => 4 + i / 10),
    times: [Date.UTC(2024, 4, 1)], deflate: 6,
    variables: [{ name: 'chlor_a', dtype: 'f4', data: Float64Array.from({ length: 2000 }, (_, i) => 1 + Math.abs(Math.sin(i * i))), attributes: { units: 'mg m-3' } }],
  })
})
afterEach(() => workers.close())
afterAll(() => rm(folder, { recursive: true }))

const inspect = (path: string) => workers.heavy('inspectFile', { path, fileName: path.split('/').at(-1)! })
const openFiles = async () => (await readdir('/proc/self/fd')).length

/** The longest deflate stream of the file, its values, with some bytes changed. */
async function damaged(name: string): Promise<string> {
  const bytes = await readFile(good)
  const start = Math.max(bytes.lastIndexOf(Buffer.from([0x78, 0x5e])), bytes.lastIndexOf(Buffer.from([0x78, 0x9c])))
  bytes.fill(0xa5, start + 200, start + 400)
  const path = join(folder, name)
  await writeFile(path, bytes)
  return path
}

describe('workers that read files', () => {
  it('hold no file open after damaged ones, and read the next good one right', async () => {
    workers = startWorkers(bundle)
    const whole = await inspect(good)
    const path = await damaged('damaged.nc')
    await expect(inspect(path)).rejects.toMatchObject({ code: 'damaged' })
    await inspect(good)
    const before = await openFiles()
    for (let i = 0; i < damagedFiles; i++) {
      await expect(inspect(path)).rejects.toMatchObject({ name: 'LayerRefused', code: 'damaged', message: 'The file is damaged: chlor_a cannot be read back whole.' })
    }
    expect(await inspect(good)).toEqual(whole)
    expect(await openFiles()).toBeLessThanOrEqual(before)
  }, 300_000)

  it('hold no file open after ones whose structure cannot be opened', async () => {
    workers = startWorkers(bundle)
    await inspect(good)
    const path = join(folder, 'broken.nc')
    const bytes = await readFile(good)
    await writeFile(path, Buffer.concat([bytes.subarray(0, 48), Buffer.alloc(bytes.length, 7)]))
    const before = await openFiles()
    for (let i = 0; i < 10; i++) await expect(inspect(path)).rejects.toMatchObject({ code: 'damaged' })
    expect(await openFiles()).toBeLessThanOrEqual(before)
    expect((await inspect(good)).report.variables[0]!.valid).toBe(2000)
  }, 300_000)

  it('refuse a file that takes too long with code, sentence and facts, and go on', async () => {
    workers = startWorkers(bundle, { inspectFile: 0.01 })
    await expect(inspect(good)).rejects.toMatchObject({
      name: 'LayerRefused',
      code: 'reading-failed',
      message: 'Reading this file took longer than 0.01 s, so it was given up.',
      facts: { task: 'inspectFile', seconds: 0.01 },
    })
    expect(await workers.heavy('comparePassword', { password: 'a', hash: await workers.heavy('hashPassword', { password: 'a', cost: 4 }) })).toBe(true)
  }, 60_000)

  it('carry a fault of their own across, and go on', async () => {
    workers = startWorkers(bundle)
    await expect(workers.heavy('weighCells', { geometry: { type: 'Polygon', coordinates: [] }, shoreBufferKm: 0, grid: 'no grid' })).rejects.toThrow()
    expect((await inspect(good)).report.variables[0]!.valid).toBe(2000)
  }, 60_000)
})
