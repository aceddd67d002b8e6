import { errorStatus, type ErrorCode } from '../shared/errors'

/** An answer that isn't the wanted one: a code of the closed list, a sentence for a person and the facts. */
export class ApiError extends Error {
  override name = 'ApiError'
  readonly code: ErrorCode
  readonly details: Record<string, unknown>

  constructor(code: ErrorCode, message: string, details: Record<string, unknown> = {}) {
    super(message)
    this.code = code
    this.details = details
  }

  get status(): number {
    return errorStatus[this.code]
  }
}
