import { paths } from '../../shared/paths'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { Transaction } from '../db'
import { passwordResetLetter } from '../mail/letters/password-reset'
import { enqueueLetter, messageIdFor } from '../mail/outbox'
import type { UserRecord } from '../models/user'
import { audit } from './audit'
import { hashPassword } from './passwords'
import { hashSecret, newSecret } from './secret'
import { revokeAllSessions } from './sessions'

const validMinutes = 60

/** Sends a letter with a link if the address has an account; the answer never tells whether it has. */
export async function askForPasswordReset(context: Context, email: string): Promise<void> {
  await context.db.write(async (tx) => {
    const user = await context.models.users.findOne({ where: { email, disabled: false }, transaction: tx })
    await audit(context, tx, { userId: null, action: 'password:ask', subject: user ? `user ${user.id}` : 'unknown e-mail' })
    if (user) await writeLetter(context, tx, user)
  })
  context.news.tell({ topic: 'letters' })
}

async function writeLetter(context: Context, tx: Transaction, user: UserRecord): Promise<void> {
  const secret = newSecret()
  const reset = await context.models.passwordResets.create(
    { userId: user.id, tokenHash: hashSecret(secret), expiresAt: context.clock.system() + validMinutes * 60_000 },
    { transaction: tx },
  )
  const key = `password-reset:${reset.id}`
  const url = context.env.baseUrl + paths.resetPassword.to({ token: secret })
  const letter = passwordResetLetter({ name: user.name, url, minutes: validMinutes, demo: context.env.mode === 'demo' })
  await enqueueLetter(context, tx, {
    kind: 'password-reset',
    dedupeKey: key,
    userId: user.id,
    to: user.email,
    messageId: messageIdFor(context, key, context.clock.now()),
    ...letter,
  })
}

/** Sets the new password and ends every session; the link works once, and so does any other still open. */
export async function resetPassword(context: Context, { token, password }: { token: string; password: string }): Promise<void> {
  await usableReset(context, token)
  const passwordHash = await hashPassword(context, password)
  await context.db.write(async (tx) => {
    const reset = await usableReset(context, token, tx)
    const now = context.clock.system()
    await context.models.passwordResets.update({ usedAt: now }, { where: { userId: reset.userId, usedAt: null }, transaction: tx })
    await context.models.users.update({ passwordHash }, { where: { id: reset.userId }, transaction: tx })
    await revokeAllSessions(context, tx, reset.userId)
    await audit(context, tx, { userId: reset.userId, action: 'password:reset', subject: `user ${reset.userId}` })
  })
}

async function usableReset(context: Context, token: string, tx?: Transaction) {
  const where = { tokenHash: hashSecret(token) }
  const reset = await context.models.passwordResets.findOne({ where, ...(tx ? { transaction: tx } : {}) })
  if (!reset) throw new ApiError('not-found', 'This link is not known. Ask for a new letter.')
  if (reset.usedAt !== null) throw new ApiError('already-used', 'This link was used already. Ask for a new letter.')
  if (reset.expiresAt <= context.clock.system()) throw new ApiError('already-used', 'This link is too old. Ask for a new letter.')
  return reset
}
