import { Piscina } from 'piscina'

/** The thread took longer than it was given, and was ended. */
export class TookTooLong extends Error {
  override name = 'TookTooLong'
  constructor(readonly seconds: number) {
    super(`The task took longer than ${seconds} s and was ended.`)
  }
}

/** The thread ended under its task: out of memory, or by its own fault. */
export class ThreadEnded extends Error {
  override name = 'ThreadEnded'
}

export interface LaneOptions {
  signal?: AbortSignal | undefined
  seconds: number
}

export interface Lane<Answer> {
  run(call: unknown, options: LaneOptions): Promise<Answer>
  close(): Promise<void>
}

/**
 * One thread that does one task at a time, in order. It is replaced before the next task whenever it was ended, ended
 * itself, or answered that it is spent. It is greeted first, so that a module that does not load is told from a task that
 * ends its thread; other faults the module answers itself.
 */
export function createLane<Answer>(module: string, isSpent: (answer: Answer) => boolean, greeting: unknown): Lane<Answer> {
  const start = () => {
    const made = new Piscina({ filename: module, minThreads: 1, maxThreads: 1, idleTimeout: Infinity })
    // An idle thread that fails holds no task; the pool starts another by itself.
    return made.on('error', () => undefined)
  }
  let pool = start()
  let closed = false
  let loaded: Promise<unknown> | null = null
  let last: Promise<unknown> = Promise.resolve()

  async function replace(): Promise<void> {
    const old = pool
    await old.destroy()
    loaded = null
    if (!closed) pool = start()
  }

  async function inTurn(call: unknown, { signal, seconds }: LaneOptions): Promise<Answer> {
    if (closed) throw new Error('The workers are closed.')
    signal?.throwIfAborted()
    await (loaded ??= pool.run(greeting))
    const ending = new AbortController()
    const timer = setTimeout(() => ending.abort(), seconds * 1000)
    try {
      return (await pool.run(call, { signal: signal ? AbortSignal.any([signal, ending.signal]) : ending.signal })) as Answer
    } catch (error) {
      signal?.throwIfAborted()
      if (ending.signal.aborted) throw new TookTooLong(seconds)
      throw new ThreadEnded(error instanceof Error ? error.message : String(error), { cause: error })
    } finally {
      clearTimeout(timer)
    }
  }

  return {
    run: (call, options) => {
      const turn = last.then(() => inTurn(call, options))
      last = turn.then(
        (answer) => (isSpent(answer) ? replace() : undefined),
        () => replace(),
      )
      return turn
    },
    close: async () => {
      closed = true
      await pool.destroy()
      await last.catch(() => undefined)
    },
  }
}
