import type { Response } from 'express'
import type { Person } from '../accounts/person'

export interface Input {
  params: unknown
  query: unknown
  body: unknown
}

/** What the middleware found out about a request, for the handler. */
export interface CallLocals {
  person: Person | null
  input: Input
}

const kept = new WeakMap<Response, CallLocals>()

export function localsOf(res: Response): CallLocals {
  const known = kept.get(res) ?? { person: null, input: { params: undefined, query: undefined, body: undefined } }
  kept.set(res, known)
  return known
}
