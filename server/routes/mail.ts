import type { Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { serve } from './serve'

/** The local mail catcher's letters; outside the demo and development there is none, and no such path. */
export function mailRoutes(router: Router, context: Context): void {
  const catcher = () => {
    if (!context.mailCatcher) throw new ApiError('not-found', 'There is no local mail catcher here.')
    return context.mailCatcher
  }
  serve(router, context, endpoints.listCaughtMail, () => ({ items: catcher().list(), nextCursor: null }))
  serve(router, context, endpoints.caughtLetter, ({ params }) => {
    const letter = catcher().get(params.id)
    if (!letter) throw new ApiError('not-found', 'There is no such letter.')
    return letter
  })
}
