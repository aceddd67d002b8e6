import express, { type Request, type RequestHandler, type Response, type Router } from 'express'
import type { z } from 'zod'
import type { BodyOf, Endpoint, ParamsOf, QueryOf } from '../../shared/schemas/endpoint'
import type { Person } from '../accounts/person'
import { ApiError } from '../api-error'
import type { Context } from '../context'
import { authenticate } from '../middleware/authenticate'
import { authorize } from '../middleware/authorize'
import { localsOf } from '../middleware/locals'
import { validate } from '../middleware/validate'

export interface Call<E extends Endpoint> {
  params: ParamsOf<E>
  query: QueryOf<E>
  body: BodyOf<E>
  /** Null only where anyone may call. */
  person: E['may'] extends 'anyone' ? null : Person
  req: Request
  res: Response
  /** Business time of the call. */
  now: number
}

type ReplyInput<E extends Endpoint> = E['reply'] extends z.ZodType ? z.input<E['reply']> : void
export type Handler<E extends Endpoint> = (call: Call<E>) => ReplyInput<E> | Promise<ReplyInput<E>>

/** Large outlines are sent as JSON; anything bigger is a file. */
const readJson = express.json({ limit: '10mb', type: ['application/json', 'application/*+json'] })

/** Registers one call of the table: who may, what is valid, then the handler, then its reply held against the schema. */
export function serve<const E extends Endpoint>(
  router: Router,
  context: Context,
  endpoint: E,
  handler: Handler<E>,
  { before = [] }: { before?: RequestHandler[] } = {},
): void {
  const chain: RequestHandler[] = []
  if (endpoint.may !== 'anyone') chain.push(authenticate(context), authorize(endpoint.may))
  if (endpoint.body) chain.push(readJson)
  chain.push(validate(endpoint), ...before, answer(context, endpoint, handler))
  const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'patch' | 'delete'
  router[method](endpoint.path, ...chain)
}

function answer<E extends Endpoint>(context: Context, endpoint: E, handler: Handler<E>): RequestHandler {
  return async (req, res) => {
    const { person, input } = localsOf(res)
    const call = { ...input, person, req, res, now: context.clock.now() } as Call<E>
    const value: unknown = await handler(call)
    if (res.headersSent) return
    res.status(endpoint.status ?? 200)
    if (!endpoint.reply) {
      res.end()
      return
    }
    if (endpoint.contentType) res.type(endpoint.contentType)
    res.json(heldAgainstSchema(context, endpoint, endpoint.reply, value))
  }
}

function heldAgainstSchema(context: Context, endpoint: Endpoint, schema: z.ZodType, value: unknown): unknown {
  const parsed = schema.safeParse(value)
  if (parsed.success) return parsed.data
  const facts = { call: `${endpoint.method} ${endpoint.path}`, issues: parsed.error.issues.slice(0, 10) }
  context.log.error(facts, 'a reply breaks its schema')
  if (context.env.mode === 'test' || context.env.mode === 'development') {
    throw new ApiError('server-error', `The reply of ${facts.call} breaks its schema.`, facts)
  }
  return value
}
