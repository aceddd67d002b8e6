import { screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test } from 'vitest'
import type { Me } from '../../../shared/schemas/auth'
import { endpoints } from '../../../shared/schemas/endpoints'
import type { FeedPull, PullRun } from '../../../shared/schemas/pulls'
import { PullPart } from '../../../src/pages/feed/pull-part'
import { runWords } from '../../../src/pages/feed/pull-words'
import { fakeServer, refusal, reply } from '../support/fake-server'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

const admin: Me = { ...officer, id: 2, roles: ['admin'] }
const feed = { id: 4, name: 'West, daily', retired: false }
const address = 'https://provider.example/{yyyy}/chl-{yyyy}{MM}{dd}.nc'
const aRun = (change: Partial<PullRun> = {}): PullRun => ({
  id: 1, startedAt: '2026-06-11T12:00:00Z', endedAt: '2026-06-11T12:00:10Z', outcome: 'ok', fetched: 2, unchanged: 5, notThere: 1, failed: 0, sentence: null, ...change,
})
const nothing: FeedPull = { feedId: 4, settings: null, example: null, running: false, nextDueAt: null, failuresInRow: 0, failing: false, lastRun: null, runs: [] }
const something: FeedPull = {
  ...nothing,
  settings: { address, everyHours: 6, atMinute: 20, lookBackDays: 7, stepMinutes: null, credentials: 'basic', version: 3 },
  example: 'https://provider.example/2026/chl-20260611.nc',
  nextDueAt: '2026-06-11T18:20:00Z',
  lastRun: aRun(),
  runs: [aRun()],
}

function open(me: Me, pull: FeedPull, answers: Parameters<typeof fakeServer>[0] = {}) {
  const asked = fakeServer({ 'GET /feeds/4/pull': () => reply(endpoints.feedPull, pull), ...answers })
  const client = show(<PullPart feed={feed} />, { me })
  return Object.assign(asked, { client })
}

test('a run is told in one sentence', () => {
  expect(runWords(aRun())).toBe('2 files fetched, 1 not there yet, 5 as before.')
  expect(runWords(aRun({ fetched: 0, unchanged: 0, notThere: 0, failed: 1, outcome: 'failed', sentence: 'provider.example takes no connection.' }))).toBe('1 failed. provider.example takes no connection.')
})

test('who may not change feeds sees how it goes, and nothing to press', async () => {
  open(officer, something)
  expect(await screen.findByText(address)).toBeVisible()
  expect(screen.getByText('https://provider.example/2026/chl-20260611.nc')).toBeVisible()
  expect(screen.getByText('name and password')).toBeVisible()
  expect(screen.getByText(/2 files fetched, 1 not there yet, 5 as before/)).toBeVisible()
  expect(screen.queryByRole('button')).toBeNull()
})

test('three failures in a row stand above the rest, with the sentence', async () => {
  const failed = aRun({ outcome: 'failed', failed: 1, sentence: 'provider.example does not answer in time.' })
  open(officer, { ...something, failing: true, failuresInRow: 3, lastRun: failed, runs: [failed] })
  const alert = await screen.findByRole('alert')
  expect(alert).toHaveTextContent('The last 3 fetches failed. provider.example does not answer in time.')
})

test('an admin types an address, sees that of today, and sends it with the credentials', async () => {
  const asked = open(admin, nothing, { 'PUT /feeds/4/pull': () => reply(endpoints.keepPull, something) })
  await userEvent.click(await screen.findByRole('button', { name: 'Let it fetch…' }))
  const field = screen.getByLabelText('Address')
  await userEvent.click(field)
  await userEvent.paste(address)
  const today = new Date().toISOString().slice(0, 10).replaceAll('-', '')
  expect(screen.getByText(new RegExp(`Today: https://provider.example/${today.slice(0, 4)}/chl-${today}.nc`))).toBeVisible()
  await userEvent.selectOptions(screen.getByLabelText('Credentials'), 'name and password')
  await userEvent.click(screen.getByRole('button', { name: 'Let it fetch' }))
  expect(await screen.findByText('Give the password.')).toBeVisible()
  await userEvent.type(screen.getByLabelText('Name at the provider'), 'ana')
  await userEvent.type(screen.getByLabelText('Password there'), 'open-sesame')
  await userEvent.click(screen.getByRole('button', { name: 'Let it fetch' }))
  await expect.poll(() => asked.find((one) => one.method === 'PUT')?.body).toEqual({
    address, everyHours: 6, atMinute: 0, lookBackDays: 7, stepMinutes: null, version: null, credentials: { kind: 'basic', user: 'ana', password: 'open-sesame' },
  })
  expect(await screen.findByText('every 6 hours at minute 20')).toBeVisible()
  expect(document.body.textContent).not.toContain('open-sesame')
})

test('stored credentials stay unless something else is chosen, and what the server says stands at its field', async () => {
  const sentence = 'The address is on another server now.'
  const asked = open(admin, something, {
    'PUT /feeds/4/pull': () => new Response(JSON.stringify({ error: { code: 'not-valid', message: sentence, details: { fields: { credentials: sentence } } } }), { status: 422 }),
  })
  await userEvent.click(await screen.findByRole('button', { name: 'Change what it fetches…' }))
  expect(screen.getByLabelText('Credentials')).toHaveDisplayValue('as stored: name and password')
  await userEvent.click(screen.getByRole('button', { name: 'Save what it fetches' }))
  expect(await screen.findByText(sentence)).toBeVisible()
  expect(asked.find((one) => one.method === 'PUT')?.body).toEqual({ address, everyHours: 6, atMinute: 20, lookBackDays: 7, stepMinutes: null, version: 3 })
})

test('a wrong address is told in words and nothing is sent', async () => {
  const asked = open(admin, nothing)
  await userEvent.click(await screen.findByRole('button', { name: 'Let it fetch…' }))
  await userEvent.click(screen.getByLabelText('Address'))
  await userEvent.paste('https://provider.example/{year}.nc')
  await userEvent.click(screen.getByRole('button', { name: 'Let it fetch' }))
  expect(await screen.findByText(/\{year\} is no part of a date/)).toBeVisible()
  expect(asked.some((one) => one.method === 'PUT')).toBe(false)
})

test('fetching now says that it fetches, then what came of it', async () => {
  let state: FeedPull = something
  const { client } = open(admin, something, {
    'GET /feeds/4/pull': () => reply(endpoints.feedPull, state),
    'POST /feeds/4/pull/now': () => reply(endpoints.pullNow, { ...something, running: true }),
  })
  state = { ...something, lastRun: aRun({ id: 2, fetched: 1, unchanged: 0, notThere: 0 }) }
  await userEvent.click(await screen.findByRole('button', { name: 'Fetch now' }))
  expect(await screen.findByRole('button', { name: 'Fetching…' })).toBeDisabled()
  // As the stream does when the run is over.
  await client.invalidateQueries({ queryKey: ['feeds'] })
  expect(await screen.findByText(/1 file fetched\./)).toBeVisible()
})

test('ending it is confirmed by the name of the feed', async () => {
  const asked = open(admin, something, { 'DELETE /feeds/4/pull': () => refusal(404, 'not-found', 'This feed fetches nothing for itself.') })
  await userEvent.click(await screen.findByRole('button', { name: 'Fetch no more…' }))
  const dialog = within(await screen.findByRole('dialog'))
  expect(dialog.getByRole('button', { name: 'Fetch no more' })).toBeDisabled()
  await userEvent.type(dialog.getByRole('textbox'), 'west, daily')
  await userEvent.click(dialog.getByRole('button', { name: 'Fetch no more' }))
  expect(await dialog.findByText('This feed fetches nothing for itself.')).toBeVisible()
  expect(asked.some((one) => one.method === 'DELETE')).toBe(true)
})
