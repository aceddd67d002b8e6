import { screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test, vi } from 'vitest'
import type { Me } from '../../../shared/schemas/auth'
import { endpoints } from '../../../shared/schemas/endpoints'
import type { FeedMasks, GridMasks, MaskChange, MaskMaking, WaterMaskShown } from '../../../shared/schemas/masks'
import { MaskPart } from '../../../src/pages/feed/mask-part'
import { fakeServer, refusal, reply } from '../support/fake-server'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

vi.mock('../../../src/pages/feed/mask-map', () => ({
  default: ({ mask }: { mask: WaterMaskShown }) => <p>map of version {mask.version}</p>,
}))

const analyst: Me = { ...officer, id: 3, roles: ['analyst'] }
const admin: Me = { ...officer, id: 2, roles: ['admin'] }
const feed = { id: 4, name: 'West, daily', retired: false }

const outline: WaterMaskShown = {
  id: 1, version: 1, kind: 'land outline', inForce: true, from: null, to: null, minShare: null, layers: null, waterCells: null, gained: null, lost: null, note: '',
  checksum: 'world-atlas-2.0.2/land-50m', madeBy: null, madeAt: '2026-01-01T00:00:00Z', inForceBy: null, inForceSince: null,
}
const byShare: WaterMaskShown = {
  ...outline, id: 9, version: 2, kind: 'valid share', inForce: false, from: '2017-01-01', to: '2025-12-31', minShare: 0.05, layers: 3287, waterCells: 6000, gained: 140, lost: 25,
  checksum: 'ab'.repeat(32), madeBy: 'Ana Reed', madeAt: '2026-06-11T12:00:00Z',
}
const grid: GridMasks = {
  gridId: 7, rows: 80, columns: 100, west: -12.5, south: 50.5, east: -7, north: 53.5, layers: 3650, oldest: '2016-06-12', newest: '2026-06-10',
  fullYears: { from: '2017-01-01', to: '2025-12-31' }, own: null, watchedOnly: false, masks: [outline], making: null,
}
const making: MaskMaking = {
  kind: 'valid share', from: '2017-01-01', to: '2025-12-31', layers: 3287, by: 'Ana Reed', askedAt: '2026-06-11T12:00:00Z',
  job: { id: 12, state: 'running', done: 620, total: 3287, lastError: null }, outcome: null, version: null,
}
const masks = (change: Partial<GridMasks> = {}): FeedMasks => ({ feedId: 4, items: [{ ...grid, ...change }], nextCursor: null, remaking: null })
const change: MaskChange = {
  maskId: 9, insteadOf: 1, regions: [{ id: 2, name: 'Tarrow Bay', waterKm2Now: 120.4, waterKm2Then: 134.2, allThen: false }, { id: 3, name: 'Inner Loch', waterKm2Now: 4, waterKm2Then: 9, allThen: true }], regionsInAll: 12, views: 40210, runningEvents: 2, openAlerts: 1, freshnessLimitHours: 72,
}

function open(me: Me, shown: FeedMasks, answers: Parameters<typeof fakeServer>[0] = {}) {
  const asked = fakeServer({ 'GET /feeds/4/masks': () => reply(endpoints.feedMasks, shown), ...answers })
  const client = show(<MaskPart feed={feed} />, { me })
  return Object.assign(asked, { client })
}

test('who may only read sees which mask is in force and what it means, and can look at the others', async () => {
  open(officer, masks({ masks: [byShare, outline] }))
  expect(await screen.findByText('cells whose centre is water in the 1:50 million land outline that comes with Offing')).toBeVisible()
  expect(await screen.findByText('map of version 1')).toBeVisible()
  expect(screen.queryByRole('button', { name: /force|Make/ })).toBeNull()
  await userEvent.click(screen.getByRole('button', { name: 'Show Valid share, version 2' }))
  expect(await screen.findByText('map of version 2')).toBeVisible()
  expect(screen.getByText('Shown, not in force')).toBeVisible()
  expect(screen.getByText('cells valid in at least 5 % of the layers')).toBeVisible()
  const against = screen.getByText('Against the outline').nextElementSibling
  expect(against).toHaveTextContent('140 cells more water, 25 less')
  expect(screen.getByText('11 Jun 2026 for Ana Reed')).toBeVisible()
})

test('an analyst asks for a mask of the full years; it says how far it is and cannot be asked for twice', async () => {
  const asked = open(analyst, masks(), { 'POST /feeds/4/masks': () => reply(endpoints.makeMask, masks({ making })) })
  await userEvent.click(await screen.findByRole('button', { name: 'Make a mask…' }))
  expect(screen.getByLabelText('From')).toHaveValue('2017-01-01')
  expect(screen.getByLabelText('To')).toHaveValue('2025-12-31')
  expect(screen.getByText('The files carry no land flag and no land or sea mask that Offing understands.')).toBeVisible()
  const share = screen.getByLabelText('Valid in at least, % of the layers')
  await userEvent.clear(share)
  await userEvent.type(share, '10')
  await userEvent.click(screen.getByRole('button', { name: 'Make the mask' }))
  expect(await screen.findByRole('progressbar', { name: 'Making a mask' })).toHaveAttribute('aria-valuenow', '620')
  expect(asked.find((one) => one.method === 'POST')?.body).toEqual({ gridId: 7, kind: 'valid share', from: '2017-01-01', to: '2025-12-31', minShare: 0.1 })
  expect(screen.getByRole('button', { name: 'Make a mask…' })).toBeDisabled()
})

test('where the files say what is land, that can be taken, without a share', async () => {
  const asked = open(analyst, masks({ own: 'the flag LAND of quality' }), { 'POST /feeds/4/masks': () => reply(endpoints.makeMask, masks({ making })) })
  await userEvent.click(await screen.findByRole('button', { name: 'Make a mask…' }))
  await userEvent.selectOptions(screen.getByLabelText('A cell is water where'), 'the files do not mark land')
  expect(screen.getByText('The files say what is land: the flag LAND of quality.')).toBeVisible()
  expect(screen.queryByLabelText('Valid in at least, % of the layers')).toBeNull()
  await userEvent.click(screen.getByRole('button', { name: 'Make the mask' }))
  await expect.poll(() => asked.find((one) => one.method === 'POST')?.body).toEqual({ gridId: 7, kind: 'own', from: '2017-01-01', to: '2025-12-31' })
})

test('what the server says of a period stands at its field, and the form stays', async () => {
  const sentence = 'No trusted layer of West, daily lies between 2001-01-01 and 2001-12-31.'
  open(analyst, masks(), {
    'POST /feeds/4/masks': () => new Response(JSON.stringify({ error: { code: 'not-valid', message: sentence, details: { fields: { from: sentence } } } }), { status: 422 }),
  })
  await userEvent.click(await screen.findByRole('button', { name: 'Make a mask…' }))
  await userEvent.click(screen.getByRole('button', { name: 'Make the mask' }))
  expect(await screen.findByText(sentence)).toBeVisible()
  expect(screen.getByLabelText('From')).toHaveAccessibleDescription(sentence)
})

test.each([
  [{ ...making, outcome: 'same' as const, version: 2 }, 'Made again from 3 287 layers of 1 Jan 2017 to 31 Dec 2025: the same as version 2, so there is no new version.'],
  [{ ...making, job: { ...making.job!, state: 'cancelled' as const } }, 'The last mask asked for was not made: its job was cancelled. Nothing changed.'],
  [{ ...making, job: { ...making.job!, state: 'failed' as const, lastError: 'The file is damaged.' } }, 'The last mask was not made: The file is damaged. Nothing changed.'],
])('what came of the last one is told', async (last, sentence) => {
  open(officer, masks({ making: last }))
  expect((await screen.findByText((text) => text.replaceAll('\u202f', ' ').includes(sentence))).closest('[role]')).toBeVisible()
})

test('an admin reads what it will change before a mask goes into force, and then sees it in force', async () => {
  const after = { ...masks({ masks: [{ ...byShare, inForce: true, inForceBy: 'Ines Marrow', inForceSince: '2026-06-11T13:00:00Z' }, { ...outline, inForce: false }] }), remaking: { state: 'running' as const, done: 62, total: 3653 } }
  const asked = open(admin, masks({ masks: [byShare, outline] }), {
    'GET /masks/9/change': () => reply(endpoints.maskChange, change),
    'POST /masks/9/in-force': () => reply(endpoints.putMaskInForce, after),
  })
  await userEvent.click(await screen.findByRole('button', { name: 'Put Valid share, version 2 in force…' }))
  const dialog = within(await screen.findByRole('dialog'))
  expect(await dialog.findByText(/40 210 views of 12 regions are made anew, newest first, and every region is judged again\./)).toBeVisible()
  expect(dialog.getByText(/2 running events and 1 open alert of this feed may change, end or go\./)).toBeVisible()
  expect(dialog.getByText('Views older than 72 h raise no letters.')).toBeVisible()
  expect(dialog.getByText('Tarrow Bay').nextElementSibling).toHaveTextContent('120 → 134 km²')
  expect(dialog.getByText('no water by it: every cell counts').parentElement).toHaveTextContent('Inner Loch')
  expect(dialog.getByText('Land outline, version 1 stays and can be put in force again.')).toBeVisible()
  await userEvent.click(dialog.getByRole('button', { name: 'Put it in force' }))
  expect(await screen.findByText('11 Jun 2026, by Ines Marrow')).toBeVisible()
  expect(screen.getByRole('progressbar', { name: 'Making the history anew' })).toHaveAttribute('aria-valuenow', '62')
  expect(asked.find((one) => one.method === 'POST')?.body).toEqual({ insteadOf: 1 })
  expect(screen.queryByRole('dialog')).toBeNull()
  expect(screen.getByRole('button', { name: 'Put Land outline, version 1 in force…' })).toHaveTextContent('Go back to it…')
})

test('a history that was not made anew to its end says that nothing is judged, and who goes on', async () => {
  open(officer, { ...masks(), remaking: { state: 'failed' as const, done: 62, total: 3653 } })
  expect(await screen.findByRole('progressbar', { name: 'Making the history anew, failed' })).toHaveAttribute('aria-valuenow', '62')
  expect(screen.getByText(/its regions are not judged, and no alert is raised from this feed\. An admin goes on with it among the jobs\./)).toBeVisible()
})

test('who decided by an old sight of it is told, and nothing is closed', async () => {
  open(admin, masks({ masks: [byShare, outline] }), {
    'GET /masks/9/change': () => reply(endpoints.maskChange, { ...change, regions: [], runningEvents: 0, openAlerts: 0 }),
    'POST /masks/9/in-force': () => refusal(409, 'stale-version', 'Somebody else put another water mask in force meanwhile. Look at it again.'),
  })
  await userEvent.click(await screen.findByRole('button', { name: 'Put Valid share, version 2 in force…' }))
  const dialog = within(await screen.findByRole('dialog'))
  expect(await dialog.findByText('No region has other water by it than now.')).toBeVisible()
  expect(dialog.getByText(/No event is running and no alert is open\./)).toBeVisible()
  await userEvent.click(dialog.getByRole('button', { name: 'Put it in force' }))
  expect(await dialog.findByText('Somebody else put another water mask in force meanwhile. Look at it again.')).toBeVisible()
})

test('a feed without a layer has no part about masks', async () => {
  const asked = open(admin, { feedId: 4, items: [], nextCursor: null, remaking: null })
  await expect.poll(() => asked.length).toBe(1)
  await expect.poll(() => screen.queryByRole('heading', { name: 'Water mask' })).toBeNull()
})
