import type { Database } from '../db'

export interface TokenListRow {
  id: number
  name: string
  createdAt: number
  lastUsedAt: number | null
  expiresAt: number | null
}

/** Tokens that still exist for their owner, newest first; one that is over is listed, a revoked one is gone. */
export function ownTokensBefore(db: Database, userId: number, beforeId: number, limit: number) {
  return db.all<TokenListRow>(
    `SELECT id, name, created_at AS createdAt, last_used_at AS lastUsedAt, expires_at AS expiresAt FROM tokens
     WHERE user_id = $userId AND revoked_at IS NULL AND id < $beforeId ORDER BY id DESC LIMIT $limit`,
    { userId, beforeId, limit },
  )
}
