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
import { alertRoutes } from './alerts'
import { exportRoutes } from './exports'
import { feedRoutes } from './feeds'
import { fileRoutes } from './files'
import { jobRoutes } from './jobs'
import { layerRoutes } from './layers'
import { maskRoutes } from './masks'
import { pullRoutes } from './pulls'
import { regionRoutes } from './regions'
import { ruleRoutes } from './rules'
import { runningRoutes } from './running'
import { streamRoutes } from './stream'
import { todayRoutes } from './today'

const routes: ((router: Router, context: Context) => void)[] = [
  authRoutes,
  userRoutes,
  invitationRoutes,
  tokenRoutes,
  subscriptionRoutes,
  letterRoutes,
  auditRoutes,
  mailRoutes,
  alertRoutes,
  exportRoutes,
  feedRoutes,
  fileRoutes,
  jobRoutes,
  layerRoutes,
  maskRoutes,
  pullRoutes,
  regionRoutes,
  ruleRoutes,
  runningRoutes,
  streamRoutes,
  todayRoutes,
  openApiRoutes,
]

/** Every router of the interface, one a resource. */
export function mountRoutes(router: Router, context: Context): void {
  for (const mount of routes) mount(router, context)
}
