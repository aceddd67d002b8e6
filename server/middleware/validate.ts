import type { Request, RequestHandler } from 'express'
import type { z } from 'zod'
import type { Endpoint } from '../../shared/schemas/endpoint'
import { ApiError } from '../api-error'
import { localsOf } from './locals'

/** Checks params, query and body by the endpoint's schemas; the handler gets what they made of it. */
export function validate(endpoint: Endpoint): RequestHandler {
  return (req, res, next) => {
    const { input } = localsOf(res)
    if (endpoint.params) input.params = check(endpoint.params, req.params, 'the address')
    if (endpoint.query) input.query = check(endpoint.query, req.query, 'the query')
    if (endpoint.body) input.body = check(endpoint.body, bodyOf(req), 'the body')
    next()
  }
}

function bodyOf(req: Request): unknown {
  const body: unknown = req.body
  if (body !== undefined) return body
  if (Number(req.headers['content-length'] ?? 0) > 0 || req.headers['transfer-encoding']) {
    throw new ApiError('not-valid', 'Send the body as JSON, with Content-Type: application/json.', { fields: {} })
  }
  return {}
}

function check(schema: z.ZodType, value: unknown, where: string): unknown {
  const parsed = schema.safeParse(value)
  if (parsed.success) return parsed.data
  throw notValid(parsed.error, where)
}

/** A zod error as a sentence and a list of fields. */
export function notValid(error: z.ZodError, where = 'the request'): ApiError {
  const fields: Record<string, string> = {}
  for (const issue of error.issues) fields[issue.path.join('.')] ??= issue.message
  const sentences = Object.entries(fields).map(([field, message]) => (field ? `${field}: ${message}` : message))
  return new ApiError('not-valid', `Something in ${where} is not valid. ${sentences.slice(0, 5).join(' ')}`, { fields })
}
