import { createReadStream } from 'node:fs'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { basename, join, resolve } from 'node:path'
import type { Context } from '../../server/context'
import { drawRegion } from '../../server/desk/draw-region'
import { readEnv } from '../../server/env'
import { runNextJob } from '../../server/jobs/run-job'
import type { FeedRecord } from '../../server/models/feed'
import type { RegionRecord } from '../../server/models/region'
import { openContext } from '../../server/open-context'
import { createFeed } from '../../server/pipeline/feeds'
import { receiveFile } from '../../server/pipeline/receive-file'
import { storeStream } from '../../server/pipeline/stored-files'
import { startWorkers } from '../../server/workers/workers'
import { newFeed } from '../../shared/schemas/feeds'
import { newRegion } from '../../shared/schemas/regions'
import { aPerson } from '../support/sea'
import type { Shape } from './shapes'

/** Offing as it runs, on a data folder of its own, without the web server. */
export interface BenchedOffing {
  context: Context
  feed: FeedRecord
  /** Draws regions; their history waits to be read. */
  draw(shapes: readonly Shape[]): Promise<RegionRecord[]>
  send(path: string): Promise<void>
  /** Does whatever waits, and answers the seconds that each kind of work took. */
  work(): Promise<Record<string, number>>
  close(): Promise<void>
}

export async function openOffing(): Promise<BenchedOffing> {
  const dir = await mkdtemp(join(tmpdir(), 'offing-bench-'))
  const env = readEnv('test', { DATA_DIR: dir, SESSION_SECRET: 'the bench secret 0123456789 abcdefghi' })
  const workers = startWorkers(resolve('dist/server/worker.js'))
  const context = await openContext({ env: { ...env, logLevel: 'error' }, workers })
  const person = await aPerson(context)
  const fields = { quantity: 'chlorophyll', variable: 'chlor_a', unit: 'mg m-3', scale: 'log10', cadence: 'daily', stage: 'near-real-time', processingVersion: '1' }
  const feed = await createFeed(context, person, newFeed.parse({ name: 'Bench', ...fields }))
  return {
    context,
    feed,
    draw: (shapes) => Promise.all(shapes.map(({ name, geometry }) => drawRegion(context, person, newRegion.parse({ name, geometry, timeZone: 'UTC', inland: true })))),
    send: async (path) => {
      const arrived = await storeStream(context.env, createReadStream(path))
      await receiveFile(context, { name: basename(path), origin: 'command', userId: person.id, feedId: null, observedAt: null, arrived })
    },
    work: async () => {
      const seconds: Record<string, number> = {}
      for (;;) {
        const next = await context.db.first<{ kind: string }>(`SELECT kind FROM jobs WHERE state = 'waiting' ORDER BY priority, id LIMIT 1`)
        const started = performance.now()
        if (!next || !(await runNextJob(context))) return seconds
        seconds[next.kind] = (seconds[next.kind] ?? 0) + (performance.now() - started) / 1000
      }
    },
    close: async () => {
      await workers.close()
      await context.db.close()
      await rm(dir, { recursive: true, force: true })
    },
  }
}
