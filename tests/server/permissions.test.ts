import type { IncomingMessage } from 'node:http'
import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { can, roles, type Role } from '../../shared/permissions'
import type { Endpoint } from '../../shared/schemas/endpoint'
import { endpoints } from '../../shared/schemas/endpoints'
import { aUser, bearer } from '../support/people'
import { createTestContext, type TestContext } from '../support/test-context'

let context: TestContext
const authorization = new Map<Role, string>()

beforeAll(async () => {
  context = await createTestContext({ mail: true })
  for (const role of roles) authorization.set(role, await bearer(context, await aUser(context, { roles: [role] })))
})
afterAll(() => context.close())

/** The status of a call with made-up ids and an empty body; an endless reply is left after its head. */
async function statusOf(endpoint: Endpoint, role: Role | null): Promise<number> {
  const path = endpoint.path.replace(/:id\b/, '987654').replace(/:[zxy]\b/g, '0')
  const method = endpoint.method.toLowerCase() as 'get' | 'post' | 'put' | 'patch' | 'delete'
  const call = request(context.app)[method](`/api${path}`)
  if (role) call.set('Authorization', authorization.get(role) ?? '')
  if (endpoint.contentType !== 'text/event-stream') return statusOfRoute(await call.redirects(0))
  return new Promise((resolve, reject) => {
    call.buffer(false).parse((reply, done) => {
      const incoming = reply as unknown as IncomingMessage
      resolve(incoming.statusCode ?? 0)
      incoming.destroy()
      done(null, null)
    })
    call.end((error: unknown, reply) => (reply ? resolve(reply.status) : reject(error)))
  })
}

/** A call without a route would look allowed to everybody. */
function statusOfRoute(reply: request.Response): number {
  const message: unknown = reply.body?.error?.message
  if (typeof message === 'string' && /^There is no [A-Z]+ \/api/.test(message)) throw new Error(message)
  return reply.status
}

const guarded = (Object.entries(endpoints) as [string, Endpoint][]).filter(([, endpoint]) => endpoint.may !== 'anyone')
const open = (Object.entries(endpoints) as [string, Endpoint][]).filter(([, endpoint]) => endpoint.may === 'anyone')

describe.each(guarded)('%s', (_name, endpoint) => {
  it('needs somebody signed in', async () => {
    expect(await statusOf(endpoint, null)).toBe(401)
  })

  it.each(roles)('answers the permission table for the role %s', async (role) => {
    const status = await statusOf(endpoint, role)
    const may = endpoint.may !== 'anyone' && can({ roles: [role] }, endpoint.may)
    if (may) {
      expect([401, 403, 500]).not.toContain(status)
    } else {
      expect(status).toBe(403)
    }
  })
})

describe.each(open)('%s, which anyone may call', (_name, endpoint) => {
  it('asks for no role', async () => {
    const status = await statusOf(endpoint, null)
    expect(status).not.toBe(403)
    expect(status).not.toBe(500)
    // Renewing without a session is the one that can only answer so.
    if (endpoint !== endpoints.refresh) expect(status).not.toBe(401)
  })
})
