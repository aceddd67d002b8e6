import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import type { SessionRecord } from '../models/session'
import { signAccessToken } from './access-token'
import { audit } from './audit'
import { firstRefreshToken, nextRefreshToken, sessionOfRefreshToken } from './refresh-token'
import { hashSecret, newSecret } from './secret'

export const sessionDays = 30
const sessionMs = sessionDays * 24 * 3600_000
/** Two tabs renew with the same token at nearly the same time; later than this it is a stolen one. */
export const graceMs = 30_000

export interface SessionTokens {
  userId: number
  access: string
  refresh: string
  /** When the access token ends. */
  expiresAt: number
}

export async function startSession(context: Context, tx: Transaction, userId: number): Promise<SessionTokens> {
  const now = context.clock.system()
  const session = await context.models.sessions.create(
    { userId, refreshHash: hashSecret(newSecret()), createdAt: now, expiresAt: now + sessionMs },
    { transaction: tx },
  )
  const refresh = firstRefreshToken(context, session.id)
  await session.update({ refreshHash: hashSecret(refresh) }, { transaction: tx })
  return tokens(context, session, refresh)
}

/** Renews a session and rotates its refresh token; an old one shown again ends the session. */
export async function refreshSession(context: Context, shown: string): Promise<SessionTokens> {
  const renewed = await context.db.write((tx) => renew(context, tx, shown))
  if (!renewed) throw new ApiError('not-signed-in', 'The session is over. Sign in again.')
  return renewed
}

async function renew(context: Context, tx: Transaction, shown: string): Promise<SessionTokens | null> {
  const now = context.clock.system()
  const session = await sessionOf(context, tx, shown)
  if (!session || session.revokedAt !== null || session.expiresAt <= now) return null
  const user = await context.models.users.findByPk(session.userId, { transaction: tx })
  if (!user || user.disabled) return null
  const hash = hashSecret(shown)
  const next = nextRefreshToken(context, session.id, shown)
  const justRotated = session.previousUntil !== null && now <= session.previousUntil
  if (session.refreshHash === hash) {
    // At most one rotation in a grace, so that the token before last is never a tab still on its way.
    if (justRotated) return tokens(context, session, shown)
    const rotated = { refreshHash: hashSecret(next), previousHash: hash, previousUntil: now + graceMs, expiresAt: now + sessionMs }
    await session.update(rotated, { transaction: tx })
    return tokens(context, session, next)
  }
  if (justRotated && session.previousHash === hash && session.refreshHash === hashSecret(next)) return tokens(context, session, next)
  await session.update({ revokedAt: now }, { transaction: tx })
  await audit(context, tx, { userId: session.userId, action: 'session:reuse', subject: `session ${session.id}` })
  return null
}

async function sessionOf(context: Context, tx: Transaction, shown: string): Promise<SessionRecord | null> {
  const current = await context.models.sessions.findOne({ where: { refreshHash: hashSecret(shown) }, transaction: tx })
  if (current) return current
  const id = sessionOfRefreshToken(context, shown)
  return id === null ? null : context.models.sessions.findByPk(id, { transaction: tx })
}

function tokens(context: Context, session: SessionRecord, refresh: string): SessionTokens {
  const access = signAccessToken(context, session.userId, session.id)
  return { userId: session.userId, access: access.token, refresh, expiresAt: access.expiresAt }
}

export async function revokeSession(context: Context, tx: Transaction, sessionId: number): Promise<void> {
  await context.models.sessions.update({ revokedAt: context.clock.system() }, { where: { id: sessionId, revokedAt: null }, transaction: tx })
}

export async function revokeAllSessions(context: Context, tx: Transaction, userId: number): Promise<void> {
  await context.models.sessions.update({ revokedAt: context.clock.system() }, { where: { userId, revokedAt: null }, transaction: tx })
}
