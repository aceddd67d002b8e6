import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { changeUser } from '../accounts/change-user'
import { createUser, listUsers } from '../accounts/users'
import type { Context } from '../context'
import { cursorId, pageOf } from './paging'
import { serve } from './serve'

export function userRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listUsers, async ({ query: { limit, cursor } }) =>
    pageOf(await listUsers(context, cursorId(cursor, 0), limit + 1), limit),
  )
  serve(router, context, endpoints.createUser, ({ person, body }) => createUser(context, person, body))
  serve(router, context, endpoints.changeUser, ({ person, params, body }) => changeUser(context, person, params.id, body))
}
