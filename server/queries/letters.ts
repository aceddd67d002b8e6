import type { Database, Transaction } from '../db'

export interface NewLetterRow {
  kind: string
  dedupeKey: string
  userId: number | null
  toAddress: string
  alertId: number | null
  messageId: string
  inReplyTo: string | null
  subject: string
  textPart: string
  htmlPart: string | null
  nextAttemptAt: number
  createdAt: number
}

/** Answers whether the letter is new; one with the same key is there already and stays as it is. */
export async function insertLetterOnce(db: Database, row: NewLetterRow, tx: Transaction): Promise<boolean> {
  await db.run(
    `INSERT INTO letters (kind, dedupe_key, user_id, to_address, alert_id, message_id, in_reply_to, subject, text_part,
       html_part, state, next_attempt_at, created_at)
     VALUES ($kind, $dedupeKey, $userId, $toAddress, $alertId, $messageId, $inReplyTo, $subject, $textPart,
       $htmlPart, 'waiting', $nextAttemptAt, $createdAt)
     ON CONFLICT (dedupe_key) DO NOTHING`,
    { ...row },
    tx,
  )
  // Rows of RETURNING never come through: Sequelize runs an INSERT without reading.
  return (await db.first<{ changes: number }>('SELECT changes() AS changes', {}, tx))?.changes === 1
}

export interface DueLetter {
  id: number
  kind: string
  toAddress: string
  messageId: string
  inReplyTo: string | null
  subject: string
  textPart: string
  htmlPart: string | null
  attempts: number
  createdAt: number
}

export function dueLetters(db: Database, now: number, limit: number) {
  return db.all<DueLetter>(
    `SELECT id, kind, to_address AS toAddress, message_id AS messageId, in_reply_to AS inReplyTo, subject,
       text_part AS textPart, html_part AS htmlPart, attempts, created_at AS createdAt
     FROM letters WHERE state = 'waiting' AND (next_attempt_at IS NULL OR next_attempt_at <= $now)
     ORDER BY next_attempt_at, id LIMIT $limit`,
    { now, limit },
  )
}

export async function waitingLetters(db: Database): Promise<number> {
  const row = await db.first<{ count: number }>(`SELECT count(*) AS count FROM letters WHERE state = 'waiting'`)
  return row?.count ?? 0
}
