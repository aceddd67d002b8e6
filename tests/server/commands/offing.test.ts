import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { openDatabase } from '../../../server/db'
import { createFeed } from '../../../server/pipeline/feeds'
import { presentFile } from '../../../server/pipeline/present-file'
import { newFeed } from '../../../shared/schemas/feeds'
import { startScript } from '../../support/offing-process'
import { aFeed, aPerson, cleanSea, runJobs, seaFile, send } from '../../support/sea'
import { createTestContext, openTestContext } from '../../support/test-context'
import { createTestClock } from '../../support/test-clock'

const reference = new URL('../../reference/grids/', import.meta.url).pathname
let folder: string
let dataDir: string
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-command-'))
})
beforeEach(async () => {
  dataDir = await mkdtemp(join(folder, 'data-'))
})
afterAll(async () => {
  await rm(folder, { recursive: true })
  await cleanSea()
})

async function offing(...args: string[]): Promise<{ code: number | null; printed: string }> {
  const running = startScript('dist/server/offing.js', args, { PATH: process.env['PATH'] ?? '', DATA_DIR: dataDir })
  const { code } = await running.ended
  return { code, printed: running.printed() }
}

async function inDataDir<T>(use: (context: Awaited<ReturnType<typeof openTestContext>>) => Promise<T>): Promise<T> {
  const context = await openTestContext(dataDir, createTestClock(), null)
  try {
    return await use(context)
  } finally {
    await context.close()
  }
}

describe('npm run offing -- inspect', () => {
  it.each(['nc4-levels-and-flags.nc', 'classic-float.nc.gz', 'tiff-two-bands-by-band.tif'])('prints the report that the page of %s has', async (name) => {
    const context = await createTestContext()
    const file = await send(context, reference + name)
    await runJobs(context)
    await file.reload()
    const { report } = await presentFile(context, file)
    await context.close()
    const { code, printed } = await offing('inspect', reference + name)
    expect(code).toBe(0)
    const inspected = JSON.parse(printed) as Record<string, unknown> & { variables: Record<string, unknown>[] }
    // What feeds make of it belongs to the page; everything that is said of the file itself is the same.
    expect(report).toMatchObject(inspected)
    expect(inspected.variables.length).toBe(report!.variables.length)
  })

  it('refuses with the sentence that the page has, goes on with the next file and ends with 1', async () => {
    const bad = join(folder, 'cut.nc')
    await writeFile(bad, (await readFile(`${reference}nc4-packed-int16.nc`)).subarray(0, 4000))
    const context = await createTestContext()
    const file = await send(context, bad)
    await runJobs(context)
    await file.reload()
    await context.close()
    const { code, printed } = await offing('inspect', bad, `${reference}classic-float.nc`)
    expect(code).toBe(1)
    expect(printed).toContain(`cut.nc is refused (truncated). ${file.refusal!.message}\n`)
    expect(printed).toContain('"format": "netcdf-classic"')
  })
})

describe('npm run offing -- ingest', () => {
  it('takes files in, reads them and says what became of each; one refused makes it end with 1', async () => {
    expect((await offing('migrate')).code).toBe(0)
    await inDataDir(async (context) => aFeed(context, await aPerson(context)))
    const good = await seaFile([{ at: '2026-06-10T12:00:00Z', value: 2 }])
    const bad = join(folder, 'notes.nc')
    await writeFile(bad, 'dear all, the data are late')
    const { code, printed } = await offing('ingest', good, bad)
    expect(printed).toBe('sea.nc: processed\nnotes.nc: refused (unknown-format). This is not a NetCDF or GeoTIFF file: it begins with text.\n')
    expect(code).toBe(1)
    expect(await offing('ingest', good)).toEqual({ code: 0, printed: 'sea.nc: processed\n' })
  })

  it('takes the feed and the time that a file does not name, as the web upload does', async () => {
    await offing('migrate')
    const feedId = await inDataDir(async (context) => {
      const fields = { name: 'Raster', quantity: 'chlorophyll', variable: 'band 1', unit: 'mg m-3', scale: 'log10', processingVersion: '1' }
      return (await createFeed(context, await aPerson(context), newFeed.parse(fields))).id
    })
    const { writeGeotiff } = await import('../../../server/grids/write/geotiff')
    const path = join(folder, 'plain.tif')
    await writeGeotiff(path, { rows: 2, columns: 2, west: -12, north: 51, lonStep: 0.5, latStep: 0.5, values: Float64Array.of(1, 2, 3, 4), description: 'chl', unit: 'mg m-3' })
    const { code, printed } = await offing('ingest', '--feed', String(feedId), '--observed-at', '2026-06-10T12:30:00Z', path)
    expect({ code, printed }).toEqual({ code: 0, printed: 'plain.tif: processed\n' })
    const layers = await inDataDir((context) => context.models.layers.findAll({ where: { feedId } }))
    expect(layers.map((layer) => new Date(layer.observedAt).toISOString())).toEqual(['2026-06-10T12:30:00.000Z'])
  })
})

describe('a command called wrongly', () => {
  it.each([
    [[], 'Say which command.'],
    [['sail'], 'There is no command sail.'],
    [['toString'], 'There is no command toString.'],
    [['inspect'], 'Name at least one file.'],
    [['ingest'], 'Name at least one file.'],
    [['inspect', '/no/such/file.nc'], 'There is no file /no/such/file.nc.'],
    [['inspect', '/tmp'], '/tmp is no file.'],
    [['inspect', '--colour', 'x.nc'], "Unknown option '--colour'."],
    [['inspect', '--feed', '1', 'x.nc'], 'inspect has no option --feed.'],
    [['ingest', '--feed', 'one', 'x.nc'], '--feed wants the number of a feed.'],
    [['ingest', '--observed-at', 'noon', 'x.nc'], '--observed-at wants an instant such as 2026-06-11T12:40:00Z.'],
    [['ingest', '--feed', '77', `${reference}classic-float.nc`], 'There is no feed 77.'],
    [['create-admin', '--email', 'a@b.example'], 'Give the password on standard input, with --password-stdin.'],
    [['create-token'], 'Say whose, with --email E.'],
    [['migrate', 'everything'], 'everything is too much: this command takes no files.'],
  ])('%j says %s and ends with 2', async (args, sentence) => {
    const { code, printed } = await offing(...args)
    expect(printed.split('\n')[0]).toBe(sentence)
    expect(printed).toContain('npm run offing -- COMMAND')
    expect(code).toBe(2)
  })

  it('leaves nothing behind', async () => {
    await offing('ingest', '/no/such/file.nc')
    const db = await openDatabase(join(dataDir, 'offing.sqlite'))
    expect(await db.first('SELECT count(*) AS count FROM files')).toEqual({ count: 0 })
    await db.close()
  })
})
