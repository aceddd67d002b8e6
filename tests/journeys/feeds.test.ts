import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Locator, Page } from 'playwright-core'
import sharp from 'sharp'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, inject, it } from 'vitest'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Region } from '../../shared/schemas/regions'
import { openBrowser, type Watched } from '../support/browser'
import { startOwnDemo, type OwnDemo } from '../support/demo-server'
import { apiOf, type JourneyApi } from '../support/journey-api'
import { seriousViolations } from '../support/journey-axe'
import { boxAround, writeBands, writeFlagged } from '../support/journey-files'
import { openAs } from '../support/journey-steps'
import { startScript } from '../support/offing-process'
import { startProvider, type Provider } from '../support/provider'

const soon = { timeout: 20_000 }
const newFeed = 'Harbour chlorophyll'

let demo: OwnDemo
let browser: Watched
let api: JourneyApi
let provider: Provider
let folder: string
let region: Region
let page: Page
const signIn = (role: string) => demo.signIns.get(role) ?? expect.fail(`no ${role} was printed`)

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'offing-feeds-'))
  provider = await startProvider()
  demo = await startOwnDemo(inject('seededDemo'), { PULL_ALLOW_PRIVATE: 'true' })
  browser = await openBrowser(inject('chromium'), demo.baseUrl)
  api = await apiOf(demo.baseUrl, signIn('admin'))
  const { items } = await api.call(endpoints.listRegions)
  const named = items.find(({ name }) => name === 'Tarrow Bay') ?? expect.fail('the demo has no Tarrow Bay')
  region = await api.call(endpoints.region, { params: { id: named.id } })
  page = (await browser.person()).page
  await openAs(page, signIn('analyst'), '/layers')
})

beforeEach(({ skip, task }) => {
  skip(task.suite?.tasks.some(({ result }) => result?.state === 'fail') ?? false, 'a step before it failed')
})

afterEach(async ({ task }) => {
  if (task.result?.state === 'fail') console.log([demo.process.printed(), ...(await browser.capture())].join('\n'))
  expect(browser.faults.splice(0)).toEqual([])
})

afterAll(async () => {
  await browser.close()
  await provider.close()
  await rm(folder, { recursive: true, force: true })
  expect(await demo.stop()).toBe(0)
})

/** Sends files through the page of layers, which is left open. */
async function send(...names: string[]): Promise<void> {
  await page.getByRole('link', { name: 'Layers' }).first().click()
  await page.getByLabel('Files to send').setInputFiles(names.map((name) => join(folder, name)))
}
const fileRow = (name: string) => page.getByRole('table', { name: 'Files' }).getByRole('row').filter({ hasText: name })
const statusOf = (name: string, word: string) => fileRow(name).getByText(word, { exact: true })
const figuresOf = (on: Page, regionName: string) => on.getByRole('table', { name: 'Figures by region' }).getByRole('row').filter({ hasText: regionName })
const share = (on: Page, word: string, percent: number) => on.getByRole('listitem').filter({ hasText: new RegExp(`${word}\\s*${percent}\\s*%`) })
const textOf = async (of: Locator) => (await of.innerText()).replaceAll(/\s+/g, ' ')

describe('files of new kinds, from the first look to a feed that fetches for itself', () => {
  let firstPath: string

  it('a file with flags waits with its proposal; unticked flags keep more cells, and confirmed it gives figures and reasons', async () => {
    firstPath = await writeFlagged(folder, 'harbour-20260606.nc', { box: boxAround(region.geometry), day: '2026-06-06', value: 2.34 })
    await send('harbour-20260606.nc')
    await statusOf('harbour-20260606.nc', 'waiting').waitFor(soon)
    await fileRow('harbour-20260606.nc').getByRole('link').click()
    await page.getByRole('heading', { name: 'This file fits no feed yet.' }).waitFor()
    await page.getByText('Understood as chlorophyll, 1 time step.').waitFor()
    await page.getByRole('table', { name: 'What was understood' }).getByText('chl_harbour').first().waitFor()
    await page.getByRole('img', { name: /^chl_harbour: cells by value, Median 2\.34/ }).waitFor()

    const flag = (meaning: string) => page.getByRole('checkbox', { name: meaning })
    expect(await Promise.all(['CLOUD', 'STRAYLIGHT', 'BRIGHT_WATER'].map((meaning) => flag(meaning).isChecked()))).toEqual([true, true, false])
    await share(page, 'kept', 70).waitFor()
    await flag('BRIGHT_WATER').check()
    await share(page, 'kept', 45).waitFor()
    await share(page, 'masked: BRIGHT_WATER', 25).waitFor()
    await flag('BRIGHT_WATER').uncheck()
    await flag('STRAYLIGHT').uncheck()
    await share(page, 'kept', 80).waitFor()
    expect(await seriousViolations(page)).toEqual([])

    await page.getByLabel('Name of the feed').fill(newFeed)
    await page.getByRole('button', { name: 'Confirm the feed, read 1 layer' }).click()
    await page.getByRole('heading', { name: 'One layer read from this file.' }).waitFor(soon)
    await figuresOf(page, region.name).waitFor(soon)
    await share(page, 'kept', 80).waitFor()
    await share(page, 'masked: CLOUD', 20).waitFor()
    expect(await page.getByText('masked: STRAYLIGHT').count()).toBe(0)
    expect(await seriousViolations(page)).toEqual([])

    const [feed] = (await api.call(endpoints.listFeeds)).items.filter(({ name }) => name === newFeed)
    const { columns, maskedByReason } = await api.call(endpoints.regionSeries, { params: { id: region.id }, query: { feedId: feed!.id, columns: 'day,median,coverage', masked: 'true' } })
    const coverage = columns.coverage![0]!
    expect(coverage).toBeGreaterThan(0.5)
    expect(coverage).toBeLessThan(0.95)
    expect(await textOf(figuresOf(page, region.name))).toBe(`${region.name} 6 Jun 2026 2.34 2.34 ${Math.round(coverage * 100)} %`)
    expect(Object.keys(maskedByReason!)).toEqual(['CLOUD'])
  })

  it('the command prints the report that the page of the file has', async () => {
    const id = Number(new URL(page.url()).pathname.split('/').at(-1))
    const { report } = await api.call(endpoints.file, { params: { id } })
    const { PATH = '' } = process.env
    const inspecting = startScript('server/commands/run-offing.ts', ['inspect', firstPath], { PATH, DATA_DIR: folder })
    expect((await inspecting.ended).code).toBe(0)
    // Before the report it may say that it builds itself, where a source changed meanwhile.
    const text = inspecting.printed()
    const printed = JSON.parse(text.slice(text.indexOf('{'))) as { variables: { name: string }[] }
    // What feeds make of it belongs to the page; all that is said of the file itself is the same.
    expect(report).toMatchObject(printed)
    expect(printed.variables.map(({ name }) => name)).toEqual(report!.variables.map(({ name }) => name))
  })

  it('the second file of the kind is matched by itself', async () => {
    await writeFlagged(folder, 'harbour-20260607.nc', { box: boxAround(region.geometry), day: '2026-06-07', value: 3.45 })
    await send('harbour-20260607.nc')
    await statusOf('harbour-20260607.nc', 'processed').waitFor(soon)
    await fileRow('harbour-20260607.nc').getByRole('link').click()
    await page.getByRole('table', { name: 'Layers of this file' }).getByRole('link', { name: newFeed }).waitFor()
    expect(await textOf(figuresOf(page, region.name))).toContain(`${region.name} 7 Jun 2026 3.45`)
    expect(await page.getByRole('button', { name: /Confirm/ }).count()).toBe(0)
  })

  it('a corrupted file and a picture are refused with their sentences, and the queue goes on', async () => {
    const whole = await readFile(firstPath)
    const cut = whole.subarray(0, Math.floor(whole.length / 2))
    await writeFile(join(folder, 'cut.nc'), cut)
    await writeFile(join(folder, 'photo.png'), await sharp({ create: { width: 64, height: 64, channels: 3, background: '#284' } }).png().toBuffer())
    await writeFlagged(folder, 'harbour-20260608.nc', { box: boxAround(region.geometry), day: '2026-06-08', value: 4.56 })
    await send('cut.nc', 'photo.png', 'harbour-20260608.nc')
    await statusOf('harbour-20260608.nc', 'processed').waitFor(soon)
    await fileRow('cut.nc').getByText(/refused$/).first().waitFor(soon)
    await fileRow('cut.nc').getByText(`it says it has ${whole.length} bytes, but only ${cut.length} arrived`).waitFor()
    await fileRow('photo.png').getByText('it is a PNG picture').waitFor(soon)
    await fileRow('photo.png').getByRole('link').click()
    await page.getByRole('alert').getByText('Send NetCDF-4, classic NetCDF or GeoTIFF.').waitFor()
  })

  it('bands are proposed together and confirmed once; chlorophyll by band ratio is made from them, its formula, version and bands said', async () => {
    await writeBands(folder, 'bands-20260608.nc', { box: boxAround(region.geometry), day: '2026-06-08', rrs: { 412: 0.0042, 443: 0.004, 490: 0.0035, 510: 0.003, 555: 0.002 } })
    await send('bands-20260608.nc')
    await statusOf('bands-20260608.nc', 'waiting').waitFor(soon)
    await fileRow('bands-20260608.nc').getByRole('link').click()
    const read = page.getByRole('table', { name: 'Feeds to make' })
    await read.waitFor()
    for (const nm of [412, 443, 490, 510, 555]) expect(await read.getByRole('checkbox', { name: `Read Rrs_${nm}` }).isChecked()).toBe(true)
    await read.getByRole('checkbox', { name: 'Read Rrs_412' }).uncheck()
    await page.getByRole('button', { name: 'Confirm 4 feeds, read 4 layers' }).click()
    await page.getByRole('heading', { name: 'Four layers read from this file.' }).waitFor(soon)

    const title = 'Chlorophyll by band ratio OC4 SeaWiFS'
    await page.getByRole('link', { name: `version 6 of ${title}: work it out` }).click()
    await page.getByLabel('Formula').waitFor()
    await page.getByText('From reflectance at 443, 490, 510, 555 nm.').waitFor()
    expect(await seriousViolations(page)).toEqual([])
    await page.getByRole('button', { name: 'Make the feed' }).click()
    await page.getByRole('link', { name: `${title}, version 6` }).click()
    await page.getByRole('heading', { name: `${title}, version 6` }).waitFor()
    const layers = page.getByRole('table', { name: 'Layers' })
    await layers.getByRole('row').filter({ hasText: 'bands-20260608.nc' }).waitFor(soon)
    const facts = page.locator('section').filter({ has: page.getByRole('heading', { name: 'How it is read' }) })
    expect(await textOf(facts)).toContain(`Worked out by ${title}, version 6 From bands 443, 490, 510, 555 nm`)
    expect(await seriousViolations(page)).toEqual([])

    await layers.getByRole('link', { name: 'bands-20260608.nc' }).click()
    // A ratio of 2 is 0.430978 mg m-3 in the published set (chlorophyll_algorithms.json, OC4_SeaWiFS_v6).
    await figuresOf(page, region.name).filter({ hasText: title }).getByText('0.431').first().waitFor(soon)
  })

  it('a feed fetches the days that are there, and a file with new bytes under its old name takes its place', async () => {
    const admin = (await browser.person()).page
    const put = async (day: string, value: number, name: string) => {
      const path = await writeFlagged(folder, name, { box: boxAround(region.geometry), day, value })
      provider.put(`/harbour/fetched-${day.replaceAll('-', '')}.nc`, await readFile(path))
    }
    await put('2026-06-09', 5.67, 'first-0609.nc')
    await put('2026-06-10', 6.78, 'first-0610.nc')
    await openAs(admin, signIn('admin'), '/feeds')
    await admin.getByRole('link', { name: newFeed }).click()
    const fetching = admin.locator('section').filter({ has: admin.getByRole('heading', { name: 'Fetches for itself' }) })
    await fetching.getByRole('button', { name: 'Let it fetch…' }).click()
    await fetching.getByLabel('Address').fill(`${provider.url}/harbour/fetched-{yyyy}{MM}{dd}.nc`)
    await fetching.getByText(`Today: ${provider.url}/harbour/fetched-20260611.nc`).waitFor()
    await fetching.getByLabel('Look back, days').fill('2')
    await fetching.getByRole('button', { name: 'Let it fetch', exact: true }).click()
    await fetching.getByRole('button', { name: 'Fetch now' }).click()
    await fetching.getByText('2 files fetched, 1 not there yet.').waitFor(soon)
    const layers = admin.getByRole('table', { name: 'Layers' })
    for (const day of ['09', '10']) await layers.getByRole('row').filter({ hasText: `fetched-202606${day}.nc` }).waitFor(soon)
    expect(await seriousViolations(admin)).toEqual([])

    // The page of the older file is kept open: it is told of its replacement while somebody looks at it.
    const older = await admin.context().newPage()
    await older.goto((await layers.getByRole('link', { name: 'fetched-20260610.nc' }).getAttribute('href')) ?? '')
    await figuresOf(older, region.name).getByText('6.78').first().waitFor(soon)
    await put('2026-06-10', 7.89, 'second-0610.nc')
    await fetching.getByRole('button', { name: 'Fetch now' }).click()
    await fetching.getByText('1 file fetched, 1 not there yet, 1 as before.').waitFor(soon)
    const replaced = older.getByRole('status').filter({ hasText: 'This file was replaced. Replaced by fetched-20260610.nc, a newer file of the same name, on 11 Jun 2026.' })
    await replaced.waitFor(soon)
    await older.getByText('It gives no figures any more.').waitFor()
    const olderRow = layers.getByRole('row').filter({ hasText: 'replaced by a newer file' })
    expect(await textOf(olderRow)).toContain('fetched-20260610.nc')
    expect(await seriousViolations(older)).toEqual([])
    await replaced.getByRole('link', { name: 'fetched-20260610.nc' }).click()
    await older.getByText('It came under the same address as').waitFor()
    await figuresOf(older, region.name).getByText('7.89').first().waitFor(soon)
    expect(provider.pathsAsked()).toContain('/harbour/fetched-20260611.nc')
  })
})
