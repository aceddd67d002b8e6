import type { z } from 'zod'
import { errorStatus, type ErrorCode } from '../../shared/errors'
import { errorReply } from '../../shared/schemas/common'
import type { BodyInputOf, Endpoint, QueryInputOf, ReplyOf } from '../../shared/schemas/endpoint'
import { ApiError } from './api-error'
import { renewSession, sessionExpiresAt } from './session'

export { ApiError } from './api-error'

type ParamsInput<E extends Endpoint> = E['params'] extends z.ZodType ? Record<keyof z.infer<E['params']>, string | number> : never

type Given<E extends Endpoint> = (E['params'] extends z.ZodType ? { params: ParamsInput<E> } : { params?: undefined }) &
  (E['query'] extends z.ZodType ? { query?: QueryInputOf<E> } : { query?: undefined }) &
  (E['body'] extends z.ZodType ? { body: BodyInputOf<E> } : { body?: undefined }) &
  (E['multipart'] extends true ? { form: FormData } : { form?: undefined }) & { signal?: AbortSignal }

type NeedsNothing<E extends Endpoint> = E['params'] extends z.ZodType ? false : E['body'] extends z.ZodType ? false : E['multipart'] extends true ? false : true

/**
 * The one way to the server. The reply is read with the call's own schema, so what a page gets is what was agreed.
 * When the session has run out it is renewed once and the call is made again.
 */
export async function call<E extends Endpoint>(
  endpoint: E,
  ...[given]: NeedsNothing<E> extends true ? [given?: Given<E>] : [given: Given<E>]
): Promise<ReplyOf<E>> {
  const request = () => send(endpoint, given ?? {})
  let reply = await request()
  if (reply.status === 401 && renewable(endpoint) && (await sessionRanOut(reply.clone())) && (await renewSession())) {
    reply = await request()
  }
  if (!reply.ok) throw await refusalOf(reply)
  if (!endpoint.reply) return undefined as ReplyOf<E>
  const read = endpoint.reply.safeParse(await reply.json().catch(() => undefined))
  if (!read.success) {
    const where = `${endpoint.method} ${endpoint.path}`
    throw new ApiError('unreadable-reply', `The server answered ${where} in a way this page cannot read.`, { issues: read.error.issues }, reply.status)
  }
  return read.data as ReplyOf<E>
}

/** The address of a call, for links, pictures and downloads. */
export function addressOf<E extends Endpoint>(endpoint: E, given: { params?: ParamsInput<E>; query?: QueryInputOf<E> } = {}): string {
  const params: Record<string, string | number> = given.params ?? {}
  const path = endpoint.path.replace(/:(\w+)/g, (_, name: string) => encodeURIComponent(String(params[name])))
  const query = Object.entries(given.query ?? {}).filter(([, value]) => value !== undefined && value !== null)
  const search = new URLSearchParams(query.map(([name, value]) => [name, String(value)]))
  return `/api${path}${query.length ? `?${search}` : ''}`
}

interface Loose {
  params?: Record<string, string | number>
  query?: unknown
  body?: unknown
  form?: FormData
  signal?: AbortSignal
}

async function send(endpoint: Endpoint, given: Loose): Promise<Response> {
  const address = addressOf<Endpoint>(endpoint, { params: given.params as never, query: given.query as never })
  const hasBody = given.body !== undefined
  try {
    return await fetch(address, {
      method: endpoint.method,
      credentials: 'same-origin',
      headers: hasBody ? { 'content-type': 'application/json' } : {},
      body: hasBody ? JSON.stringify(given.body) : given.form,
      signal: given.signal,
    })
  } catch (cause) {
    if (given.signal?.aborted) throw cause
    throw new ApiError('no-connection', 'The server cannot be reached. Try again when the connection is back.', {}, 0, { cause })
  }
}

function renewable(endpoint: Endpoint): boolean {
  return endpoint.may !== 'anyone'
}

/** A browser drops a cookie at its end, so a session that was there and is not any more counts as run out too. */
async function sessionRanOut(reply: Response): Promise<boolean> {
  const { code } = await refusalOf(reply)
  return code === 'session-expired' || (code === 'not-signed-in' && sessionExpiresAt() !== undefined)
}

async function refusalOf(reply: Response): Promise<ApiError> {
  const read = errorReply.safeParse(await reply.json().catch(() => undefined))
  if (!read.success) return new ApiError('server-error', `The server answered with status ${reply.status} and no reason.`, {}, reply.status)
  const { code, message, details } = read.data.error
  return new ApiError(isErrorCode(code) ? code : 'server-error', message, details, reply.status)
}

function isErrorCode(code: string): code is ErrorCode {
  return code in errorStatus
}
