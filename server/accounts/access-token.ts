import jwt from 'jsonwebtoken'
import type { Context } from '../context'

export const accessMinutes = 15

export type AccessTokenRead = { userId: number; sessionId: number } | 'expired' | 'not-valid'

export function signAccessToken(context: Context, userId: number, sessionId: number): { token: string; expiresAt: number } {
  const issuedAt = Math.floor(context.clock.system() / 1000)
  const expiresAt = issuedAt + accessMinutes * 60
  const payload = { sub: String(userId), sid: sessionId, iat: issuedAt, exp: expiresAt }
  return { token: jwt.sign(payload, context.env.sessionSecret, { algorithm: 'HS256' }), expiresAt: expiresAt * 1000 }
}

export function readAccessToken(context: Context, token: string): AccessTokenRead {
  try {
    const payload = jwt.verify(token, context.env.sessionSecret, {
      algorithms: ['HS256'],
      clockTimestamp: Math.floor(context.clock.system() / 1000),
    })
    if (typeof payload === 'string') return 'not-valid'
    const userId = Number(payload.sub)
    const sessionId: unknown = payload['sid']
    if (!Number.isInteger(userId) || typeof sessionId !== 'number') return 'not-valid'
    return { userId, sessionId }
  } catch (error) {
    return error instanceof jwt.TokenExpiredError ? 'expired' : 'not-valid'
  }
}
