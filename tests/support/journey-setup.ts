import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { TestProject } from 'vitest/node'
import { readyChromium } from './browser'
import { startDemoServer } from './demo-server'
import { startScript } from './offing-process'

declare module 'vitest' {
  interface ProvidedContext {
    /** The data folder of the demo as it stands when it prints its sign-ins; each journey copies it. */
    seededDemo: string
    chromium: string
  }
}

/** Once a run: everything built, a Chromium at hand, and the demo made by its own process as on a fresh machine. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  project.provide('chromium', await readyChromium())
  await build()
  const dir = await mkdtemp(join(tmpdir(), 'offing-seeded-'))
  const forget = () => rm(dir, { recursive: true, force: true })
  try {
    const demo = await startDemoServer(join(dir, 'data'), 400_000)
    console.log(`demo: first start to sign-ins printed ${(demo.readyAfterMs / 1000).toFixed(1)} s`)
    // Stopped before its first new layer, so that every journey can see that layer arrive.
    const code = await demo.stop()
    if (code !== 0) throw new Error(`The demo ended with ${code} when asked to stop. It printed:\n${demo.process.printed()}`)
    project.provide('seededDemo', join(dir, 'data'))
  } catch (error) {
    await forget()
    throw error
  }
  return forget
}

/** In a process of its own: this one runs as a test, and React would be built for testing. */
async function build(): Promise<void> {
  const { PATH = '', HOME = '' } = process.env
  const building = startScript('tests/support/journey-build.ts', [], { PATH, HOME })
  const { code } = await building.ended
  if (code !== 0) throw new Error(`The build failed:\n${building.printed()}`)
}
