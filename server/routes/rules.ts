import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import type { Context } from '../context'
import { activateRule, addRule, changeRule, rulesOf } from '../desk/rules'
import { serve } from './serve'

export function ruleRoutes(router: Router, context: Context): void {
  serve(router, context, endpoints.regionRules, async ({ params }) => ({ items: await rulesOf(context, params.id), nextCursor: null }))
  serve(router, context, endpoints.createRule, ({ person, params, body }) => addRule(context, person, params.id, body))
  serve(router, context, endpoints.changeRule, ({ person, params, body }) => changeRule(context, person, params.id, body))
  serve(router, context, endpoints.activateRule, ({ person, params, body }) => activateRule(context, person, params.id, body))
}
