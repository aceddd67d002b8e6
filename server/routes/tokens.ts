import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { issueToken, listTokens, revokeToken } from '../accounts/tokens'
import type { Context } from '../context'
import { cursorId, fromNewest, pageOf } from './paging'
import { serve } from './serve'

export function tokenRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listTokens, async ({ person, query: { limit, cursor } }) =>
    pageOf(await listTokens(context, person.id, cursorId(cursor, fromNewest), limit + 1), limit),
  )
  serve(router, context, endpoints.createToken, ({ person, body, res }) => {
    res.set('Cache-Control', 'no-store')
    return issueToken(context, person.id, body)
  })
  serve(router, context, endpoints.deleteToken, ({ person, params }) => revokeToken(context, person.id, params.id))
}
