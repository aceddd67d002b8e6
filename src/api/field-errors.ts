import { ApiError } from './api-error'

/** Sentences of the server by the field they belong to; empty where a refusal names no field. */
export function fieldErrors(error: unknown): Record<string, string> {
  const fields = error instanceof ApiError ? error.details['fields'] : undefined
  if (typeof fields !== 'object' || fields === null) return {}
  return Object.fromEntries(Object.entries(fields).filter((entry): entry is [string, string] => typeof entry[1] === 'string'))
}
