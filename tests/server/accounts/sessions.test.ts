import request from 'supertest'
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest'
import { aUser, signIn, type TestUser } from '../../support/people'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: TestUser
/** Both cookies as a browser would hold them, by name. */
let jar: Record<string, string>

beforeAll(async () => {
  context = await createTestContext()
  person = await aUser(context)
})
afterAll(() => context.close())

beforeEach(async () => {
  const reply = await request(context.app).post('/api/auth/sign-in').send({ email: person.email, password: person.password }).expect(200)
  jar = cookiesOf(reply)
})

function cookiesOf(reply: request.Response): Record<string, string> {
  const pairs = (reply.get('Set-Cookie') ?? []).map((cookie) => (cookie.split(';')[0] ?? '').split('=') as [string, string])
  return Object.fromEntries(pairs)
}

const header = (cookies: Record<string, string>) => Object.entries(cookies).map(([name, value]) => `${name}=${value}`).join('; ')
const refresh = (cookies: Record<string, string>) => request(context.app).post('/api/auth/refresh').set('Cookie', header(cookies))
const me = (cookies: Record<string, string>) => request(context.app).get('/api/auth/me').set('Cookie', header(cookies))

describe('a session', () => {
  it('is told as expired after 15 minutes and works again once renewed', async () => {
    context.clock.pass(15 * 60_000 + 1000)
    const late = await me(jar)
    expect([late.status, late.body.error.code]).toEqual([401, 'session-expired'])
    const renewed = cookiesOf(await refresh(jar).expect(200))
    expect(renewed['offing_refresh']).not.toBe(jar['offing_refresh'])
    await me(renewed).expect(200)
  })

  it('gives two tabs that renew at once the same new cookie', async () => {
    const [first, second] = await Promise.all([refresh(jar), refresh(jar)])
    expect([first.status, second.status]).toEqual([200, 200])
    expect(cookiesOf(first)['offing_refresh']).toBe(cookiesOf(second)['offing_refresh'])
    await refresh(cookiesOf(second)).expect(200)
  })

  it('ends for thief and owner when an old refresh token is shown after the grace', async () => {
    const renewed = cookiesOf(await refresh(jar).expect(200))
    context.clock.pass(31_000)
    expect((await refresh(jar)).body.error.code).toBe('not-signed-in')
    await me(renewed).expect(401)
    await refresh(renewed).expect(401)
    const entries = await context.models.audit.findAll({ where: { action: 'session:reuse' } })
    expect(entries).toHaveLength(1)
  })

  it('ends too when the old token is several rotations old, as after a thief has renewed again and again', async () => {
    let stolen = cookiesOf(await refresh(jar).expect(200))
    for (let times = 0; times < 3; times++) {
      context.clock.pass(31_000)
      stolen = cookiesOf(await refresh(stolen).expect(200))
    }
    await refresh(jar).expect(401)
    await me(stolen).expect(401)
  })

  it('is not touched by a made-up refresh token', async () => {
    const [session] = (jar['offing_refresh'] ?? '').split('.')
    await refresh({ offing_refresh: `${session}.made-up-secret.made-up-tag-of-22-chars` }).expect(401)
    await me(jar).expect(200)
  })

  it('ends for good by signing out, although its access token would still run', async () => {
    await request(context.app).post('/api/auth/sign-out').set('Cookie', header(jar)).expect(204)
    const reply = await me(jar)
    expect([reply.status, reply.body.error.code]).toEqual([401, 'not-signed-in'])
    await refresh(jar).expect(401)
  })

  it('is over after 30 days without a renewal', async () => {
    context.clock.pass(30 * 24 * 3600_000 + 1000)
    await refresh(jar).expect(401)
  })

  it('is not opened by a token signed with another secret or with none', async () => {
    const [head, body] = (jar['offing_session'] ?? '').split('.')
    await me({ offing_session: `${head}.${body}.bm90IHRoZSBzaWduYXR1cmU` }).expect(401)
    const none = Buffer.from(JSON.stringify({ alg: 'none', typ: 'JWT' })).toString('base64url')
    await me({ offing_session: `${none}.${body}.` }).expect(401)
  })
})

describe('a personal token', () => {
  it('is shown once, kept only as a hash, and refused after it was revoked or is over', async () => {
    const agent = request.agent(context.app)
    await signIn(agent, person)
    const made = await agent.post('/api/tokens').send({ name: 'buoy script', expiresInDays: 1 }).expect(201)
    const token: string = made.body.token
    expect(token).toMatch(/^off_[\w-]{43}$/)
    expect(JSON.stringify((await agent.get('/api/tokens').expect(200)).body)).not.toContain(token)
    expect(JSON.stringify(await context.models.tokens.findAll({ raw: true }))).not.toContain(token)

    const call = (with_: string) => request(context.app).get('/api/auth/me').set('Authorization', `Bearer ${with_}`)
    await call(token).expect(200)
    const second = await agent.post('/api/tokens').send({ name: 'short', expiresInDays: 1 }).expect(201)
    await agent.delete(`/api/tokens/${made.body.id}`).expect(204)
    await call(token).expect(401)
    await call(second.body.token).expect(200)
    context.clock.pass(24 * 3600_000 + 1000)
    await call(second.body.token).expect(401)
  })

  it("of somebody else can't be revoked", async () => {
    const other = request.agent(context.app)
    await signIn(other, await aUser(context))
    const made = await other.post('/api/tokens').send({ name: 'theirs' }).expect(201)
    await request(context.app).delete(`/api/tokens/${made.body.id}`).set('Cookie', header(jar)).expect(404)
  })
})
