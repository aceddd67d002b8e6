import { pathToFileURL } from 'node:url'
import { resolve } from 'node:path'
import type { main } from '../index'

/** Runs the built server in this process. */
export async function runBuilt(mode: Parameters<typeof main>[0]): Promise<void> {
  const built = (await import(pathToFileURL(resolve('dist/server/main.js')).href)) as { main: typeof main }
  await built.main(mode)
}
