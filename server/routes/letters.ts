import type { Router } from 'express'
import type { Letter } from '../../shared/schemas/duty'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { retryLetter } from '../accounts/retry-letter'
import type { LetterRow } from '../models/letter'
import { lettersBefore } from '../queries/letter-list'
import { cursorId, fromNewest, pageOf } from './paging'
import { serve } from './serve'

export function letterRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listLetters, async ({ query: { limit, cursor, state } }) => {
    const rows = await lettersBefore(context, state, cursorId(cursor, fromNewest), limit + 1)
    return pageOf(rows.map(present), limit)
  })
  serve(router, context, endpoints.retryLetter, async ({ person, params }) => {
    const letter = await retryLetter(context, person, params.id)
    context.wake()
    return present(letter)
  })
}

function present(row: LetterRow): Letter {
  const instant = (at: number | null) => (at === null ? null : new Date(at).toISOString())
  return {
    id: row.id,
    to: row.toAddress,
    kind: row.kind,
    subject: row.subject,
    state: row.state,
    attempts: row.attempts,
    nextAttemptAt: instant(row.nextAttemptAt),
    deliveredAt: instant(row.deliveredAt),
    lastError: row.lastError,
    alertId: row.alertId,
    messageId: row.messageId,
    createdAt: new Date(row.createdAt).toISOString(),
  }
}
