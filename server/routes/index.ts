import type { Router } from 'express'
import type { Context } from '../context'

const routes: ((router: Router, context: Context) => void)[] = []

/** Every router of the interface, one a resource. */
export function mountRoutes(router: Router, context: Context): void {
  for (const mount of routes) mount(router, context)
}
