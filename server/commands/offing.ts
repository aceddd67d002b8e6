import { createReadStream } from 'node:fs'
import { stat } from 'node:fs/promises'
import { basename } from 'node:path'
import { parseArgs } from 'node:util'
import type { Context } from '../context'
import { EnvNotValid, readEnv } from '../env'
import { inspectGrid } from '../grids/inspect'
import { LayerRefused } from '../grids/layer-refused'
import { takeInstanceLock } from '../instance-lock'
import { startTicker } from '../jobs/ticker'
import { voidLeases } from '../jobs/queue'
import { openContext } from '../open-context'
import { receiveFile } from '../pipeline/receive-file'
import { storeStream } from '../pipeline/stored-files'
import { inProcessWorkers } from '../workers/in-process-workers'
import { createAdmin } from './create-admin'
import { createToken } from './create-token'
import { readStdin } from './read-stdin'

const usage = `npm run offing -- COMMAND
  migrate                                     bring the database to the newest schema
  create-admin --email E --password-stdin     make an admin, or give somebody the role and a new password
  create-token --email E                      make a personal token; it is the last line printed
  inspect FILE                                say what is understood of a file
  ingest FILE...                              take files in (only queued while a server runs)`

const { positionals, values } = parseArgs({
  allowPositionals: true,
  options: { email: { type: 'string' }, 'password-stdin': { type: 'boolean' } },
})
const [command, ...files] = positionals

const commands: Record<string, () => Promise<void>> = {
  migrate: () => withContext(async () => console.log('The database has the newest schema.')),
  'create-admin': () =>
    withContext(async (context) => {
      const password = values['password-stdin'] ? await readStdin() : ''
      if (!password) throw new Error('Give the password on standard input, with --password-stdin.')
      const { created } = await createAdmin(context, { email: emailGiven(), password })
      console.log(created ? `${emailGiven()} is an admin now.` : `${emailGiven()} was there already: now an admin, with the new password.`)
    }),
  'create-token': () => withContext(async (context) => console.log(await createToken(context, { email: emailGiven() }))),
  inspect: async () => {
    for (const file of filesGiven()) console.log(JSON.stringify(await inspectGrid(file, basename(file)), null, 2))
  },
  ingest: () => withContext(ingest),
}

try {
  const run = command === undefined ? undefined : commands[command]
  if (!run) throw new Error(command === undefined ? usage : `There is no command ${command}.\n\n${usage}`)
  await run()
} catch (error) {
  const plain = error instanceof LayerRefused || error instanceof EnvNotValid || error instanceof Error
  console.error(plain ? error.message : error)
  process.exitCode = 1
}

async function ingest(context: Context): Promise<void> {
  const lock = await takeInstanceLock(context.env.dataDir)
  const ids: number[] = []
  for (const path of filesGiven()) {
    await stat(path)
    const arrived = await storeStream(context.env, createReadStream(path))
    const file = await receiveFile(context, { name: basename(path), arrived, origin: 'command', userId: null, feedId: null, observedAt: null })
    ids.push(file.id)
  }
  if (!lock) {
    console.log(`${ids.length} queued; the running server takes them from here.`)
    return
  }
  await voidLeases(context)
  const ticker = startTicker(context, { cron: false })
  await ticker.drain()
  await ticker.stop()
  await lock.release()
  for (const file of await context.models.files.findAll({ where: { id: ids } })) {
    console.log(`${file.name}: ${file.status}${file.refusal ? `. ${file.refusal.message}` : ''}${file.waitingFor ? `. ${file.waitingFor}` : ''}`)
  }
}

/** Commands need no session secret: they sign nobody in. */
async function withContext(use: (context: Context) => Promise<void>): Promise<void> {
  const env = readEnv('development')
  const context = await openContext({ env: { ...env, logLevel: 'warn' }, workers: inProcessWorkers() })
  try {
    await use(context)
  } finally {
    await context.db.close()
  }
}

function emailGiven(): string {
  if (!values.email) throw new Error('Say whose, with --email E.')
  return values.email
}

function filesGiven(): string[] {
  if (files.length === 0) throw new Error('Name at least one file.')
  return files
}
