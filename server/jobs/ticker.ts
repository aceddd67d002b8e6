import { schedule } from 'node-cron'
import type { Context } from '../context'
import { deliverDue } from '../mail/delivery'
import { scanInbox } from '../pipeline/scan-inbox'
import { refreshStandings } from '../pipeline/refresh-standings'
import { runNextJob } from './run-job'

export interface Ticker {
  /** Runs everything that is due now, once; answers when nothing is left. Used by tests and by the demo's seeding. */
  drain(): Promise<void>
  /** Looks at once instead of at the next second. */
  wake(): void
  stop(): Promise<void>
}

interface Wheel {
  turn(): Promise<void>
}

/** node-cron only wakes these; each never overlaps itself, and what is due is a row in the database. */
export function startTicker(context: Context, options: { cron: boolean }): Ticker {
  let stopped = false
  const jobs = wheel(async () => {
    while (!stopped && (await runNextJob(context)));
    context.lastTickAt = context.clock.now()
  })
  const inbox = wheel(() => scanInbox(context))
  const letters = wheel(async () => void (await deliverDue(context)))
  const standings = wheel(() => refreshStandings(context))
  const safely = (name: string, one: Wheel) => () =>
    stopped ? Promise.resolve() : one.turn().catch((error) => context.log.error({ err: error, wheel: name }, 'a tick failed'))
  const turnJobs = safely('jobs', jobs)
  const turnLetters = safely('letters', letters)
  const tasks = options.cron
    ? [
        schedule('* * * * * *', turnJobs),
        schedule('* * * * * *', safely('inbox', inbox)),
        schedule('* * * * * *', turnLetters),
        schedule('0 */10 * * * *', safely('standings', standings)),
      ]
    : []
  return {
    drain: async () => {
      await inbox.turn()
      await jobs.turn()
      await letters.turn()
    },
    wake: () => void turnJobs().then(turnLetters),
    stop: async () => {
      stopped = true
      await Promise.all(tasks.map((task) => task.destroy()))
      await Promise.all([jobs.turn(), inbox.turn(), letters.turn()].map((turn) => turn.catch(() => undefined)))
    },
  }
}

/** A turn asked for while one is under way follows it; more than one such is one. */
function wheel(run: () => Promise<void>): Wheel {
  let current: Promise<void> | null = null
  let next: Promise<void> | null = null
  const start = () => {
    current = run().finally(() => (current = null))
    return current
  }
  return {
    turn: () => {
      if (!current) return start()
      next ??= current.catch(() => undefined).then(() => {
        next = null
        return start()
      })
      return next
    },
  }
}
