import type { ErrorCode } from '../../shared/errors'

/** What went wrong with a call: the server's own code and sentence, or that it could not be reached. */
export class ApiError extends Error {
  constructor(
    readonly code: ErrorCode | 'no-connection' | 'unreadable-reply',
    message: string,
    readonly details: Record<string, unknown> = {},
    /** HTTP status; 0 when no reply came. */
    readonly status = 0,
    options?: ErrorOptions,
  ) {
    super(message, options)
    this.name = 'ApiError'
  }
}

export function sentenceOf(error: unknown): string {
  return error instanceof ApiError ? error.message : 'Something went wrong in this page. Load it again.'
}

export function isConflict(error: unknown): boolean {
  return error instanceof ApiError && error.status === 409
}
