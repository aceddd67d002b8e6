import type { z } from 'zod'
import type { Action } from '../permissions'

export interface Endpoint {
  method: 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'
  /** Below /api, with :params. */
  path: string
  /** 'anyone' needs no session; otherwise the action of the permission table. */
  may: Action | 'anyone'
  summary: string
  params?: z.ZodType
  query?: z.ZodType
  body?: z.ZodType
  /** What a 2xx reply holds; left out where it holds nothing or is no JSON. */
  reply?: z.ZodType
  status?: 200 | 201 | 202 | 204
  /** Set where the reply is not JSON. */
  contentType?: string
  /** True where the body is multipart/form-data. */
  multipart?: true
}

export function endpoint<const E extends Endpoint>(shape: E): E {
  return shape
}

export type ParamsOf<E extends Endpoint> = E['params'] extends z.ZodType ? z.infer<E['params']> : undefined
export type QueryOf<E extends Endpoint> = E['query'] extends z.ZodType ? z.infer<E['query']> : undefined
export type BodyOf<E extends Endpoint> = E['body'] extends z.ZodType ? z.infer<E['body']> : undefined
export type ReplyOf<E extends Endpoint> = E['reply'] extends z.ZodType ? z.infer<E['reply']> : undefined
export type QueryInputOf<E extends Endpoint> = E['query'] extends z.ZodType ? z.input<E['query']> : undefined
export type BodyInputOf<E extends Endpoint> = E['body'] extends z.ZodType ? z.input<E['body']> : undefined
