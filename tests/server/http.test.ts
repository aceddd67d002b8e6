import { mkdir, writeFile } from 'node:fs/promises'
import { join } from 'node:path'
import express from 'express'
import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { z } from 'zod'
import { endpoint } from '../../shared/schemas/endpoint'
import { endpoints } from '../../shared/schemas/endpoints'
import { createApp } from '../../server/app'
import { errorReply } from '../../server/middleware/error-reply'
import { tileOrigin } from '../../server/middleware/security-headers'
import { serve } from '../../server/routes/serve'
import { aUser, bearer } from '../support/people'
import { createTestContext, type TestContext } from '../support/test-context'

let context: TestContext
let clientDir: string

beforeAll(async () => {
  context = await createTestContext()
  clientDir = join(context.env.dataDir, 'client')
  await mkdir(join(clientDir, 'assets'), { recursive: true })
  await writeFile(join(clientDir, 'index.html'), '<title>Offing</title>')
  await writeFile(join(clientDir, 'assets/main-abc123.js'), 'export {}')
})
afterAll(() => context.close())

describe('a reply', () => {
  const shape = endpoint({ method: 'GET', path: '/thing', may: 'anyone', summary: 'A thing', reply: z.object({ id: z.number() }) })

  async function replyWith(value: unknown, mode: 'test' | 'production') {
    const app = express()
    const inMode = { ...context, env: { ...context.env, mode } }
    serve(app, inMode, shape, () => value as { id: number })
    app.use(errorReply(inMode))
    return request(app).get('/thing')
  }

  it('holds only what its schema names', async () => {
    expect((await replyWith({ id: 1, passwordHash: 'secret' }, 'test')).body).toEqual({ id: 1 })
  })

  it('that breaks its schema is an error in tests and still an answer in production', async () => {
    const inTest = await replyWith({ id: 'one' }, 'test')
    expect([inTest.status, inTest.body.error.code]).toEqual([500, 'server-error'])
    const inProduction = await replyWith({ id: 'one' }, 'production')
    expect([inProduction.status, inProduction.body]).toEqual([200, { id: 'one' }])
  })
})

describe('an unexpected error', () => {
  it('is told without its inner words', async () => {
    const app = express()
    app.get('/broken', () => {
      throw new Error('SELECT secret FROM users')
    })
    app.use(errorReply(context))
    const reply = await request(app).get('/broken')
    expect([reply.status, reply.body.error.message]).toEqual([500, 'Something went wrong on the server. It was logged.'])
  })
})

describe('rate limits', () => {
  // A copy of the app that counts, as production does.
  const counting = () => createApp({ ...context, env: { ...context.env, mode: 'demo' } }, { clientDir })
  const wrong = (app: express.Express, email: string) => request(app).post('/api/auth/sign-in').send({ email, password: 'not the password' })

  it('stop guessing at one account after 20 failures, and leave others alone', async () => {
    const app = counting()
    const person = await aUser(context)
    for (let tries = 0; tries < 20; tries++) await wrong(app, person.email).expect(401)
    const stopped = await wrong(app, person.email)
    expect([stopped.status, stopped.body.error.code]).toEqual([429, 'too-many-requests'])
    expect(stopped.get('Retry-After')).toMatch(/^\d+$/)
    const other = await aUser(context)
    await request(app).post('/api/auth/sign-in').send({ email: other.email, password: other.password }).expect(200)
  })

  it('count calls, but neither health calls nor those with a personal token', async () => {
    const app = counting()
    const authorization = await bearer(context, await aUser(context))
    expect((await request(app).get('/api/auth/me').set('Authorization', authorization).expect(200)).get('RateLimit')).toBeUndefined()
    expect((await request(app).get('/api/health')).get('RateLimit')).toBeUndefined()
    expect((await request(app).get('/api/auth/me').expect(401)).get('RateLimit')).toContain('limit=6000')
  })
})

describe('the client', () => {
  it('answers every page path with the page, never cached, and its files for good', async () => {
    const app = createApp(context, { clientDir })
    const page = await request(app).get('/regions/12').expect(200)
    expect([page.text, page.get('Cache-Control')]).toEqual(['<title>Offing</title>', 'no-cache'])
    expect((await request(app).get('/assets/main-abc123.js').expect(200)).get('Cache-Control')).toContain('immutable')
    await request(app).get('/assets/gone-def456.js').expect(404)
    expect((await request(app).get('/api/gone').expect(404)).body.error.code).toBe('not-found')
  })

  it('may load its own files, and pictures of the tile server if one is set', async () => {
    const policyOf = async (env: Partial<TestContext['env']>) => {
      const app = createApp({ ...context, env: { ...context.env, ...env } }, { clientDir })
      const reply = await request(app).get('/')
      return { policy: reply.get('Content-Security-Policy') ?? '', hsts: reply.get('Strict-Transport-Security') }
    }
    const plain = await policyOf({})
    expect(plain.policy).toContain("img-src 'self' data: blob:;")
    expect(plain.policy).toContain("script-src 'self';")
    expect(plain.policy).not.toContain('upgrade-insecure-requests')
    expect(plain.hsts).toBeUndefined()
    const secure = await policyOf({ baseUrl: 'https://offing.example', tileUrl: 'https://{s}.tiles.example/{z}/{x}/{y}.png' })
    expect(secure.policy).toContain("img-src 'self' data: blob: https://*.tiles.example;")
    expect(secure.policy).toContain('upgrade-insecure-requests')
    expect(secure.hsts).toContain('max-age')
    expect(tileOrigin('')).toBeNull()
  })
})

describe('the description of the interface', () => {
  it('names every call of the table, with its parameters, and is shown as a page', async () => {
    const { body } = await request(context.app).get('/api/openapi.json').expect(200)
    expect(body.openapi).toBe('3.1.0')
    for (const [name, { method, path }] of Object.entries(endpoints)) {
      const operation = body.paths[path.replace(/:(\w+)/g, '{$1}')]?.[method.toLowerCase()]
      expect(operation?.operationId, name).toBe(name)
      for (const [, parameter] of path.matchAll(/:(\w+)/g)) {
        expect(operation.parameters, name).toContainEqual(expect.objectContaining({ name: parameter, in: 'path', required: true }))
      }
    }
    const limit = body.paths['/users'].get.parameters.find((parameter: { name: string }) => parameter.name === 'limit')
    expect(limit).toMatchObject({ in: 'query', required: false, schema: { type: 'integer', minimum: 1, maximum: 500, default: 100 } })
    expect((await request(context.app).get('/api/docs/').expect(200)).text).toContain('swagger-ui')
  })
})
