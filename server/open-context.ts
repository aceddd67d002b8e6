import { mkdir } from 'node:fs/promises'
import { join } from 'node:path'
import { pino } from 'pino'
import { createClock } from './clock'
import type { Context } from './context'
import { openDatabase } from './db'
import type { Env } from './env'
import type { MailCatcher } from './mail/catcher'
import { migrate } from './migrations'
import { modelsOf } from './models'
import { createNews } from './news'
import { settingOf } from './queries/settings'
import type { Workers } from './workers/workers'

export interface Parts {
  env: Env
  workers: Workers
  startCatcher?: ((context: Context) => Promise<MailCatcher>) | undefined
}

/** Opens a data folder: the database brought to the newest schema, the clock where it stood. */
export async function openContext({ env, workers, startCatcher }: Parts): Promise<Context> {
  await mkdir(join(env.dataDir, 'inbox'), { recursive: true })
  const db = await openDatabase(join(env.dataDir, 'offing.sqlite'))
  await migrate(db)
  const clock = createClock(Number((await settingOf(db, 'clock-offset')) ?? 0))
  const context: Context = {
    env,
    clock,
    db,
    models: modelsOf(db),
    log: pino({ level: env.logLevel }, pino.destination(2)),
    news: createNews(),
    workers,
    mailCatcher: null,
    lastTickAt: null,
    wake: () => undefined,
  }
  if (startCatcher) context.mailCatcher = await startCatcher(context)
  return context
}
