import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test } from 'vitest'
import type { Me } from '../../../shared/schemas/auth'
import { endpoints } from '../../../shared/schemas/endpoints'
import { feedFields, type Feed } from '../../../shared/schemas/feeds'
import { DeriveFeed } from '../../../src/pages/feed/derive-feed'
import { fakeServer, reply } from '../support/fake-server'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

const analyst: Me = { ...officer, id: 2, name: 'Ana Quill', roles: ['analyst'] }
const facts = {
  derivedFrom: null, derivedSources: [], formula: null, formulaVersion: null, retired: false, createdAt: '2026-06-11T03:00:00Z', version: 1,
  layers: 0, oldestLayerAt: null, newestLayerAt: null, newestAgeHours: null, silent: false,
}
const band: Feed = { ...feedFields.parse({ name: 'Reflectance 443', quantity: 'reflectance', variable: 'Rrs_443', unit: 'sr-1', scale: 'linear' }), ...facts, id: 7 }

test('a formula says its bands and how sure it is, and its feed is made from this one', async () => {
  const made: Feed = { ...feedFields.parse({ name: 'Bright', quantity: 'other', variable: 'bright_water', unit: '1', scale: 'linear' }), ...facts, id: 8, derivedFrom: 7 }
  const asked = fakeServer({ 'POST /feeds': () => reply(endpoints.createFeed, made) })
  show(<DeriveFeed feed={band} />, { me: analyst, at: '/feeds/7', pattern: '/feeds/:id' })
  await userEvent.selectOptions(await screen.findByLabelText('Formula'), 'Bright-water (coccolith) screen, version 1')
  expect(screen.getByText(/From reflectance at 443, 510, 555 nm. Coefficients from memory/)).toBeVisible()
  await userEvent.click(screen.getByRole('button', { name: 'Make the feed' }))
  await expect
    .poll(() => asked.find((one) => one.method === 'POST')?.body)
    .toEqual({ name: 'Bright-water (coccolith) screen, version 1', derivedFrom: 7, formula: 'bright-water', formulaVersion: '1' })
  expect(await screen.findByRole('link', { name: 'Bright' })).toBeVisible()
})
