import type { Response, Router } from 'express'
import { endpoints } from '../../shared/schemas/endpoints'
import { acceptInvitation } from '../accounts/accept-invitation'
import { presentMe, presentSession } from '../accounts/me'
import { askForPasswordReset, resetPassword } from '../accounts/password-reset'
import { refreshSession, type SessionTokens } from '../accounts/sessions'
import { signIn } from '../accounts/sign-in'
import { signOut } from '../accounts/sign-out'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { clearSessionCookies, refreshCookieOf, sessionCookieOf, setSessionCookies } from '../middleware/cookies'
import { letterLimits, tryLimitByAddress, tryLimitByEmail } from '../middleware/rate-limits'
import { serve } from './serve'

export function authRoutes(router: Router, context: Context): void {
  const byAddress = tryLimitByAddress(context)

  const opened = async (res: Response, tokens: SessionTokens) => {
    setSessionCookies(context, res, tokens)
    res.set('Cache-Control', 'no-store')
    return presentSession(context, tokens)
  }

  serve(router, context, endpoints.signIn, async ({ body, res }) => opened(res, await signIn(context, body)), {
    before: [byAddress, tryLimitByEmail(context)],
  })

  serve(router, context, endpoints.refresh, async ({ req, res }) => {
    const shown = refreshCookieOf(req)
    if (!shown) throw new ApiError('not-signed-in', 'Sign in first.')
    try {
      return await opened(res, await refreshSession(context, shown))
    } catch (error) {
      if (error instanceof ApiError) clearSessionCookies(context, res)
      throw error
    }
  })

  serve(router, context, endpoints.signOut, async ({ req, res }) => {
    await signOut(context, { access: sessionCookieOf(req), refresh: refreshCookieOf(req) })
    clearSessionCookies(context, res)
  })

  serve(router, context, endpoints.me, ({ person }) => presentMe(context, person))

  serve(router, context, endpoints.forgotPassword, ({ body }) => askForPasswordReset(context, body.email), { before: letterLimits(context) })

  serve(
    router,
    context,
    endpoints.resetPassword,
    async ({ body, res }) => {
      await resetPassword(context, body)
      clearSessionCookies(context, res)
    },
    { before: [byAddress] },
  )

  serve(router, context, endpoints.acceptInvitation, async ({ body, res }) => opened(res, await acceptInvitation(context, body)), {
    before: [byAddress],
  })
}
