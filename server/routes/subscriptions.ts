import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { changeSubscription, listSubscriptions, subscribe, unsubscribe } from '../accounts/subscriptions'
import type { Context } from '../context'
import { cursorId, pageOf } from './paging'
import { serve } from './serve'

export function subscriptionRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.listSubscriptions, async ({ person, query: { limit, cursor } }) =>
    pageOf(await listSubscriptions(context, person, cursorId(cursor, 0), limit + 1), limit),
  )
  serve(router, context, endpoints.createSubscription, ({ person, body }) => subscribe(context, person, body))
  serve(router, context, endpoints.changeSubscription, ({ person, params, body }) => changeSubscription(context, person, params.id, body))
  serve(router, context, endpoints.deleteSubscription, ({ person, params }) => unsubscribe(context, person, params.id))
}
