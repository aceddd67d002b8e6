import { randomBytes } from 'node:crypto'
import { resolve } from 'node:path'
import { z } from 'zod'

const blankAsMissing = (value: unknown) => (value === '' ? undefined : value)
const optional = <T extends z.ZodType>(type: T) => z.preprocess(blankAsMissing, type)

const schema = z.object({
  PORT: optional(z.coerce.number().int().min(0).max(65535).default(4100)),
  HOST: optional(z.string().default('127.0.0.1')),
  BASE_URL: optional(z.url().optional()),
  DATA_DIR: optional(z.string().default('data/var')),
  SESSION_SECRET: optional(z.string().optional()),
  SMTP_URL: optional(z.string().optional()),
  MAIL_FROM: optional(z.string().default('Offing <offing@localhost>')),
  MAX_UPLOAD_MB: optional(z.coerce.number().positive().default(2048)),
  PULL_ALLOW_PRIVATE: optional(z.enum(['true', 'false']).default('false')),
  TRUST_PROXY: optional(z.coerce.number().int().min(0).max(10).default(0)),
  TILE_URL: optional(z.string().default('')),
  LOG_LEVEL: optional(z.enum(['fatal', 'error', 'warn', 'info', 'debug', 'trace', 'silent']).default('info')),
  CHROMIUM_PATH: optional(z.string().optional()),
})

export type Mode = 'production' | 'development' | 'demo' | 'test'

export interface Env {
  mode: Mode
  port: number
  host: string
  baseUrl: string
  dataDir: string
  sessionSecret: string
  /** Null: letters stay in the outbox until an address is set. */
  smtpUrl: string | null
  mailFrom: string
  maxUploadBytes: number
  /** Feeds may fetch from http and from private networks. */
  pullAllowPrivate: boolean
  trustProxy: number
  tileUrl: string
  logLevel: string
}

export class EnvNotValid extends Error {
  override name = 'EnvNotValid'
}

/** Reads and checks the environment once; throws EnvNotValid with a sentence that says what to set. */
export function readEnv(mode: Mode, source: NodeJS.ProcessEnv = process.env): Env {
  const parsed = schema.safeParse(source)
  if (!parsed.success) {
    const issues = parsed.error.issues.map((issue) => `${issue.path.join('.')}: ${issue.message}`)
    throw new EnvNotValid(`The environment is not valid. ${issues.join('; ')}. See .env.example.`)
  }
  const env = parsed.data
  return {
    mode,
    port: env.PORT,
    host: env.HOST,
    baseUrl: (env.BASE_URL ?? `http://localhost:${env.PORT}`).replace(/\/+$/, ''),
    dataDir: resolve(env.DATA_DIR),
    sessionSecret: sessionSecret(mode, env.SESSION_SECRET),
    smtpUrl: env.SMTP_URL ?? null,
    mailFrom: env.MAIL_FROM,
    maxUploadBytes: Math.round(env.MAX_UPLOAD_MB * 1024 * 1024),
    pullAllowPrivate: env.PULL_ALLOW_PRIVATE === 'true',
    trustProxy: env.TRUST_PROXY,
    tileUrl: env.TILE_URL,
    logLevel: env.LOG_LEVEL,
  }
}

function sessionSecret(mode: Mode, given: string | undefined): string {
  if (mode !== 'production') return given ?? randomBytes(32).toString('hex')
  if (!given) {
    throw new EnvNotValid('SESSION_SECRET is not set. Set it to at least 32 random characters, for example the output of: openssl rand -hex 32')
  }
  if (given.length < 32 || new Set(given).size < 10) {
    throw new EnvNotValid('SESSION_SECRET is too weak. Set it to at least 32 random characters, for example the output of: openssl rand -hex 32')
  }
  return given
}

export function chromiumPath(source: NodeJS.ProcessEnv = process.env): string | null {
  return source['CHROMIUM_PATH'] || null
}
