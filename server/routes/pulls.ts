import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { dropPull, keepPull, pullNow } from '../pull/keep-pull'
import { presentPull } from '../pull/present-pull'
import { serve } from './serve'

export function pullRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.feedPull, ({ params }) => presentPull(context, params.id))
  serve(router, context, endpoints.keepPull, async ({ person, params, body }) => {
    await keepPull(context, person, params.id, body)
    return presentPull(context, params.id)
  })
  serve(router, context, endpoints.dropPull, ({ person, params }) => dropPull(context, person, params.id))
  serve(router, context, endpoints.pullNow, async ({ person, params }) => {
    await pullNow(context, person, params.id)
    return presentPull(context, params.id)
  })
}
