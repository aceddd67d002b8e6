import { createHmac, timingSafeEqual } from 'node:crypto'
import type { Context } from '../context'
import { newSecret } from './secret'

/**
 * `session.secret.tag`. The secret is opaque and only its hash is stored; the tag proves that a token, however old, was
 * once given out for that session, so that an old one shown again is told from a made-up one.
 */
export function firstRefreshToken(context: Context, sessionId: number): string {
  return build(context, sessionId, newSecret())
}

/** The same old token always leads to the same new one, so that two tabs renewing at once end up with one cookie. */
export function nextRefreshToken(context: Context, sessionId: number, old: string): string {
  return build(context, sessionId, mac(context, `next ${old}`))
}

/** The session a token was once given out for; null where it was made up. */
export function sessionOfRefreshToken(context: Context, token: string): number | null {
  const [session, secret, tag] = token.split('.')
  if (!session || !secret || !tag || !/^\d{1,15}$/.test(session)) return null
  const expected = Buffer.from(tagOf(context, session, secret))
  const shown = Buffer.from(tag)
  return shown.length === expected.length && timingSafeEqual(shown, expected) ? Number(session) : null
}

function build(context: Context, sessionId: number, secret: string): string {
  return `${sessionId}.${secret}.${tagOf(context, String(sessionId), secret)}`
}

const tagOf = (context: Context, session: string, secret: string): string => mac(context, `tag ${session} ${secret}`).slice(0, 22)

function mac(context: Context, text: string): string {
  return createHmac('sha256', context.env.sessionSecret).update(`refresh ${text}`).digest('base64url')
}
