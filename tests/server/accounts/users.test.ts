import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createAdmin } from '../../../server/commands/create-admin'
import { createToken } from '../../../server/commands/create-token'
import { aUser, signIn, type TestUser } from '../../support/people'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let admin: TestUser
let agent: ReturnType<typeof request.agent>

beforeAll(async () => {
  context = await createTestContext()
  admin = await aUser(context, { roles: ['admin'] })
  agent = request.agent(context.app)
  await signIn(agent, admin)
})
afterAll(() => context.close())

describe('people', () => {
  it('are added with roles and a password, and never told with its hash', async () => {
    const body = { email: 'iona@example.org', name: 'Iona Skerry', roles: ['researcher', 'researcher'], password: 'a long enough one', timeZone: 'Europe/Dublin' }
    const reply = await agent.post('/api/users').send(body)
    expect(reply.status).toBe(201)
    expect(reply.body).toMatchObject({ email: 'iona@example.org', roles: ['researcher'], timeZone: 'Europe/Dublin', disabled: false, version: 1 })
    expect(JSON.stringify(reply.body)).not.toContain('$2')
    await agent.post('/api/users').send(body).expect(409)
    await signIn(request.agent(context.app), { email: 'iona@example.org', password: 'a long enough one' })
  })

  it('are listed in pages', async () => {
    for (let more = 0; more < 4; more++) await aUser(context)
    const seen: number[] = []
    let cursor: string | null = ''
    while (cursor !== null) {
      const page: request.Response = await agent.get(`/api/users?limit=2${cursor && `&cursor=${cursor}`}`).expect(200)
      expect(page.body.items.length).toBeLessThanOrEqual(2)
      seen.push(...page.body.items.map((item: { id: number }) => item.id))
      cursor = page.body.nextCursor
    }
    expect(seen).toHaveLength(await context.models.users.count())
    expect(new Set(seen).size).toBe(seen.length)
  })

  it('are changed only by somebody who saw the newest version', async () => {
    const person = await aUser(context)
    await agent.patch(`/api/users/${person.id}`).send({ version: 1, name: 'New Name' }).expect(200)
    const stale = await agent.patch(`/api/users/${person.id}`).send({ version: 1, name: 'Other Name' })
    expect([stale.status, stale.body.error.code, stale.body.error.details]).toEqual([409, 'stale-version', { version: 2 }])
  })

  it('always keep one admin who can sign in', async () => {
    const lost = await agent.patch(`/api/users/${admin.id}`).send({ version: 1, roles: ['officer'] })
    expect([lost.status, lost.body.error.code]).toEqual([409, 'conflict'])
    await agent.patch(`/api/users/${admin.id}`).send({ version: 1, disabled: true }).expect(409)
    await agent.get('/api/users').expect(200)
    const second = await aUser(context, { roles: ['admin'] })
    await agent.patch(`/api/users/${second.id}`).send({ version: 1, disabled: true }).expect(200)
  })

  it('leave a trace of what was done to them', async () => {
    const person = await aUser(context)
    await agent.patch(`/api/users/${person.id}`).send({ version: 1, roles: ['analyst'] }).expect(200)
    const entries = (await agent.get('/api/audit?limit=1').expect(200)).body.items
    expect(entries[0]).toMatchObject({ who: admin.name, action: 'user:change', subject: `user ${person.id}`, details: { roles: ['analyst'] } })
  })
})

describe('the commands', () => {
  it('make an admin, and give the role and a new password to somebody already there', async () => {
    expect(await createAdmin(context, { email: 'First@example.org', password: 'a long enough one' })).toMatchObject({ created: true })
    const person = await aUser(context, { roles: ['officer'] })
    expect(await createAdmin(context, { email: person.email, password: 'another long one' })).toEqual({ id: person.id, created: false })
    const reply = await request(context.app).post('/api/auth/sign-in').send({ email: person.email, password: 'another long one' })
    expect([...reply.body.user.roles].sort()).toEqual(['admin', 'officer'])
    await expect(createAdmin(context, { email: 'x@example.org', password: 'short' })).rejects.toThrow('at least 10 characters')
  })

  it('make a token that works, for somebody with an account only', async () => {
    const token = await createToken(context, { email: admin.email })
    await request(context.app).get('/api/users').set('Authorization', `Bearer ${token}`).expect(200)
    await expect(createToken(context, { email: 'nobody@example.org' })).rejects.toThrow('Nobody has the e-mail address')
  })
})

describe('subscriptions', () => {
  const wish = { allRegions: true, minimumSeverity: 'Moderate' }

  it('are one own for everybody, and everybody’s for an admin', async () => {
    const officer = await aUser(context, { roles: ['officer'] })
    const own = request.agent(context.app)
    await signIn(own, officer)
    const made = await own.post('/api/subscriptions').send(wish).expect(201)
    expect(made.body).toMatchObject({ userId: officer.id, delivery: 'at once', regionIds: [], pausedUntil: null, version: 1 })
    const other = await agent.post('/api/subscriptions').send(wish).expect(201)
    expect((await own.get('/api/subscriptions').expect(200)).body.items).toHaveLength(1)
    expect((await agent.get('/api/subscriptions').expect(200)).body.items).toHaveLength(2)

    await own.post('/api/subscriptions').send({ ...wish, userId: admin.id }).expect(403)
    await own.patch(`/api/subscriptions/${other.body.id}`).send({ version: 1, minimumSeverity: 'Extreme' }).expect(403)
    await own.delete(`/api/subscriptions/${other.body.id}`).expect(403)
    const changed = await agent.patch(`/api/subscriptions/${made.body.id}`).send({ version: 1, minimumSeverity: 'Severe' }).expect(200)
    expect(changed.body).toMatchObject({ userId: officer.id, minimumSeverity: 'Severe', version: 2 })
    await own.patch(`/api/subscriptions/${made.body.id}`).send({ version: 1, minimumSeverity: 'Minor' }).expect(409)
    await own.delete(`/api/subscriptions/${made.body.id}`).expect(204)
  })

  it('name regions that are there', async () => {
    const none = await agent.post('/api/subscriptions').send({ ...wish, allRegions: false })
    expect(none.body.error.message).toBe('Choose at least one region, or all of them.')
    const unknown = await agent.post('/api/subscriptions').send({ ...wish, allRegions: false, regionIds: [987] })
    expect([unknown.status, unknown.body.error.message]).toEqual([422, 'There is no region 987.'])
  })
})
