import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test } from 'vitest'
import { endpoints } from '../../../shared/schemas/endpoints'
import { RequireSession } from '../../../src/components/frame/require-session'
import { Component as SignIn } from '../../../src/pages/sign-in'
import { fakeServer, refusal, reply } from '../support/fake-server'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

const atDoor = () => show(<SignIn />, { at: '/sign-in?next=%2Falerts%2F41', pattern: '/sign-in', others: [{ path: '/alerts/41', element: <h1>alert 41</h1> }] })

async function signIn(password: string) {
  await userEvent.type(screen.getByLabelText('E-mail'), 'ines@demo.example')
  await userEvent.type(screen.getByLabelText('Password'), password)
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
}

test('a stranger who follows a link from a letter comes to the door with the page kept', async () => {
  fakeServer({
    'GET /auth/me': () => refusal(401, 'not-signed-in', 'Sign in first.'),
    'POST /auth/refresh': () => refusal(401, 'session-expired', 'Over.'),
  })
  show(<RequireSession />, { at: '/alerts/41', pattern: '/alerts/41', others: [{ path: '/sign-in', element: <SignIn /> }] })
  expect(await screen.findByText('Sign in to open the page you asked for.')).toBeInTheDocument()
})

test('after signing in the page that was asked for opens', async () => {
  fakeServer({ 'POST /auth/sign-in': () => reply(endpoints.signIn, { user: officer, expiresAt: '2026-06-11T04:00:00Z' }) })
  atDoor()
  await signIn('a long enough one')
  expect(await screen.findByRole('heading', { name: 'alert 41' })).toBeInTheDocument()
})

test('a refused sign-in says why and keeps what was typed', async () => {
  fakeServer({ 'POST /auth/sign-in': () => refusal(401, 'wrong-credentials', 'E-mail and password do not belong together.') })
  atDoor()
  await signIn('not this one')
  expect(await screen.findByRole('alert')).toHaveTextContent('E-mail and password do not belong together.')
  expect(screen.getByLabelText('E-mail')).toHaveValue('ines@demo.example')
})
