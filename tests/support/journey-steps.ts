import type { FrameLocator, Locator, Page } from 'playwright-core'

export interface Credentials {
  email: string
  password: string
}

/** Fills the sign-in page that is on screen; what was asked for before it opens after. */
export async function fillSignIn(page: Page, { email, password }: Credentials): Promise<void> {
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL(({ pathname }) => pathname !== '/sign-in')
}

/** Opens a page as a stranger and signs in on the way. */
export async function openAs(page: Page, credentials: Credentials, path = '/'): Promise<void> {
  await page.goto(path)
  await fillSignIn(page, credentials)
}

/** Opens the page of caught letters, waits for the one to somebody, and opens it; answers the letter itself. */
export async function openLetter(page: Page, to: string, subject: string): Promise<FrameLocator> {
  await page.goto('/mail')
  await page.getByRole('list', { name: 'Letters' }).getByRole('link').filter({ hasText: to }).filter({ hasText: subject }).click()
  return page.frameLocator('iframe')
}

const mark = 'offingJourney'

/** Marks the page that is loaded; a reload would lose the mark. */
export async function markPage(page: Page): Promise<void> {
  await page.evaluate((name) => (document.documentElement.dataset[name] = 'same'), mark)
}

export async function isSamePage(page: Page): Promise<boolean> {
  return (await page.evaluate((name) => document.documentElement.dataset[name], mark)) === 'same'
}

/** Draws a polygon with the mouse, corner by corner, and closes it on its first; places are shares of the map's size. */
export async function drawByMouse(page: Page, map: Locator, corners: readonly [number, number][]): Promise<void> {
  await map.scrollIntoViewIfNeeded()
  const box = await map.boundingBox()
  if (!box) throw new Error('the map is not on screen')
  for (const [x, y] of [...corners, corners[0] ?? [0, 0]]) {
    await page.mouse.move(box.x + x * box.width, box.y + y * box.height, { steps: 8 })
    await page.mouse.down()
    await page.mouse.up()
  }
}

/** Notes each status word a file's row ever shows in the table of files, however briefly, in order. */
export async function noteStatuses(page: Page): Promise<void> {
  await page.evaluate(() => {
    const seen: Record<string, string[]> = {}
    Object.assign(window, { statusesSeen: seen })
    const look = () => {
      for (const row of document.querySelectorAll('table[aria-label="Files"] tbody tr')) {
        const name = row.querySelector('a')?.textContent ?? ''
        const word = /^[a-z]+/.exec(row.querySelectorAll('td')[1]?.textContent?.trim() ?? '')?.[0] ?? ''
        const words = (seen[name] ??= [])
        if (word && words.at(-1) !== word) words.push(word)
      }
    }
    new MutationObserver(look).observe(document.body, { subtree: true, childList: true, characterData: true })
    look()
  })
}

export async function statusesSeen(page: Page, name: string): Promise<string[]> {
  return page.evaluate((asked) => (window as unknown as { statusesSeen: Record<string, string[]> }).statusesSeen[asked] ?? [], name)
}
