import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { aUser, bearer, signIn, type TestUser } from '../../support/people'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let person: TestUser

beforeAll(async () => {
  context = await createTestContext()
  await aUser(context, { roles: ['admin'] })
  person = await aUser(context, { roles: ['officer'] })
})
afterAll(() => context.close())

describe('signing in', () => {
  it('opens a session that tells who is signed in', async () => {
    const agent = request.agent(context.app)
    const reply = await agent.post('/api/auth/sign-in').send({ email: person.email.toUpperCase(), password: person.password })
    expect(reply.status).toBe(200)
    expect(reply.body.user).toMatchObject({ email: person.email, roles: ['officer'], demo: false })
    expect((await agent.get('/api/auth/me').expect(200)).body.id).toBe(person.id)
  })

  it('keeps its cookies from scripts, from other sites and the refresh cookie to its own calls', async () => {
    const reply = await request(context.app).post('/api/auth/sign-in').send({ email: person.email, password: person.password })
    const cookies = reply.get('Set-Cookie') ?? []
    expect(cookies).toHaveLength(2)
    for (const cookie of cookies) expect(cookie).toMatch(/HttpOnly; SameSite=Lax/)
    expect(cookies.find((cookie) => cookie.startsWith('offing_refresh='))).toContain('Path=/api/auth;')
    expect(cookies.join()).not.toContain('Secure')
  })

  it('tells an unknown address and a wrong password in the same words', async () => {
    const wrong = await request(context.app).post('/api/auth/sign-in').send({ email: person.email, password: 'not the password' })
    const unknown = await request(context.app).post('/api/auth/sign-in').send({ email: 'nobody@example.org', password: 'not the password' })
    expect(wrong.status).toBe(401)
    expect(wrong.body).toEqual({ error: { code: 'wrong-credentials', message: 'E-mail or password is wrong.', details: {} } })
    expect(unknown.body).toEqual(wrong.body)
  })

  it('compares a password even where there is no account', async () => {
    const compared: string[] = []
    const { light } = context.workers
    context.workers.light = (task, input, options) => {
      compared.push(task)
      return light(task, input, options)
    }
    await request(context.app).post('/api/auth/sign-in').send({ email: 'nobody@example.org', password: 'not the password' }).expect(401)
    context.workers.light = light
    expect(compared).toEqual(['comparePassword'])
  })

  it('says which field is not valid', async () => {
    const reply = await request(context.app).post('/api/auth/sign-in').send({ email: 'no address', password: '' })
    expect(reply.status).toBe(422)
    expect(reply.body.error.details.fields).toHaveProperty('email', 'This is not an e-mail address.')
    expect(reply.body.error.details.fields).toHaveProperty('password')
  })

  it('refuses a body that is no JSON, and a path that does not exist, in the same shape', async () => {
    const broken = await request(context.app).post('/api/auth/sign-in').set('Content-Type', 'application/json').send('{"email":')
    expect([broken.status, broken.body.error.code]).toEqual([400, 'bad-request'])
    const lost = await request(context.app).get('/api/nothing-here')
    expect([lost.status, lost.body.error.code]).toEqual([404, 'not-found'])
  })

  it('refuses a call from a page of another site, and takes one from our own', async () => {
    const agent = request.agent(context.app)
    await signIn(agent, person)
    const foreign = await agent.post('/api/tokens').set('Origin', 'https://elsewhere.example').send({ name: 'stolen' })
    expect([foreign.status, foreign.body.error.code]).toEqual([403, 'not-allowed'])
    await agent.post('/api/tokens').set('Origin', 'null').send({ name: 'stolen' }).expect(403)
    await agent.post('/api/tokens').set('Origin', context.env.baseUrl).send({ name: 'own' }).expect(201)
  })
})

describe('a person who may no longer come in', () => {
  it('is refused with the next call once disabled, by session and by token, and cannot sign in', async () => {
    const admin = request.agent(context.app)
    await signIn(admin, await aUser(context, { roles: ['admin'] }))
    const leaver = await aUser(context, { roles: ['officer'] })
    const agent = request.agent(context.app)
    await signIn(agent, leaver)
    const token = await bearer(context, leaver)
    await request(context.app).get('/api/auth/me').set('Authorization', token).expect(200)

    await admin.patch(`/api/users/${leaver.id}`).send({ version: 1, disabled: true }).expect(200)

    await agent.get('/api/auth/me').expect(401)
    await request(context.app).get('/api/auth/me').set('Authorization', token).expect(401)
    await request(context.app).post('/api/auth/sign-in').send({ email: leaver.email, password: leaver.password }).expect(401)
  })

  it('loses with the next call what a role allowed', async () => {
    const admin = request.agent(context.app)
    await signIn(admin, await aUser(context, { roles: ['admin'] }))
    const other = await aUser(context, { roles: ['admin'] })
    const agent = request.agent(context.app)
    await signIn(agent, other)
    await agent.get('/api/users').expect(200)
    await admin.patch(`/api/users/${other.id}`).send({ version: 1, roles: ['researcher'] }).expect(200)
    await agent.get('/api/users').expect(403)
  })
})
