import type { Role } from '../../shared/permissions'
import { paths } from '../../shared/paths'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import { invitationLetter } from '../mail/letters/invitation'
import { enqueueLetter, messageIdFor } from '../mail/outbox'
import type { InvitationRecord } from '../models/invitation'
import { audit } from './audit'
import type { Person } from './person'
import { hashSecret, newSecret } from './secret'

const validDays = 7

export interface NewInvitation {
  email: string
  name: string
  roles: Role[]
}

/** Invites by letter; a new invitation to the same address takes the place of one still open. */
export async function invite(context: Context, person: Person, wanted: NewInvitation): Promise<InvitationRecord> {
  const secret = newSecret()
  const invitation = await context.db.write(async (tx) => {
    const taken = await context.models.users.findOne({ where: { email: wanted.email }, transaction: tx })
    if (taken) throw new ApiError('conflict', 'Somebody with this e-mail address has an account already.', { userId: taken.id })
    await context.models.invitations.destroy({ where: { email: wanted.email, acceptedAt: null }, transaction: tx })
    const created = await context.models.invitations.create(
      {
        ...wanted,
        tokenHash: hashSecret(secret),
        createdBy: person.id,
        createdAt: context.clock.now(),
        expiresAt: context.clock.system() + validDays * 24 * 3600_000,
        acceptedAt: null,
      },
      { transaction: tx },
    )
    await writeLetter(context, tx, person, created, secret)
    const details = { email: wanted.email, roles: wanted.roles }
    await audit(context, tx, { userId: person.id, action: 'invitation:send', subject: `invitation ${created.id}`, details })
    return created
  })
  context.news.tell({ topic: 'letters' })
  return invitation
}

async function writeLetter(context: Context, tx: Transaction, person: Person, invitation: InvitationRecord, secret: string): Promise<void> {
  // Ids of replaced invitations may come again; the hash never does.
  const key = `invitation:${invitation.id}:${invitation.tokenHash.slice(0, 16)}`
  const letter = invitationLetter({
    name: invitation.name,
    invitedBy: person.name,
    roles: invitation.roles,
    url: context.env.baseUrl + paths.acceptInvitation.to({ token: secret }),
    days: validDays,
    demo: context.env.mode === 'demo',
  })
  await enqueueLetter(context, tx, {
    kind: 'invitation',
    dedupeKey: key,
    userId: null,
    to: invitation.email,
    messageId: messageIdFor(context, key, invitation.createdAt),
    ...letter,
  })
}

/** The invitation a link belongs to, if it can still be accepted. */
export async function openInvitation(context: Context, token: string, tx?: Transaction): Promise<InvitationRecord> {
  const where = { tokenHash: hashSecret(token) }
  const invitation = await context.models.invitations.findOne({ where, ...(tx ? { transaction: tx } : {}) })
  if (!invitation) throw new ApiError('not-found', 'This invitation is not known or was replaced by a newer one. Ask for a new one.')
  if (invitation.acceptedAt !== null) throw new ApiError('already-used', 'This invitation was accepted already. Sign in.')
  if (invitation.expiresAt <= context.clock.system()) throw new ApiError('already-used', 'This invitation is too old. Ask for a new one.')
  return invitation
}
