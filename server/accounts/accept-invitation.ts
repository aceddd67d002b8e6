import { ApiError } from '../api-error'
import type { Context } from '../context'
import { setRoles } from '../queries/people'
import { audit } from './audit'
import { openInvitation } from './invitations'
import { hashPassword } from './passwords'
import { startSession, type SessionTokens } from './sessions'

/** Makes the account the invitation promised and signs the person in. */
export async function acceptInvitation(
  context: Context,
  { token, name, password }: { token: string; name?: string | undefined; password: string },
): Promise<SessionTokens> {
  await openInvitation(context, token)
  const passwordHash = await hashPassword(context, password)
  return context.db.write(async (tx) => {
    const invitation = await openInvitation(context, token, tx)
    const { email, roles } = invitation
    if (await context.models.users.findOne({ where: { email }, transaction: tx })) {
      throw new ApiError('conflict', 'Somebody with this e-mail address has an account already. Sign in.')
    }
    const now = context.clock.now()
    const user = await context.models.users.create(
      { email, name: name ?? invitation.name, passwordHash, timeZone: 'UTC', disabled: false, createdAt: now },
      { transaction: tx },
    )
    await setRoles(context.db, user.id, roles, tx)
    await invitation.update({ acceptedAt: now }, { transaction: tx })
    await audit(context, tx, { userId: user.id, action: 'invitation:accept', subject: `invitation ${invitation.id}`, details: { roles } })
    return startSession(context, tx, user.id)
  })
}
