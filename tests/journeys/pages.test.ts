import type { Page } from 'playwright-core'
import { afterAll, afterEach, beforeAll, expect, inject, it } from 'vitest'
import { paths } from '../../shared/paths'
import { endpoints } from '../../shared/schemas/endpoints'
import { desktop, openBrowser, phone, type Look, type Watched } from '../support/browser'
import { startOwnDemo, type OwnDemo } from '../support/demo-server'
import { apiOf } from '../support/journey-api'
import { seriousViolations, sidewaysPx } from '../support/journey-axe'
import { fillSignIn, openAs, openLetter } from '../support/journey-steps'

let demo: OwnDemo
let browser: Watched
let mainPages: string[]
let otherPages: string[]

beforeAll(async () => {
  demo = await startOwnDemo(inject('seededDemo'))
  browser = await openBrowser(inject('chromium'), demo.baseUrl)
  const api = await apiOf(demo.baseUrl, demo.signIns.get('admin') ?? expect.fail('no admin was printed'))
  const [alert] = (await api.call(endpoints.listAlerts)).items
  const [file] = (await api.call(endpoints.listFiles)).items
  if (!alert || !file) throw new Error('the demo has no alert or no file')
  mainPages = [
    paths.today.to(), paths.alert.to({ id: alert.id }), paths.region.to({ id: alert.regionId }), paths.newRegion.to(), paths.layers.to(),
  ]
  otherPages = [
    paths.alerts.to(), paths.regions.to(), paths.importRegions.to(), paths.editRegion.to({ id: alert.regionId }), paths.file.to({ id: file.id }), paths.feeds.to(),
    paths.feed.to({ id: alert.feedId }), paths.account.to(), paths.people.to(), paths.subscriptions.to(), paths.jobs.to(), paths.letters.to(),
    paths.audit.to(), paths.layerMap.to(),
  ]
})

afterEach(() => {
  expect(browser.faults.splice(0)).toEqual([])
})

afterAll(async () => {
  await browser.close()
  expect(await demo.stop()).toBe(0)
})

/** The main pages are looked at closely in both themes at a desk, the others on a phone; how they lay out, on a phone all. */
const looks: [string, Look, 'the main' | 'all'][] = [
  ['on paper, at a desk', desktop, 'the main'],
  ['at night, at a desk', { ...desktop, theme: 'dark' }, 'the main'],
  ['at night, on a phone', { ...phone, theme: 'dark' }, 'all'],
]

it.each(looks)('pages %s have no serious fault for those who see or point otherwise, and do not scroll sideways', async (_, look, which) => {
  const { page, context } = await browser.person(look)
  // A button on its way from one colour to another has the contrast of neither.
  await page.emulateMedia({ reducedMotion: 'reduce' })
  const found: string[] = []
  const check = async (path: string) => {
    await page.goto(path)
    await settled(page)
    const sideways = await sidewaysPx(page)
    if (sideways > 0) found.push(`${path} scrolls sideways by ${sideways} px`)
    if (which === 'all' && mainPages.includes(path)) return
    found.push(...(await seriousViolations(page)).map((violation) => `${path} ${violation}`))
  }
  for (const path of [paths.signIn.to(), paths.mail.to()]) await check(path)
  await openAs(page, demo.signIns.get('admin') ?? expect.fail('no admin was printed'))
  for (const path of which === 'all' ? [...mainPages, ...otherPages] : mainPages) await check(path)
  await context.close()
  expect(found).toEqual([])
})

it('a letter read on a phone leads through the sign-in to the alert, which is acknowledged with the thumb', async () => {
  const dara = { email: 'dara.quell@demo.example', password: 'offing-demo-officer' }
  const { page } = await browser.person(phone)
  const letter = await openLetter(page, dara.email, 'Tarrow Bay: Severe')
  await letter.getByRole('link', { name: 'See why and acknowledge' }).tap()
  await page.waitForURL(/\/sign-in\?next=/)
  await fillSignIn(page, dara)
  await page.waitForURL(/\/alerts\/\d+$/)
  await page.getByText(/^Not acknowledged for/).first().waitFor()
  await page.getByRole('button', { name: 'Acknowledge' }).tap()
  await page.getByText(/^Acknowledged .* by you\./).waitFor()
  expect(await sidewaysPx(page)).toBe(0)
})

/** The page has its heading, and nothing on it is still being waited for. */
async function settled(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).first().waitFor()
  await page.waitForFunction(() => document.querySelector('[role="status"] .hatch-fine') === null)
}
