import { schedule } from 'node-cron'
import type { Context } from '../context'
import { deliverDue } from '../mail/delivery'
import { scanInbox } from '../pipeline/scan-inbox'
import { stopPulls } from '../pull/network'
import { queueDuePulls } from '../pull/queue-pulls'
import { refreshStandings } from '../pipeline/refresh-standings'
import { runNextJob } from './run-job'
import { tidy } from './tidy'

export interface Ticker {
  /** Runs everything that is due now, once; answers when nothing is left. Used by tests and by the demo's seeding. */
  drain(): Promise<void>
  /** Looks at once instead of at the next second. */
  wake(): void
  stop(): Promise<void>
}

/** Feeds fetched for side by side; a slow server holds up only its own. */
const pullsAtOnce = 3

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
  const duePulls = wheel(() => queueDuePulls(context))
  const pulls = Array.from({ length: pullsAtOnce }, () =>
    wheel(async () => {
      while (!stopped && (await runNextJob(context, 'pull')));
    }),
  )
  const standings = wheel(() => refreshStandings(context))
  const oldRows = wheel(() => tidy(context))
  const safely = (name: string, one: Wheel) => () =>
    stopped ? Promise.resolve() : one.turn().catch((error) => context.log.error({ err: error, wheel: name }, 'a tick failed'))
  const turnJobs = safely('jobs', jobs)
  const turnPulls = () => void Promise.all(pulls.map((one) => safely('pulls', one)()))
  const turnLetters = safely('letters', letters)
  const tasks = options.cron
    ? [
        schedule('* * * * * *', turnJobs),
        schedule('* * * * * *', safely('inbox', inbox)),
        schedule('* * * * * *', turnLetters),
        schedule('* * * * * *', () => safely('due pulls', duePulls)().then(turnPulls)),
        schedule('0 */10 * * * *', safely('standings', standings)),
        schedule('30 */15 * * * *', safely('old rows', oldRows)),
      ]
    : []
  return {
    drain: async () => {
      await inbox.turn()
      await jobs.turn()
      await letters.turn()
    },
    wake: () => {
      void turnJobs().then(turnLetters)
      turnPulls()
    },
    stop: async () => {
      stopped = true
      stopPulls(context)
      await Promise.all(tasks.map((task) => task.destroy()))
      await Promise.all([jobs, inbox, letters, oldRows, ...pulls].map((one) => one.turn().catch(() => undefined)))
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
