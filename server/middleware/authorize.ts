import type { RequestHandler } from 'express'
import { can, permissions, type Action } from '../../shared/permissions'
import { ApiError } from '../api-error'
import { localsOf } from './locals'

/** Refuses by the permission table: 401 before 403. */
export function authorize(action: Action): RequestHandler {
  return (_req, res, next) => {
    const { person } = localsOf(res)
    if (!person) throw new ApiError('not-signed-in', 'Sign in first.')
    if (!can(person, action)) {
      const allowed = permissions[action]
      throw new ApiError('not-allowed', `Your roles do not allow this; it takes ${allowed.join(' or ')}.`, { action, roles: allowed })
    }
    next()
  }
}
