import { existsSync } from 'node:fs'
import { Piscina } from 'piscina'
import { LayerRefused } from '../grids/layer-refused'
import type { Tasks } from './tasks'
import type { Outcome } from './worker'

type Run = <K extends keyof Tasks>(
  task: K,
  input: Tasks[K]['input'],
  options?: { signal?: AbortSignal },
) => Promise<Tasks[K]['output']>

/** `light` keeps one worker free for tiles, points and passwords while `heavy` reads files. */
export interface Workers {
  light: Run
  heavy: Run
  close(): Promise<void>
}

/** Starts the pools on the bundled worker (`npm run build:server` makes it). */
export function startWorkers(bundle: string): Workers {
  if (!existsSync(bundle)) throw new Error(`The worker has not been built: ${bundle} is missing. Run: npm run build`)
  const light = new Piscina({ filename: bundle, minThreads: 1, maxThreads: 1, idleTimeout: Infinity })
  const heavy = new Piscina({ filename: bundle, minThreads: 1, maxThreads: 1, idleTimeout: Infinity })
  return {
    light: runIn(light),
    heavy: runIn(heavy),
    close: async () => {
      await Promise.all([light.destroy(), heavy.destroy()])
    },
  }
}

function runIn(pool: Piscina): Run {
  return async (task, input, options = {}) =>
    outcomeOf(await pool.run({ task, input }, options.signal ? { signal: options.signal } : {}))
}

/** Errors lose their class between threads; a refusal is carried as data and thrown again here. */
export function outcomeOf<T>(outcome: Outcome<T>): T {
  if ('refused' in outcome) {
    const { code, message, facts } = outcome.refused
    throw new LayerRefused(code, message, facts)
  }
  return outcome.value
}
