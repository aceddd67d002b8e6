import { ApiError } from '../api-error'
import type { Context } from '../context'
import { personOfSession, personOfToken, rolesOf, type PersonRow } from '../queries/people'
import { readAccessToken } from './access-token'
import type { Person } from './person'
import { hashSecret } from './secret'

const noteUseEveryMs = 60_000

/** The person behind an access token; refuses with the reason. */
export async function personByAccessToken(context: Context, token: string): Promise<Person> {
  const read = readAccessToken(context, token)
  if (read === 'expired') throw new ApiError('session-expired', 'The session needs to be renewed.')
  if (read === 'not-valid') throw notSignedIn()
  const row = await personOfSession(context.db, read.sessionId, read.userId, context.clock.system())
  if (!row) throw notSignedIn()
  const person = present(row, { sessionId: read.sessionId })
  noteSeen(context, row)
  return person
}

/** The person behind a personal token; refuses with the reason. */
export async function personByPersonalToken(context: Context, token: string): Promise<Person> {
  const row = await personOfToken(context.db, hashSecret(token), context.clock.system())
  if (!row) throw new ApiError('not-signed-in', 'The personal token is not known, revoked or over.')
  const person = present(row, { tokenId: row.tokenId })
  noteTokenUse(context, row.tokenId, row.lastUsedAt)
  return person
}

function notSignedIn(): ApiError {
  return new ApiError('not-signed-in', 'Sign in first.')
}

function present(row: PersonRow, by: Person['by']): Person {
  if (row.disabled) throw new ApiError('not-signed-in', 'This account is disabled.')
  return { id: row.id, email: row.email, name: row.name, roles: rolesOf(row), timeZone: row.timeZone, by }
}

// Written beside the request and at most once a minute: the answer never waits for it.
function noteSeen(context: Context, row: PersonRow): void {
  const now = context.clock.now()
  if (row.lastSeenAt !== null && Math.abs(now - row.lastSeenAt) < noteUseEveryMs) return
  note(context, 'UPDATE users SET last_seen_at = $now WHERE id = $id', row.id, now)
}

function noteTokenUse(context: Context, tokenId: number, lastUsedAt: number | null): void {
  const now = context.clock.now()
  if (lastUsedAt !== null && Math.abs(now - lastUsedAt) < noteUseEveryMs) return
  note(context, 'UPDATE tokens SET last_used_at = $now WHERE id = $id', tokenId, now)
}

function note(context: Context, sql: string, id: number, now: number): void {
  context.db
    .write((tx) => context.db.run(sql, { id, now }, tx))
    .catch((error: unknown) => context.log.warn({ error }, 'the time of last use could not be noted'))
}
