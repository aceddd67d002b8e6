import type { Router } from 'express'
import type { z } from 'zod'
import { endpoints } from '../../shared/schemas/endpoints'
import type { invitation } from '../../shared/schemas/users'
import { invite } from '../accounts/invitations'
import type { Context } from '../context'
import type { InvitationRow } from '../models/invitation'
import { invitationsBefore } from '../queries/invitations'
import { cursorId, fromNewest, pageOf } from './paging'
import { serve } from './serve'

export function invitationRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listInvitations, async ({ query: { limit, cursor } }) => {
    const rows = await invitationsBefore(context, cursorId(cursor, fromNewest), limit + 1)
    return pageOf(rows.map(present), limit)
  })
  serve(router, context, endpoints.invite, async ({ person, body }) => present(await invite(context, person, body)))
}

function present(row: InvitationRow): z.output<typeof invitation> {
  return {
    id: row.id,
    email: row.email,
    name: row.name,
    roles: row.roles,
    createdAt: new Date(row.createdAt).toISOString(),
    expiresAt: new Date(row.expiresAt).toISOString(),
    acceptedAt: row.acceptedAt === null ? null : new Date(row.acceptedAt).toISOString(),
  }
}
