import type { ErrorRequestHandler, RequestHandler } from 'express'
import { ZodError } from 'zod'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { notValid } from './validate'

export const unknownPath: RequestHandler = (req) => {
  throw new ApiError('not-found', `There is no ${req.method} ${req.baseUrl}${req.path}.`)
}

/** The one place where an error becomes an answer. Only what is our own fault is logged as an error. */
export function errorReply(context: Context): ErrorRequestHandler {
  return (error: unknown, req, res, _next) => {
    const told = asApiError(error)
    if (told.status >= 500) context.log.error({ err: error, method: req.method, path: req.path }, 'a call failed')
    if (res.headersSent) {
      res.destroy()
      return
    }
    res.status(told.status).json({ error: { code: told.code, message: told.message, details: told.details } })
  }
}

function asApiError(error: unknown): ApiError {
  if (error instanceof ApiError) return error
  if (error instanceof ZodError) return notValid(error)
  return ofBodyReader(error) ?? new ApiError('server-error', 'Something went wrong on the server. It was logged.')
}

// Express, its body reader and multer tell what is wrong with a request by status, type or code.
function ofBodyReader(error: unknown): ApiError | null {
  if (!(error instanceof Error)) return null
  const { status, type, code } = error as Error & { status?: unknown; type?: unknown; code?: unknown }
  if (type === 'entity.too.large' || code === 'LIMIT_FILE_SIZE') return new ApiError('too-large', 'What was sent is too large.')
  if (type === 'entity.parse.failed') return new ApiError('bad-request', 'The body is not valid JSON.')
  if (error.name === 'MulterError') return new ApiError('bad-request', `The upload could not be read: ${error.message}.`)
  if (error instanceof URIError) return new ApiError('bad-request', 'The address is not well formed.')
  if (type !== undefined && typeof status === 'number' && status >= 400 && status < 500) {
    return new ApiError('bad-request', `The request could not be read: ${error.message}.`)
  }
  return null
}
