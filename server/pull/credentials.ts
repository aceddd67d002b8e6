import { createCipheriv, createDecipheriv, hkdfSync, randomBytes } from 'node:crypto'
import { pullCredentials, type PullCredentials } from '../../shared/schemas/pulls'
import { PullFailed } from './pull-failed'

const algorithm = 'aes-256-gcm'

const keyOf = (sessionSecret: string): Buffer => Buffer.from(hkdfSync('sha256', sessionSecret, '', 'offing: credentials of pulls, version 1', 32))

/** Encrypts credentials for the table, bound to their feed. */
export function seal(sessionSecret: string, feedId: number, credentials: PullCredentials): string {
  const iv = randomBytes(12)
  const cipher = createCipheriv(algorithm, keyOf(sessionSecret), iv).setAAD(Buffer.from(`feed ${feedId}`))
  const sealed = Buffer.concat([cipher.update(JSON.stringify(credentials), 'utf8'), cipher.final()])
  return [1, iv.toString('base64'), cipher.getAuthTag().toString('base64'), sealed.toString('base64')].join('.')
}

/** PullFailed where the key has changed since. */
export function unseal(sessionSecret: string, feedId: number, stored: string): PullCredentials {
  const [, iv = '', tag = '', sealed = ''] = stored.split('.')
  try {
    const decipher = createDecipheriv(algorithm, keyOf(sessionSecret), Buffer.from(iv, 'base64'), { authTagLength: 16 })
    decipher.setAAD(Buffer.from(`feed ${feedId}`)).setAuthTag(Buffer.from(tag, 'base64'))
    const text = Buffer.concat([decipher.update(Buffer.from(sealed, 'base64')), decipher.final()]).toString('utf8')
    return pullCredentials.parse(JSON.parse(text))
  } catch {
    // Without the cause: what failed to decrypt is nobody's business.
    throw new PullFailed('The stored credentials can no longer be read, because SESSION_SECRET has changed. Give them again.', { endsRun: true, lasting: true })
  }
}

/** The Authorization header. */
export function authorizationOf(credentials: PullCredentials): string {
  if (credentials.kind === 'bearer') return `Bearer ${credentials.token}`
  return `Basic ${Buffer.from(`${credentials.user}:${credentials.password}`, 'utf8').toString('base64')}`
}
