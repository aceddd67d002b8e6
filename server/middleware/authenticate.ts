import type { RequestHandler } from 'express'
import { personByAccessToken, personByPersonalToken } from '../accounts/who'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { bearerOf } from './bearer'
import { sessionCookieOf } from './cookies'
import { localsOf } from './locals'

/** Finds out who calls, by personal token or session cookie; 401 where nobody can be found. */
export function authenticate(context: Context): RequestHandler {
  return async (req, res, next) => {
    const token = bearerOf(req)
    const access = sessionCookieOf(req)
    if (token) localsOf(res).person = await personByPersonalToken(context, token)
    else if (access) localsOf(res).person = await personByAccessToken(context, access)
    else throw new ApiError('not-signed-in', 'Sign in first.')
    next()
  }
}
