import type { Request, RequestHandler } from 'express'
import { ipKeyGenerator, rateLimit } from 'express-rate-limit'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { bearerOf } from './bearer'

const minute = 60_000

interface Limit {
  perWindow: number
  windowMs: number
  by: (req: Request) => string
  /** Only answers of 400 and above count. */
  onlyFailures?: boolean
  spare?: (req: Request) => boolean
}

function limit(context: Context, { perWindow, windowMs, by, onlyFailures = false, spare }: Limit): RequestHandler {
  if (context.env.mode === 'test') return (_req, _res, next) => next()
  return rateLimit({
    limit: perWindow,
    windowMs,
    standardHeaders: 'draft-7',
    legacyHeaders: false,
    skipSuccessfulRequests: onlyFailures,
    keyGenerator: by,
    skip: (req) => spare?.(req) ?? false,
    handler: (_req, _res, next) => {
      const waitMinutes = Math.ceil(windowMs / minute)
      next(new ApiError('too-many-requests', `Too many tries. Wait up to ${waitMinutes} min and try again.`, { waitMinutes }))
    },
  })
}

const byAddress = (req: Request): string => ipKeyGenerator(req.ip ?? 'unknown')

/** All calls by address, which a whole office may share; a monitor's health calls and programs with a personal token are spared. */
export function generalLimit(context: Context): RequestHandler {
  const spare = (req: Request) => req.path === '/health' || bearerOf(req) !== null
  return limit(context, { perWindow: 6000, windowMs: minute, by: byAddress, spare })
}

/** Calls that try a password or a link: many people of one office share an address, so only failures count. */
export function tryLimitByAddress(context: Context): RequestHandler {
  return limit(context, { perWindow: 60, windowMs: 15 * minute, by: byAddress, onlyFailures: true })
}

/** Tries at one person's account, from wherever. */
export function tryLimitByEmail(context: Context): RequestHandler {
  return limit(context, { perWindow: 20, windowMs: 15 * minute, by: emailOf, onlyFailures: true })
}

/** Letters that anybody may ask for: by the address asked for, and by who asks. */
export function letterLimits(context: Context): RequestHandler[] {
  return [
    limit(context, { perWindow: 30, windowMs: 15 * minute, by: byAddress }),
    limit(context, { perWindow: 5, windowMs: 15 * minute, by: emailOf }),
  ]
}

function emailOf(req: Request): string {
  const body: unknown = req.body
  const email = typeof body === 'object' && body !== null && 'email' in body ? body.email : null
  return typeof email === 'string' ? `email ${email.trim().toLowerCase().slice(0, 254)}` : byAddress(req)
}
