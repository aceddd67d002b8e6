import axe from 'axe-core'
import type { Page } from 'playwright-core'

/** Serious and critical violations of the page as it stands, each with the places it was found at. */
export async function seriousViolations(page: Page): Promise<string[]> {
  await page.evaluate(axe.source)
  const { violations } = await page.evaluate(() => (window as unknown as { axe: typeof axe }).axe.run(document, { resultTypes: ['violations'] }))
  return violations
    .filter(({ impact }) => impact === 'serious' || impact === 'critical')
    .map(({ id, help, nodes }) => `${id}: ${help}\n${nodes.slice(0, 5).map(({ html }) => `    ${html.slice(0, 200)}`).join('\n')}`)
}

/** By how many pixels the page can be scrolled sideways. */
export async function sidewaysPx(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth)
}
