import type { Request, Response } from 'express'
import type { Context } from '../context'
import { sessionDays } from '../accounts/sessions'

const sessionCookie = 'offing_session'
const refreshCookie = 'offing_refresh'
/** Only the calls that renew or end a session ever see the refresh cookie. */
const refreshPath = '/api/auth'

function readCookie(req: Request, name: string): string | null {
  for (const part of (req.headers.cookie ?? '').split(';')) {
    const at = part.indexOf('=')
    if (at > 0 && part.slice(0, at).trim() === name) return part.slice(at + 1).trim() || null
  }
  return null
}

export const sessionCookieOf = (req: Request): string | null => readCookie(req, sessionCookie)
export const refreshCookieOf = (req: Request): string | null => readCookie(req, refreshCookie)

function options(context: Context, path: string) {
  return { httpOnly: true, sameSite: 'lax', secure: context.env.baseUrl.startsWith('https:'), path } as const
}

/** The cookies outlive the access token inside, so that an old one is told as expired and not as missing. */
export function setSessionCookies(context: Context, res: Response, tokens: { access: string; refresh: string }): void {
  const maxAge = sessionDays * 24 * 3600_000
  res.cookie(sessionCookie, tokens.access, { ...options(context, '/'), maxAge })
  res.cookie(refreshCookie, tokens.refresh, { ...options(context, refreshPath), maxAge })
}

export function clearSessionCookies(context: Context, res: Response): void {
  res.clearCookie(sessionCookie, options(context, '/'))
  res.clearCookie(refreshCookie, options(context, refreshPath))
}
