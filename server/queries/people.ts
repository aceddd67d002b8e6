import type { Role } from '../../shared/permissions'
import type { Database, Transaction } from '../db'

export interface PersonRow {
  id: number
  email: string
  name: string
  roles: string
  timeZone: string
  phone: string | null
  disabled: number
  createdAt: number
  lastSeenAt: number | null
  version: number
}

const columns = `u.id, u.email, u.name, u.time_zone AS timeZone, u.phone, u.disabled, u.created_at AS createdAt,
  u.last_seen_at AS lastSeenAt, u.version,
  (SELECT json_group_array(role) FROM user_roles r WHERE r.user_id = u.id) AS roles`

export function personById(db: Database, id: number, tx?: Transaction) {
  return db.first<PersonRow>(`SELECT ${columns} FROM users u WHERE u.id = $id`, { id }, tx)
}

export function peopleAfter(db: Database, afterId: number, limit: number) {
  return db.all<PersonRow>(`SELECT ${columns} FROM users u WHERE u.id > $afterId ORDER BY u.id LIMIT $limit`, { afterId, limit })
}

/** The person of a session that is neither revoked nor over. */
export function personOfSession(db: Database, sessionId: number, userId: number, now: number) {
  return db.first<PersonRow>(
    `SELECT ${columns} FROM sessions s JOIN users u ON u.id = s.user_id
     WHERE s.id = $sessionId AND s.user_id = $userId AND s.revoked_at IS NULL AND s.expires_at > $now`,
    { sessionId, userId, now },
  )
}

/** The person of a personal token that is neither revoked nor over. */
export function personOfToken(db: Database, tokenHash: string, now: number) {
  return db.first<PersonRow & { tokenId: number; lastUsedAt: number | null }>(
    `SELECT ${columns}, t.id AS tokenId, t.last_used_at AS lastUsedAt FROM tokens t JOIN users u ON u.id = t.user_id
     WHERE t.token_hash = $tokenHash AND t.revoked_at IS NULL AND (t.expires_at IS NULL OR t.expires_at > $now)`,
    { tokenHash, now },
  )
}

export async function setRoles(db: Database, userId: number, roles: readonly Role[], tx: Transaction): Promise<void> {
  await db.run('DELETE FROM user_roles WHERE user_id = $userId', { userId }, tx)
  await db.run(
    'INSERT INTO user_roles (user_id, role) SELECT DISTINCT $userId, value FROM json_each($roles)',
    { userId, roles: JSON.stringify(roles) },
    tx,
  )
}

export async function enabledAdmins(db: Database, tx: Transaction): Promise<number[]> {
  const rows = await db.all<{ id: number }>(
    `SELECT u.id FROM users u JOIN user_roles r ON r.user_id = u.id WHERE r.role = 'admin' AND u.disabled = 0`,
    {},
    tx,
  )
  return rows.map((row) => row.id)
}

export function rolesOf(row: { roles: string }): Role[] {
  return JSON.parse(row.roles) as Role[]
}
