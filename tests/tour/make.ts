import { mkdir } from 'node:fs/promises'
import { join } from 'node:path'
import { chromium, type Page } from 'playwright-core'
import sharp from 'sharp'
import { readyChromium } from '../support/browser'

/** Makes the README's pictures from a running demo: small, with few colours, so that they weigh little. */
const base = process.argv[2] ?? 'http://localhost:4100'
const folder = 'data/tour'
const wide = { width: 1280, height: 900 }
const phone = { width: 390, height: 844 }

const browser = await chromium.launch({ executablePath: await readyChromium(), args: ['--headless', '--no-sandbox', '--disable-gpu'] })
await mkdir(folder, { recursive: true })
try {
  const officer = await signedIn('officer', wide)
  await picture(officer, '/', 'today', 900)
  const alert = await worst(officer)
  await picture(officer, `/alerts/${alert.id}`, 'alert', 1000)
  await picture(officer, `/regions/${alert.regionId}`, 'region', 900)
  await picture(officer, `/layers/files/${alert.evidence.fileId}`, 'file', 800)
  await picture(await signedIn('officer', phone), `/alerts/${alert.id}`, 'alert-phone', 844)
} finally {
  await browser.close()
}

async function signedIn(role: string, viewport: { width: number; height: number }): Promise<Page> {
  const page = await browser.newPage({ viewport, colorScheme: 'light' })
  await page.goto(`${base}/sign-in`)
  await page.getByLabel('E-mail').fill(`${role}@demo.example`)
  await page.getByLabel('Password').fill(`offing-demo-${role}`)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL((url) => url.pathname === '/')
  return page
}

async function worst(page: Page): Promise<{ id: number; regionId: number; evidence: { fileId: number } }> {
  const reply = await page.request.get(`${base}/api/alerts?limit=1`)
  const { items } = (await reply.json()) as { items: { id: number; regionId: number; evidence: { fileId: number } }[] }
  if (!items[0]) throw new Error('The demo has no alert yet. Wait half a minute after its start.')
  return items[0]
}

async function picture(page: Page, path: string, name: string, height: number): Promise<void> {
  const width = page.viewportSize()!.width
  await page.setViewportSize({ width, height })
  await page.goto(`${base}${path}`)
  await page.waitForLoadState('networkidle', { timeout: 5_000 }).catch(() => undefined)
  await page.locator('main').waitFor()
  await page.waitForFunction(() => [...document.images].every((image) => image.complete))
  const shot = await page.screenshot({ clip: { x: 0, y: 0, width, height } })
  const { size } = await sharp(shot).resize({ width: Math.min(width, 900) }).png({ palette: true, colours: 96, compressionLevel: 9 }).toFile(join(folder, `${name}.png`))
  console.log(`${name}.png ${Math.round(size / 1024)} KB`)
}
