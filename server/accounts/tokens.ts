import type { Token } from '../../shared/schemas/users'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import type { TokenRecord } from '../models/token'
import { ownTokensBefore, type TokenListRow } from '../queries/tokens'
import { audit } from './audit'
import { hashSecret, newSecret } from './secret'

export const tokenPrefix = 'off_'

export async function listTokens(context: Context, userId: number, beforeId: number, limit: number): Promise<Token[]> {
  return (await ownTokensBefore(context.db, userId, beforeId, limit)).map(presentToken)
}

/** Makes a personal token; this is the only time it can be read. */
export async function issueToken(
  context: Context,
  userId: number,
  wanted: { name: string; expiresInDays: number | null },
): Promise<Token & { token: string }> {
  const secret = tokenPrefix + newSecret()
  const expiresAt = wanted.expiresInDays === null ? null : context.clock.system() + wanted.expiresInDays * 24 * 3600_000
  const row = await context.db.write(async (tx) => {
    const created: TokenRecord = await context.models.tokens.create(
      { userId, name: wanted.name, tokenHash: hashSecret(secret), createdAt: context.clock.now(), expiresAt },
      { transaction: tx },
    )
    await audit(context, tx, { userId, action: 'token:create', subject: `token ${created.id}`, details: { name: wanted.name } })
    return created
  })
  return { ...presentToken({ ...row.get(), lastUsedAt: null, expiresAt }), token: secret }
}

/** Revokes an own token; it is refused from the next call on. */
export async function revokeToken(context: Context, userId: number, id: number): Promise<void> {
  await context.db.write(async (tx) => {
    const token = await context.models.tokens.findOne({ where: { id, userId, revokedAt: null }, transaction: tx })
    if (!token) throw new ApiError('not-found', 'You have no such token.')
    await token.update({ revokedAt: context.clock.system() }, { transaction: tx })
    await audit(context, tx, { userId, action: 'token:revoke', subject: `token ${id}`, details: { name: token.name } })
  })
}

function presentToken(row: TokenListRow): Token {
  const instant = (at: number | null) => (at === null ? null : new Date(at).toISOString())
  return {
    id: row.id,
    name: row.name,
    createdAt: new Date(row.createdAt).toISOString(),
    lastUsedAt: instant(row.lastUsedAt),
    expiresAt: instant(row.expiresAt),
  }
}
