import { ApiError } from '../api-error'
import type { Context } from '../context'
import { audit } from './audit'
import { passwordMatches } from './passwords'
import { startSession, type SessionTokens } from './sessions'

/** Opens a session; a wrong password and an unknown address are told in the same words after the same time. */
export async function signIn(context: Context, credentials: { email: string; password: string }): Promise<SessionTokens> {
  const user = await context.models.users.findOne({ where: { email: credentials.email } })
  const matches = await passwordMatches(context, credentials.password, user?.passwordHash ?? null)
  if (!user || !matches) {
    await noteRefusal(context, user?.id ?? null, 'wrong e-mail or password')
    throw new ApiError('wrong-credentials', 'E-mail or password is wrong.')
  }
  if (user.disabled) {
    await noteRefusal(context, user.id, 'disabled')
    throw new ApiError('wrong-credentials', 'This account is disabled. Ask an admin of Offing to enable it.')
  }
  return context.db.write(async (tx) => {
    const tokens = await startSession(context, tx, user.id)
    await audit(context, tx, { userId: user.id, action: 'session:start', subject: `user ${user.id}` })
    return tokens
  })
}

function noteRefusal(context: Context, userId: number | null, reason: string): Promise<void> {
  const subject = userId === null ? 'unknown e-mail' : `user ${userId}`
  return context.db.write((tx) => audit(context, tx, { userId: null, action: 'session:refuse', subject, details: { reason } }))
}
