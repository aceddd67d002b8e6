import { copyFile, mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import type { Express } from 'express'
import { pino } from 'pino'
import { inject } from 'vitest'
import { createApp } from '../../server/app'
import type { Context } from '../../server/context'
import { openDatabase } from '../../server/db'
import { readEnv } from '../../server/env'
import { startMailCatcher, type MailCatcher } from '../../server/mail/catcher'
import { stopDelivery } from '../../server/mail/delivery'
import { modelsOf } from '../../server/models'
import { createNews } from '../../server/news'
import { inProcessWorkers } from '../../server/workers/in-process-workers'
import { createTestClock, type TestClock } from './test-clock'

export interface TestContext extends Context {
  clock: TestClock
  app: Express
  close(): Promise<void>
}

export interface TestContextOptions {
  /** Business time the test begins at; machine time if left out. */
  at?: Date
  /** With a real SMTP catcher that the outbox delivers to. */
  mail?: boolean
}

const secret = 'the test secret 0123456789 abcdefghij'

/** Everything a use case needs, on a fresh copy of the migrated database in a folder of its own. */
export async function createTestContext({ at, mail = false }: TestContextOptions = {}): Promise<TestContext> {
  const dir = await mkdtemp(join(tmpdir(), 'offing-test-'))
  await copyFile(inject('databaseTemplate'), join(dir, 'offing.sqlite'))
  const clock = createTestClock(at)
  const mailCatcher = mail ? await startMailCatcher({ port: 0, host: '127.0.0.1', dir: join(dir, 'caught'), clock }) : null
  const context = await openTestContext(dir, clock, mailCatcher)
  const { close } = context
  context.close = async () => {
    await close()
    await mailCatcher?.close()
    await rm(dir, { recursive: true, force: true })
  }
  return context
}

/** Opens a data folder that is there already, as a restarted process would. */
export async function openTestContext(dir: string, clock: TestClock, mailCatcher: MailCatcher | null): Promise<TestContext> {
  const env = readEnv('test', { DATA_DIR: dir, SESSION_SECRET: secret, SMTP_URL: mailCatcher?.url, MAIL_FROM: 'Offing <offing@example.org>' })
  const db = await openDatabase(join(dir, 'offing.sqlite'))
  const context: Context = {
    env,
    clock,
    db,
    models: modelsOf(db),
    log: pino({ level: 'silent' }),
    news: createNews(),
    workers: inProcessWorkers(),
    mailCatcher,
    lastTickAt: null,
    wake: () => undefined,
  }
  const close = async () => {
    await stopDelivery(context)
    await db.close()
  }
  return Object.assign(context, { clock, app: createApp(context), close })
}
