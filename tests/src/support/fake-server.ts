import { vi } from 'vitest'
import type { z } from 'zod'
import type { Endpoint } from '../../../shared/schemas/endpoint'

interface Asked {
  method: string
  path: string
  body: unknown
}

type Answer = (asked: Asked) => Response

/** Replies are parsed by the call's own schema before they are given out, so a fake cannot drift from the contract. */
export function reply<E extends Endpoint & { reply: z.ZodType }>(endpoint: E, body: z.input<E['reply']>): Response {
  return json(endpoint.reply.parse(body), endpoint.status ?? 200)
}

export function refusal(status: number, code: string, message: string): Response {
  return json({ error: { code, message, details: {} } }, status)
}

/** Answers by "METHOD /path"; a call nobody planned fails the test. */
export function fakeServer(answers: Record<string, Answer>): Asked[] {
  const asked: Asked[] = []
  vi.stubGlobal('fetch', (address: string, init?: RequestInit) => {
    const path = address.replace(/^\/api/, '')
    const one = { method: init?.method ?? 'GET', path, body: typeof init?.body === 'string' ? (JSON.parse(init.body) as unknown) : undefined }
    asked.push(one)
    const answer = answers[`${one.method} ${path}`] ?? answers[`${one.method} ${path.replace(/\?.*$/, '')}`]
    return answer ? Promise.resolve(answer(one)) : Promise.reject(new Error(`nobody answers ${one.method} ${path}`))
  })
  return asked
}

function json(body: unknown, status: number): Response {
  return new Response(JSON.stringify(body), { status, headers: { 'content-type': 'application/json' } })
}
