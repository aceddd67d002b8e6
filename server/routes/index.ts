import type { Router } from 'express'
import type { Context } from '../context'
import { auditRoutes } from './audit'
import { authRoutes } from './auth'
import { invitationRoutes } from './invitations'
import { letterRoutes } from './letters'
import { mailRoutes } from './mail'
import { openApiRoutes } from './openapi'
import { subscriptionRoutes } from './subscriptions'
import { tokenRoutes } from './tokens'
import { userRoutes } from './users'

const routes: ((router: Router, context: Context) => void)[] = [
  authRoutes,
  userRoutes,
  invitationRoutes,
  tokenRoutes,
  subscriptionRoutes,
  letterRoutes,
  auditRoutes,
  mailRoutes,
  openApiRoutes,
]

/** Every router of the interface, one a resource. */
export function mountRoutes(router: Router, context: Context): void {
  for (const mount of routes) mount(router, context)
}
