import { expect, test } from 'vitest'
import { endpoints } from '../../../shared/schemas/endpoints'
import { addressOf, call } from '../../../src/api/call'
import { fakeServer, refusal, reply } from '../support/fake-server'
import { anAlert, officer } from '../support/fixtures'

const session = () => reply(endpoints.refresh, { user: officer, expiresAt: '2026-06-11T04:00:00Z' })

test('a call whose session ran out renews it once and is made again', async () => {
  let ranOut = true
  const asked = fakeServer({
    'GET /auth/me': () => (ranOut ? refusal(401, 'session-expired', 'The session is over.') : reply(endpoints.me, officer)),
    'POST /auth/refresh': () => {
      ranOut = false
      return session()
    },
  })
  expect(await call(endpoints.me)).toEqual(officer)
  expect(asked.map((a) => a.path)).toEqual(['/auth/me', '/auth/refresh', '/auth/me'])
})

test('two calls that meet the end of a session renew it together', async () => {
  let ranOut = true
  const asked = fakeServer({
    'GET /auth/me': () => (ranOut ? refusal(401, 'session-expired', 'The session is over.') : reply(endpoints.me, officer)),
    'POST /auth/refresh': () => {
      ranOut = false
      return session()
    },
  })
  await Promise.all([call(endpoints.me), call(endpoints.me)])
  expect(asked.filter((a) => a.path === '/auth/refresh')).toHaveLength(1)
})

test('a cookie the browser dropped at its end counts as a session that ran out', async () => {
  localStorage.setItem('offing.session-expires', '2026-06-11T03:00:00Z')
  const asked = fakeServer({
    'GET /auth/me': () => refusal(401, 'not-signed-in', 'Sign in first.'),
    'POST /auth/refresh': () => refusal(401, 'session-expired', 'Over.'),
  })
  await expect(call(endpoints.me)).rejects.toMatchObject({ code: 'not-signed-in', status: 401, message: 'Sign in first.' })
  expect(asked.map((a) => a.path)).toEqual(['/auth/me', '/auth/refresh'])
})

test('a stranger is not asked to renew what never was', async () => {
  fakeServer({
    'GET /auth/me': () => refusal(401, 'not-signed-in', 'Sign in first.'),
  })
  await expect(call(endpoints.me)).rejects.toMatchObject({ code: 'not-signed-in', status: 401, message: 'Sign in first.' })
})

test('a wrong password is not an ended session', async () => {
  const asked = fakeServer({ 'POST /auth/sign-in': () => refusal(401, 'wrong-credentials', 'They do not belong together.') })
  await expect(call(endpoints.signIn, { body: { email: 'a@b.example', password: 'x' } })).rejects.toMatchObject({ code: 'wrong-credentials' })
  expect(asked).toHaveLength(1)
})

test('a reply that is not what was agreed is refused instead of shown', async () => {
  fakeServer({ 'GET /alerts/41': () => Response.json({ ...anAlert(), severity: 'Terrible' }) })
  await expect(call(endpoints.alert, { params: { id: 41 } })).rejects.toMatchObject({ code: 'unreadable-reply' })
})

test('a server that cannot be reached is said as such', async () => {
  fakeServer({})
  await expect(call(endpoints.today)).rejects.toMatchObject({ code: 'no-connection', status: 0 })
})

test('an address leaves out what was not given and escapes the rest', () => {
  expect(addressOf(endpoints.exportAlerts, { query: { state: 'open', severity: undefined } })).toBe('/api/exports/alerts.csv?state=open')
  expect(addressOf(endpoints.caughtLetter, { params: { id: 'a/b' } })).toBe('/api/mail/a%2Fb')
})
