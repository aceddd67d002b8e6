import { join } from 'node:path'
import { pino } from 'pino'
import { createClock } from '../../server/clock'
import { openDatabase } from '../../server/db'
import { readEnv } from '../../server/env'
import { deliverDue } from '../../server/mail/delivery'
import { modelsOf } from '../../server/models'
import { createNews } from '../../server/news'

/** A process of its own that delivers one data folder's outbox; a test kills it on the way. */
const [dataDir = '', smtpUrl = ''] = process.argv.slice(2)
const db = await openDatabase(join(dataDir, 'offing.sqlite'))
const unused = () => Promise.reject(new Error('Delivering needs no workers.'))
await deliverDue({
  env: readEnv('test', { DATA_DIR: dataDir, SMTP_URL: smtpUrl }),
  clock: createClock(),
  db,
  models: modelsOf(db),
  log: pino(),
  news: createNews(),
  workers: { light: unused, heavy: unused, second: unused, close: async () => undefined },
  mailCatcher: null,
  lastTickAt: null,
  wake: () => undefined,
})
