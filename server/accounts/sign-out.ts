import type { Context } from '../context'
import { readAccessToken } from './access-token'
import { audit } from './audit'
import { sessionOfRefreshToken } from './refresh-token'
import { revokeSession } from './sessions'

/** Ends the session that either cookie belongs to; without one there is nothing to end. */
export async function signOut(context: Context, shown: { access: string | null; refresh: string | null }): Promise<void> {
  const sessionId = sessionShown(context, shown)
  if (sessionId === null) return
  await context.db.write(async (tx) => {
    const session = await context.models.sessions.findByPk(sessionId, { transaction: tx })
    if (!session || session.revokedAt !== null) return
    await revokeSession(context, tx, sessionId)
    await audit(context, tx, { userId: session.userId, action: 'session:end', subject: `user ${session.userId}` })
  })
}

function sessionShown(context: Context, { access, refresh }: { access: string | null; refresh: string | null }): number | null {
  const bySecret = refresh === null ? null : sessionOfRefreshToken(context, refresh)
  if (bySecret !== null) return bySecret
  const read = access === null ? 'not-valid' : readAccessToken(context, access)
  return typeof read === 'string' ? null : read.sessionId
}
