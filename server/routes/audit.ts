import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { auditBefore } from '../queries/audit'
import { cursorId, fromNewest, pageOf } from './paging'
import { serve } from './serve'

export function auditRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listAudit, async ({ query: { limit, cursor } }) => {
    const rows = await auditBefore(context.db, cursorId(cursor, fromNewest), limit + 1)
    const entries = rows.map(({ at, details, ...row }) => ({
      ...row,
      at: new Date(at).toISOString(),
      details: JSON.parse(details) as Record<string, unknown>,
    }))
    return pageOf(entries, limit)
  })
}
