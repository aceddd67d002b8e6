import type { Logger } from 'pino'
import type { Clock } from './clock'
import type { Database } from './db'
import type { Env } from './env'
import type { Models } from './models'
import type { News } from './news'
import type { MailCatcher } from './mail/catcher'
import type { Workers } from './workers/workers'

/** What every use case is handed: one per process, or one per test. */
export interface Context {
  env: Env
  clock: Clock
  db: Database
  models: Models
  log: Logger
  news: News
  workers: Workers
  /** Set in the demo and in development only. */
  mailCatcher: MailCatcher | null
  /** When the queue was last looked at; null before the first time. */
  lastTickAt: number | null
  /** Looks at the queue at once, after something was put into it. */
  wake(): void
}
