import { existsSync } from 'node:fs'
import { LayerRefused } from '../grids/layer-refused'
import { createLane, type Lane, ThreadEnded, TookTooLong } from './lane'
import type { Tasks } from './tasks'
import type { Outcome } from './worker'

type Run = <K extends keyof Tasks>(
  task: K,
  input: Tasks[K]['input'],
  options?: { signal?: AbortSignal },
) => Promise<Tasks[K]['output']>

/**
 * `light` keeps one worker free for tiles, points and passwords while `heavy` reads files; `second` takes half of what can be
 * halved, years of layers above all.
 */
export interface Workers {
  light: Run
  heavy: Run
  second: Run
  close(): Promise<void>
}

/** After these a task is given up and its thread ended. */
const secondsFor: Partial<Record<keyof Tasks, number>> = { inspectFile: 300, drawTile: 60, readCells: 120, surveyLayer: 120, findPatches: 60, readView: 60, checkOutline: 60, measureOutline: 60, readAreas: 60, findLandMarks: 60, drawMaskTile: 60 }
const secondsForOthers = 900

/** Tasks that read what somebody sent: what ends their thread is the file's doing until shown otherwise. */
const readsFiles: ReadonlySet<keyof Tasks> = new Set(['inspectFile', 'summariseViews', 'drawTile', 'readCells', 'surveyLayer', 'findPatches', 'readView', 'decodeLayers', 'readAreas', 'findLandMarks', 'countCells'])

/** Starts the threads on the bundled worker (`npm run build:server` makes it). */
export function startWorkers(bundle: string, seconds: Partial<Record<keyof Tasks, number>> = {}): Workers {
  if (!existsSync(bundle)) throw new Error(`The worker has not been built: ${bundle} is missing. Run: npm run build`)
  const start = () => createLane<Outcome<unknown>>(bundle, (outcome) => outcome.spent, { task: 'greet', input: null })
  const [light, heavy] = [start(), start()]
  // A thread takes memory: this one begins with the first work there is for it.
  let second: Lane<Outcome<unknown>> | null = null
  const limits = { ...secondsFor, ...seconds }
  return {
    light: runIn(light, limits),
    heavy: runIn(heavy, limits),
    second: (task, input, options) => runIn((second ??= start()), limits)(task, input, options),
    close: async () => {
      await Promise.all([light.close(), heavy.close(), second?.close()])
    },
  }
}

function runIn(lane: Lane<Outcome<unknown>>, limits: Partial<Record<keyof Tasks, number>>): Run {
  return async <K extends keyof Tasks>(task: K, input: Tasks[K]['input'], options: { signal?: AbortSignal } = {}) => {
    try {
      const outcome = await lane.run({ task, input }, { signal: options.signal, seconds: limits[task] ?? secondsForOthers })
      return outcomeOf(outcome as Outcome<Tasks[K]['output']>)
    } catch (error) {
      throw readsFiles.has(task) ? givenUp(task, error) : error
    }
  }
}

function givenUp(task: keyof Tasks, error: unknown): unknown {
  if (error instanceof TookTooLong) {
    const { seconds } = error
    return new LayerRefused('reading-failed', `Reading this file took longer than ${seconds} s, so it was given up.`, { task, seconds }, { cause: error })
  }
  if (error instanceof ThreadEnded) {
    return new LayerRefused('reading-failed', 'Reading this file ended the reader itself, so it was given up.', { task, reason: error.message.slice(0, 300) }, { cause: error })
  }
  return error
}

/** Errors lose their class between threads; a refusal is carried as data and thrown again here. */
export function outcomeOf<T>(outcome: Outcome<T>): T {
  if ('fault' in outcome) throw outcome.fault
  if ('refused' in outcome) {
    const { code, message, facts } = outcome.refused
    throw new LayerRefused(code, message, facts)
  }
  return outcome.value
}
