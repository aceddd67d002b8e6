import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Page } from 'playwright-core'
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, inject, it, vi } from 'vitest'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Region } from '../../shared/schemas/regions'
import { openBrowser, type Watched } from '../support/browser'
import { startOwnDemo, type OwnDemo } from '../support/demo-server'
import { apiOf, type JourneyApi } from '../support/journey-api'
import { boxAround, daysFrom, writeSurvey } from '../support/journey-files'
import { drawByMouse, fillSignIn, isSamePage, markPage, noteStatuses, openAs, openLetter, statusesSeen } from '../support/journey-steps'

const fewSeconds = { timeout: 8_000 }
const officer = { email: 'officer@demo.example', password: 'offing-demo-officer' }
const dara = { email: 'dara.quell@demo.example', password: 'offing-demo-officer' }

let demo: OwnDemo
let browser: Watched
let api: JourneyApi
const signIn = (role: string) => demo.signIns.get(role) ?? expect.fail(`no ${role} was printed`)

beforeAll(async () => {
  demo = await startOwnDemo(inject('seededDemo'))
  browser = await openBrowser(inject('chromium'), demo.baseUrl)
  api = await apiOf(demo.baseUrl, signIn('admin'))
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
  expect(await demo.stop()).toBe(0)
})

describe('an alert from the layer to the note', () => {
  let today: Page
  let watching: Page
  let alertPage: Page
  let alertPath: string
  const openAlerts = (page: Page) => page.getByRole('region', { name: 'Open alerts' })

  it('is born while two people watch: list, statement and map change without a reload', async () => {
    ;[today, watching] = [(await browser.person()).page, (await browser.person()).page]
    await Promise.all([openAs(today, officer), openAs(watching, dara)])
    for (const page of [today, watching]) {
      await openAlerts(page).getByText('Mether Sound', { exact: true }).waitFor()
      await markPage(page)
      expect(await openAlerts(page).getByText('Tarrow Bay', { exact: true }).count()).toBe(0)
    }
    await Promise.all(
      [today, watching].map(async (page) => {
        await openAlerts(page).getByText('Tarrow Bay', { exact: true }).waitFor({ timeout: 90_000 })
        await openAlerts(page).getByText('Severe', { exact: true }).waitFor()
        const plate = page.getByRole('region', { name: 'Map of the watched water' }).getByRole('link', { name: /Tarrow Bay/ })
        await plate.filter({ hasText: 'times usual' }).waitFor(fewSeconds)
        expect(await isSamePage(page)).toBe(true)
      }),
    )
  })

  it('reaches the mailbox; its link leads through the sign-in to the reason', async () => {
    alertPage = (await browser.person()).page
    const letter = await openLetter(alertPage, officer.email, 'Tarrow Bay: Severe')
    await letter.getByRole('heading', { name: /^Tarrow Bay is at \d.* times usual/ }).waitFor()
    await letter.getByText('Take a water sample').waitFor()
    await letter.getByRole('link', { name: 'See why and acknowledge' }).click()
    await alertPage.waitForURL(/\/sign-in\?next=%2Falerts%2F\d+$/)
    await fillSignIn(alertPage, officer)
    await alertPage.waitForURL(/\/alerts\/\d+$/)
    alertPath = new URL(alertPage.url()).pathname

    const why = alertPage.getByRole('region', { name: 'Why it fired' })
    await why.getByText('recomputed from the stored layers: agrees').waitFor({ timeout: 20_000 })
    const shown = (await why.innerText()).replaceAll(/\s+/g, ' ')
    const { evidence } = await api.call(endpoints.alert, { params: { id: Number(alertPath.split('/').at(-1)) } })
    expect(shown).toContain(`Value ${evidence.value.toPrecision(3)}`)
    expect(shown).toContain(`Usual ${evidence.usual?.toPrecision(3)}`)
    expect(shown).toMatch(/Coverage \d+ ?% floor 25 %/)
    expect(shown).toMatch(/Rule Median above the 90th percentile of the season.*Version 1/)
    expect(shown).toMatch(/Layer 11 Jun \d\d:\d\d IST/)
    expect(shown).toContain('demo-chl-20260611.nc')
  })

  it('is acknowledged with a note, and others see it within seconds without a reload', async () => {
    const reading = (await browser.person()).page
    await openAs(reading, signIn('researcher'), alertPath)
    await reading.getByText(/Not acknowledged for/).first().waitFor()
    await markPage(reading)
    await alertPage.getByRole('textbox', { name: 'Note' }).fill('Called Hollin Ledge; lines lifted to 4 m.')
    await alertPage.getByRole('button', { name: 'Acknowledge' }).click()
    await Promise.all([
      reading.getByText('Called Hollin Ledge; lines lifted to 4 m.').waitFor(fewSeconds),
      reading.getByText(/^Acknowledged .* by Ines Marrow/).first().waitFor(fewSeconds),
      openAlerts(watching).getByText(/Ines Marrow/).waitFor(fewSeconds),
      openAlerts(today).getByText('You have it').waitFor(fewSeconds),
    ])
    for (const page of [reading, watching, today]) expect(await isSamePage(page)).toBe(true)
  })
})

describe('a region and its files', () => {
  let page: Page
  let folder: string
  let region: Region

  beforeAll(async () => {
    folder = await mkdtemp(join(tmpdir(), 'offing-survey-'))
    page = (await browser.person()).page
    await openAs(page, signIn('analyst'), '/regions/new')
  })

  afterAll(() => rm(folder, { recursive: true, force: true }))

  it('is drawn by mouse, named and saved, and its history arrives', async () => {
    const map = page.getByRole('region', { name: 'Map to draw the outline on' })
    await drawByMouse(page, map.locator('.leaflet-container'), [[0.55, 0.8], [0.66, 0.8], [0.68, 0.87], [0.54, 0.87]])
    await page.getByRole('button', { name: 'Draw it anew' }).waitFor()
    await page.getByLabel('Name', { exact: true }).fill('Marrow Deep')
    await page.getByRole('button', { name: 'Save the region' }).click()
    await page.waitForURL(/\/regions\/\d+$/)
    await page.getByRole('heading', { name: /Marrow Deep/ }).first().waitFor()
    await markPage(page)
    const id = Number(new URL(page.url()).pathname.split('/').at(-1))
    region = await vi.waitFor(
      async () => {
        const found = await api.call(endpoints.region, { params: { id } })
        expect(found.standing.progress).toBeNull()
        expect(found.standing.state).not.toBe('not ready')
        return found
      },
      { timeout: 150_000, interval: 500 },
    )
    expect(region.geometry).toMatchObject({ type: 'Polygon', coordinates: [{ length: 5 }] })
    expect(region.areaKm2).toBeGreaterThan(50)
    await page.getByText(/Reading history|History waits/).waitFor({ state: 'hidden' })
    await page.getByText(/10 years|ten years|3[, ]?6\d\d views/i).first().waitFor(fewSeconds)
    expect(await isSamePage(page)).toBe(true)
  })

  it('gets figures from a NetCDF-4, a classic NetCDF and a GeoTIFF file; what cannot be read is refused with a sentence', async () => {
    const [netcdf4, classic, picture, notes] = ['survey-20220101.nc', 'survey-20180101.nc', 'picture.tif', 'notes.nc'] as const
    const wish = { box: boxAround(region.geometry), variable: 'chl_survey' }
    // Four years a file: long enough in the reading to be watched.
    await writeSurvey(folder, netcdf4, 'netcdf4', { ...wish, days: daysFrom('2022-01-01', 1461), value: (day) => 1 + (day % 10) / 10 })
    await writeSurvey(folder, classic, 'classic', { ...wish, days: daysFrom('2018-01-01', 1461), value: () => 3.25 })
    await writeSurvey(folder, picture, 'geotiff', { ...wish, days: ['2026-06-10'], value: () => 4.75 })
    await writeFile(join(folder, notes), 'The figures of the survey follow by post.\n')
    const send = (...names: string[]) => page.getByLabel('Files to send').setInputFiles(names.map((name) => join(folder, name)))
    const row = (name: string) => page.getByRole('table', { name: 'Files' }).getByRole('row').filter({ hasText: name })

    await page.getByRole('link', { name: 'Layers' }).first().click()
    await page.getByRole('table', { name: 'Files' }).waitFor()
    await noteStatuses(page)
    await send(netcdf4)
    await row(netcdf4).getByText('waiting', { exact: true }).waitFor({ timeout: 20_000 })
    await row(netcdf4).getByRole('link').click()
    await page.getByLabel('Name of the feed').fill('Survey chlorophyll')
    await page.getByLabel('File-name pattern').fill('survey-{yyyy}{MM}{dd}*')
    await page.getByRole('button', { name: /^Confirm the feed, read 1.?461 layers$/ }).click()
    const reading = page.getByRole('progressbar', { name: /Reading/ })
    // A fast machine may be done before the bar is drawn; that the file went through processing is held below.
    await reading.or(page.getByRole('heading', { name: /read from this file/ })).first().waitFor({ timeout: 20_000 })

    await page.getByRole('link', { name: 'Layers' }).first().click()
    await page.getByText('Files that do not tell their feed or time').click()
    await page.getByLabel('Feed', { exact: true }).selectOption({ label: 'Survey chlorophyll' })
    await page.getByLabel('Observed at, UTC').fill('2026-06-10T12:00')
    await send(picture)
    await page.getByLabel('Feed', { exact: true }).selectOption('')
    await page.getByLabel('Observed at, UTC').fill('')
    await send(classic, notes)
    const sent = page.getByRole('list', { name: 'Files being sent' }).getByRole('listitem')
    for (const name of [netcdf4, picture, classic, notes]) await sent.filter({ hasText: name }).getByText('received,').waitFor({ timeout: 20_000 })
    for (const name of [netcdf4, classic, picture]) await row(name).getByText('processed', { exact: true }).waitFor({ timeout: 60_000 })
    await row(notes).getByText(/refused$/).first().waitFor({ timeout: 20_000 })
    await row(notes).getByText('This is not a NetCDF or GeoTIFF file').waitFor()
    // It changed before the eyes of who sent it; one read within two seconds may never be shown as being processed.
    expect((await statusesSeen(page, classic)).slice(-2)).toEqual([expect.stringMatching(/^(received|processing)$/), 'processed'])

    for (const [name, day, value] of [[netcdf4, '31 Dec 2025', 1], [classic, '31 Dec 2021', 3.25], [picture, '10 Jun 2026', 4.75]] as const) {
      await row(name).getByRole('link').click()
      const figures = page.getByRole('table', { name: 'Figures by region' }).getByRole('row').filter({ hasText: region.name })
      // The page may still show what it knew from an earlier visit: the newest day is waited for.
      const newestRow = figures.filter({ hasText: day }).first()
      await newestRow.waitFor({ timeout: 20_000 })
      const newest = (await newestRow.innerText()).replaceAll(/\s+/g, ' ')
      expect(newest).toContain(String(value))
      expect(newest).toContain('100 %')
      await page.goBack()
    }
    expect(await isSamePage(page)).toBe(true)
  })
})
