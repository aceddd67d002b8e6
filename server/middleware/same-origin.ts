import type { RequestHandler } from 'express'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { bearerOf } from './bearer'

const safeMethods = new Set(['GET', 'HEAD', 'OPTIONS'])

/**
 * A page of another site must not act with somebody's cookies. Browsers name the page's origin with every unsafe call;
 * a call that names none and carries no sign of a browser comes from a program, which has no foreign page to obey.
 */
export function sameOrigin(context: Context): RequestHandler {
  const own = new URL(context.env.baseUrl).host
  return (req, _res, next) => {
    if (safeMethods.has(req.method) || bearerOf(req)) return next()
    const named = req.headers.origin ?? req.headers.referer
    const site = req.headers['sec-fetch-site']
    const fine = named === undefined ? site === undefined || site === 'same-origin' || site === 'none' : isOwn(named, own, req.host)
    if (!fine) throw new ApiError('not-allowed', 'This call came from a page of another site and was refused.')
    next()
  }
}

function isOwn(named: string, ...hosts: (string | undefined)[]): boolean {
  try {
    return hosts.includes(new URL(named).host)
  } catch {
    return false
  }
}
