import type { Database } from '../db'

export interface AuditListRow {
  id: number
  at: number
  who: string | null
  action: string
  subject: string
  details: string
}

/** Newest first, with the person's name. */
export function auditBefore(db: Database, beforeId: number, limit: number) {
  return db.all<AuditListRow>(
    `SELECT a.id, a.at, u.name AS who, a.action, a.subject, a.details FROM audit a LEFT JOIN users u ON u.id = a.user_id
     WHERE a.id < $beforeId ORDER BY a.id DESC LIMIT $limit`,
    { beforeId, limit },
  )
}
