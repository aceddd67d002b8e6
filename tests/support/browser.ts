import { spawn } from 'node:child_process'
import { access, constants, mkdir, readFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { delimiter, join } from 'node:path'
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core'
import { chromiumPath } from '../../server/env'

const names = ['chromium', 'chromium-browser', 'google-chrome-stable', 'google-chrome', 'chrome']
const flags = [
  '--headless', '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run',
  '--disable-background-networking', '--disable-component-update', '--disable-sync',
]

/** Path of a Chromium, installed first where that can be done; throws a sentence that names what to install. */
export async function readyChromium(): Promise<string> {
  const named = chromiumPath()
  if (named !== null) {
    if (await runnable(named)) return named
    throw new Error(`CHROMIUM_PATH says ${named}, which is no program that can be run.`)
  }
  const found = await findChromium()
  if (found) return found
  if (await rootOnDebian()) {
    await aptGet(['update', '-qq'])
    await aptGet(['install', '-y', '-qq', '--no-install-recommends', 'chromium'])
    const installed = await findChromium()
    if (installed) return installed
  }
  throw new Error('The journeys need Chromium. Install the package chromium (Debian: apt-get install chromium), or set CHROMIUM_PATH to a Chromium or Chrome.')
}

async function findChromium(): Promise<string | null> {
  const folders = (process.env['PATH'] ?? '').split(delimiter).filter(Boolean)
  const places = ['/usr/bin/chromium', ...folders.flatMap((folder) => names.map((name) => join(folder, name)))]
  for (const place of places) if (await runnable(place)) return place
  return null
}

function runnable(path: string): Promise<boolean> {
  return access(path, constants.X_OK).then(
    () => true,
    () => false,
  )
}

async function rootOnDebian(): Promise<boolean> {
  const release = await readFile('/etc/os-release', 'utf8').catch(() => '')
  return process.getuid?.() === 0 && /^ID(_LIKE)?=.*debian/m.test(release)
}

async function aptGet(args: string[]): Promise<void> {
  const child = spawn('apt-get', args, { stdio: ['ignore', 'inherit', 'inherit'], env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' } })
  const code = await new Promise((resolve, reject) => child.on('exit', resolve).on('error', reject))
  if (code !== 0) throw new Error(`apt-get ${args.join(' ')} ended with ${String(code)}. Install the package chromium by hand, or set CHROMIUM_PATH.`)
}

export interface Person {
  page: Page
  context: BrowserContext
}

export interface Look {
  width: number
  height: number
  theme?: 'light' | 'dark'
}

export const desktop: Look = { width: 1440, height: 1000 }
export const phone: Look = { width: 390, height: 844 }

export interface Watched {
  /** Somebody at a screen of their own, with nothing kept from anybody else. */
  person(look?: Look): Promise<Person>
  /** Pictures of every open page, for whoever looks into a failure; answers where they are. */
  capture(): Promise<string[]>
  /** What no page may do: complain to the console, throw, or ask anybody but this machine. */
  faults: string[]
  close(): Promise<void>
}

/** Real Chromium on a profile of its own, with every page watched. */
export async function openBrowser(executablePath: string, baseUrl: string): Promise<Watched> {
  const browser: Browser = await chromium.launch({ executablePath, args: flags })
  const faults: string[] = []
  return {
    faults,
    person: async ({ width, height, theme = 'light' } = desktop) => {
      const context = await browser.newContext({
        baseURL: baseUrl,
        viewport: { width, height },
        colorScheme: theme,
        locale: 'en-GB',
        timezoneId: 'Europe/Dublin',
        hasTouch: width < 600,
      })
      watch(context, baseUrl, faults)
      return { page: await context.newPage(), context }
    },
    capture: () => capture(browser),
    close: () => browser.close(),
  }
}

async function capture(browser: Browser): Promise<string[]> {
  const folder = join(tmpdir(), 'offing-journeys')
  await mkdir(folder, { recursive: true })
  const pages = browser.contexts().flatMap((context) => context.pages())
  const paths = pages.map((_, at) => join(folder, `page-${at + 1}.png`))
  await Promise.all(pages.map((page, at) => page.screenshot({ path: paths[at], fullPage: true, timeout: 10_000 }).catch(() => undefined)))
  return pages.map((page, at) => `${page.url()} ${paths[at]}`)
}

function watch(context: BrowserContext, baseUrl: string, faults: string[]): void {
  const home = new URL(baseUrl).origin
  context.on('request', (request) => {
    const { protocol, origin } = new URL(request.url())
    if (protocol !== 'data:' && protocol !== 'blob:' && origin !== home) faults.push(`asked ${request.url()}`)
  })
  context.on('console', (message) => {
    if (message.type() !== 'error' || expected(message.text(), message.location().url)) return
    faults.push(`console: ${message.text()} (${message.location().url})`)
  })
  context.on('weberror', (error) => faults.push(`page: ${error.error().stack ?? error.error().message}`))
}

/** A stranger's first look is answered 401, which the browser itself notes as an error; it leads to the sign-in page. */
function expected(text: string, url: string): boolean {
  const asked = URL.canParse(url) ? new URL(url).pathname : ''
  return /status of 401/.test(text) && (asked === '/api/auth/me' || asked === '/api/auth/refresh')
}
