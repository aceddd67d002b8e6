import { fileURLToPath } from 'node:url'
import { parseArgs } from 'node:util'
import { instant } from '../../shared/schemas/common'
import type { Context } from '../context'
import { readEnv } from '../env'
import { openContext } from '../open-context'
import { inProcessWorkers } from '../workers/in-process-workers'
import { startWorkers, type Workers } from '../workers/workers'
import { BadUsage } from './bad-usage'
import { createAdmin } from './create-admin'
import { createToken } from './create-token'
import { ingestFiles } from './ingest-files'
import { inspectFiles } from './inspect-files'
import { readStdin } from './read-stdin'

const usage = `npm run offing -- COMMAND
  migrate                                     bring the database to the newest schema
  create-admin --email E --password-stdin     make an admin, or give somebody the role and a new password
  create-token --email E                      make a personal token; it is the last line printed
  inspect FILE...                             say what is understood of a file, as JSON
  ingest [--feed ID] [--observed-at T] FILE...  take files in (only queued while a server runs)

Ends with 0 when all went well, 1 when a file was refused or something failed, 2 when called wrongly.`

const options = {
  email: { type: 'string' },
  'password-stdin': { type: 'boolean' },
  feed: { type: 'string' },
  'observed-at': { type: 'string' },
  help: { type: 'boolean', short: 'h' },
} as const

/** Which options each command knows: one meant for another is a mistake to be told, not to be passed over. */
const knows: Record<string, readonly (keyof typeof options)[]> = {
  migrate: [],
  'create-admin': ['email', 'password-stdin'],
  'create-token': ['email'],
  inspect: [],
  ingest: ['feed', 'observed-at'],
}

type Values = ReturnType<typeof parsed>['values']

/** Each answers whether all went well. */
const commands: Record<string, (files: string[], values: Values) => Promise<boolean>> = {
  migrate: (files) =>
    withContext(noFiles(files), async () => {
      console.log('The database has the newest schema.')
      return true
    }),
  'create-admin': (files, values) => {
    const email = emailGiven(values)
    if (!values['password-stdin']) throw new BadUsage('Give the password on standard input, with --password-stdin.')
    return withContext(noFiles(files), async (context) => {
      const password = await readStdin()
      if (!password) throw new BadUsage('Nothing came on standard input: the password is read from there.')
      const { created } = await createAdmin(context, { email, password })
      console.log(created ? `${email} is an admin now.` : `${email} was there already: now an admin, with the new password.`)
      return true
    })
  },
  'create-token': (files, values) => {
    const email = emailGiven(values)
    return withContext(noFiles(files), async (context) => {
      console.log(await createToken(context, { email }))
      return true
    })
  },
  inspect: async (files) => {
    const workers = threads()
    try {
      return await inspectFiles(workers, filesGiven(files))
    } finally {
      await workers.close()
    }
  },
  ingest: (files, values) => {
    const paths = filesGiven(files)
    const asked = { paths, feedId: feedGiven(values), observedAt: timeGiven(values) }
    return withContext(threads(), (context) => ingestFiles(context, asked))
  },
}

try {
  process.exitCode = (await run()) ? 0 : 1
} catch (error) {
  console.error(error instanceof BadUsage ? `${error.message}\n\n${usage}` : error instanceof Error ? error.message : error)
  process.exitCode = error instanceof BadUsage ? 2 : 1
}

async function run(): Promise<boolean> {
  const { positionals, values } = parsed()
  const [name, ...files] = positionals
  if (values.help) {
    console.log(usage)
    return true
  }
  if (name === undefined) throw new BadUsage('Say which command.')
  const command = Object.hasOwn(commands, name) ? commands[name] : undefined
  if (!command) throw new BadUsage(`There is no command ${name}.`)
  const strange = Object.keys(values).find((option) => !knows[name]!.some((known) => known === option))
  if (strange !== undefined) throw new BadUsage(`${name} has no option --${strange}.`)
  return command(files, values)
}

function parsed() {
  try {
    return parseArgs({ allowPositionals: true, options })
  } catch (error) {
    throw new BadUsage(error instanceof Error ? error.message.split('. To specify')[0]!.replace(/\.?$/, '.') : String(error), { cause: error })
  }
}

/** Files of others are read in a thread that can be ended, as in the server. */
function threads(): Workers {
  return startWorkers(fileURLToPath(new URL('./worker.js', import.meta.url)))
}

/** Commands need no session secret: they sign nobody in. */
async function withContext(workers: Workers, use: (context: Context) => Promise<boolean>): Promise<boolean> {
  try {
    const env = readEnv('development')
    const context = await openContext({ env: { ...env, logLevel: 'warn' }, workers })
    try {
      return await use(context)
    } finally {
      await context.db.close()
    }
  } finally {
    await workers.close()
  }
}

function noFiles(files: string[]): Workers {
  if (files.length > 0) throw new BadUsage(`${files[0]!} is too much: this command takes no files.`)
  return inProcessWorkers()
}

function emailGiven(values: Values): string {
  if (!values.email) throw new BadUsage('Say whose, with --email E.')
  return values.email
}

function filesGiven(files: string[]): string[] {
  if (files.length === 0) throw new BadUsage('Name at least one file.')
  return files
}

function feedGiven({ feed }: Values): number | null {
  if (feed === undefined) return null
  if (!/^[1-9]\d{0,14}$/.test(feed)) throw new BadUsage('--feed wants the number of a feed.')
  return Number(feed)
}

function timeGiven(values: Values): number | null {
  const text = values['observed-at']
  if (text === undefined) return null
  if (!instant.safeParse(text).success) throw new BadUsage('--observed-at wants an instant such as 2026-06-11T12:40:00Z.')
  return Date.parse(text)
}
