import request from 'supertest'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { deliverDue } from '../../../server/mail/delivery'
import { aUser, signIn, type TestUser } from '../../support/people'
import { createTestContext, type TestContext } from '../../support/test-context'

let context: TestContext
let admin: TestUser

beforeAll(async () => {
  context = await createTestContext({ mail: true })
  admin = await aUser(context, { roles: ['admin'], name: 'Ada <b>Brine</b>' })
})
afterAll(() => context.close())

const post = (path: string, body: object) => request(context.app).post(`/api${path}`).send(body)

/** Delivers over SMTP and answers the newest letter to that address, with the secret of its link. */
async function letterTo(email: string) {
  await deliverDue(context)
  const letter = context.mailCatcher?.list().find(({ to }) => to.includes(email))
  if (!letter) throw new Error(`No letter to ${email} was caught.`)
  const secret = /\/(?:reset-password|invitation)\/([\w-]+)/.exec(letter.text)?.[1] ?? ''
  return { letter, secret }
}

describe('a forgotten password', () => {
  it('is set anew by the link of a letter, which ends every session and works once', async () => {
    const person = await aUser(context)
    const agent = request.agent(context.app)
    await signIn(agent, person)
    await post('/auth/forgot-password', { email: person.email }).expect(202)
    const { letter, secret } = await letterTo(person.email)
    expect(letter.subject).toBe('Set a new password for Offing')
    expect(letter.html).toContain(`${context.env.baseUrl}/reset-password/${secret}`)

    await post('/auth/reset-password', { token: secret, password: 'another long password' }).expect(204)
    await agent.get('/api/auth/me').expect(401)
    await post('/auth/sign-in', { email: person.email, password: person.password }).expect(401)
    await post('/auth/sign-in', { email: person.email, password: 'another long password' }).expect(200)
    const again = await post('/auth/reset-password', { token: secret, password: 'a third long password' })
    expect([again.status, again.body.error.code]).toEqual([410, 'already-used'])
  })

  it('answers the same for an address nobody has, and writes no letter', async () => {
    const before = await context.models.letters.count()
    await post('/auth/forgot-password', { email: 'nobody@example.org' }).expect(202)
    expect(await context.models.letters.count()).toBe(before)
  })

  it('cannot be set by a link an hour old, nor by an unknown one', async () => {
    const person = await aUser(context)
    await post('/auth/forgot-password', { email: person.email }).expect(202)
    const { secret } = await letterTo(person.email)
    context.clock.pass(3600_000 + 1000)
    await post('/auth/reset-password', { token: secret, password: 'another long password' }).expect(410)
    await post('/auth/reset-password', { token: 'x'.repeat(43), password: 'another long password' }).expect(404)
  })

  it('keeps the link neither in its own table nor in the outbox once delivered', async () => {
    const person = await aUser(context)
    await post('/auth/forgot-password', { email: person.email }).expect(202)
    const { secret } = await letterTo(person.email)
    const kept = JSON.stringify([await context.models.passwordResets.findAll({ raw: true }), await context.models.letters.findAll({ raw: true })])
    expect(secret).toHaveLength(43)
    expect(kept).not.toContain(secret)
  })
})

describe('an invitation', () => {
  async function inviteBy(inviter: TestUser, body: object) {
    const agent = request.agent(context.app)
    await signIn(agent, inviter)
    return agent.post('/api/invitations').send(body)
  }

  it('comes by letter, makes the account with its roles and signs the person in', async () => {
    const invited = await inviteBy(admin, { email: 'Mara@Example.org', name: 'Mara Quill', roles: ['analyst', 'officer'] })
    expect(invited.status).toBe(201)
    const { letter, secret } = await letterTo('mara@example.org')
    expect(letter.subject).toBe('Ada <b>Brine</b> invites you to Offing')
    expect(letter.html).toContain('Ada &lt;b&gt;Brine&lt;/b&gt; invites you to Offing')

    const agent = request.agent(context.app)
    const accepted = await agent.post('/api/auth/accept-invitation').send({ token: secret, password: 'a long enough one' })
    expect(accepted.status).toBe(200)
    expect(accepted.body.user).toMatchObject({ name: 'Mara Quill', email: 'mara@example.org' })
    expect([...accepted.body.user.roles].sort()).toEqual(['analyst', 'officer'])
    await agent.get('/api/auth/me').expect(200)
    await post('/auth/accept-invitation', { token: secret, password: 'a long enough one' }).expect(410)
    expect((await inviteBy(admin, { email: 'mara@example.org', name: 'Mara', roles: ['analyst'] })).status).toBe(409)
  })

  it('is replaced by a newer one to the same address, and is too old after 7 days', async () => {
    await inviteBy(admin, { email: 'tam@example.org', name: 'Tam', roles: ['researcher'] })
    const first = await letterTo('tam@example.org')
    await inviteBy(admin, { email: 'tam@example.org', name: 'Tam', roles: ['researcher'] })
    const second = await letterTo('tam@example.org')
    expect(second.letter.messageId).not.toBe(first.letter.messageId)
    await post('/auth/accept-invitation', { token: first.secret, password: 'a long enough one' }).expect(404)
    context.clock.pass(7 * 24 * 3600_000 + 1000)
    await post('/auth/accept-invitation', { token: second.secret, password: 'a long enough one' }).expect(410)
  })

  it('can be sent by an admin only', async () => {
    const officer = await aUser(context, { roles: ['officer'] })
    expect((await inviteBy(officer, { email: 'x@example.org', name: 'X', roles: ['admin'] })).status).toBe(403)
  })
})
