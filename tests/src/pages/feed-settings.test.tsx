import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test } from 'vitest'
import type { Me } from '../../../shared/schemas/auth'
import { endpoints } from '../../../shared/schemas/endpoints'
import type { Feed } from '../../../shared/schemas/feeds'
import { FeedForm } from '../../../src/pages/feed/feed-form'
import { QualityForm } from '../../../src/pages/feed/quality-form'
import { fakeServer, reply } from '../support/fake-server'
import { aWaitingFile } from '../support/file-fixtures'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

const analyst: Me = { ...officer, id: 2, roles: ['analyst'] }
const feed: Feed = {
  ...aWaitingFile().proposal!, id: 4, derivedFrom: null, derivedSources: [], formula: null, formulaVersion: null, retired: false,
  createdAt: '2026-06-11T03:00:00Z', version: 3, layers: 0, oldestLayerAt: null, newestLayerAt: null, newestAgeHours: null, silent: false,
}

function open(part: 'settings' | 'quality', change: Partial<Feed> = {}) {
  const asked = fakeServer({ 'PATCH /feeds/4': () => reply(endpoints.changeFeed, { ...feed, ...change }) })
  const shown = { ...feed, ...change }
  show(part === 'settings' ? <FeedForm feed={shown} /> : <QualityForm feed={shown} />, { me: analyst, at: '/feeds/4', pattern: '/feeds/:id' })
  return () => asked.find((one) => one.method === 'PATCH')?.body
}

test('the cadence of a feed is changed among its settings', async () => {
  const sent = open('settings')
  await userEvent.selectOptions(await screen.findByLabelText('Cadence'), 'monthly')
  await userEvent.click(screen.getByRole('button', { name: 'Save the settings' }))
  await expect.poll(sent).toMatchObject({ cadence: 'monthly', version: 3 })
})

test('a derived feed has the cadence of its source and is not asked for one', async () => {
  const sent = open('settings', { derivedFrom: 1 })
  await userEvent.type(await screen.findByLabelText('Name'), ' new')
  expect(screen.queryByLabelText('Cadence')).toBeNull()
  await userEvent.click(screen.getByRole('button', { name: 'Save the settings' }))
  await expect.poll(sent).toMatchObject({ name: 'Chlorophyll, daily new' })
  expect(sent()).not.toHaveProperty('cadence')
})

test('the valid range of a feed is changed, an end of it left open', async () => {
  const sent = open('quality')
  const from = await screen.findByLabelText('Valid from')
  expect(from).toHaveValue('0.001')
  await userEvent.clear(from)
  await userEvent.clear(screen.getByLabelText('Valid to'))
  await userEvent.type(screen.getByLabelText('Valid to'), '12.5')
  await userEvent.click(screen.getByRole('button', { name: 'Save, and read the history anew' }))
  await expect.poll(sent).toMatchObject({ validMin: null, validMax: 12.5, version: 3 })
})

test('a valid range turned round is told in words and nothing is sent', async () => {
  const sent = open('quality')
  const to = await screen.findByLabelText('Valid to')
  await userEvent.clear(to)
  await userEvent.type(to, '0.0001')
  await userEvent.click(screen.getByRole('button', { name: 'Save, and read the history anew' }))
  expect(await screen.findByText('The valid range ends before it begins.')).toBeVisible()
  expect(sent()).toBeUndefined()
})
