import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test } from 'vitest'
import type { Me } from '../../../shared/schemas/auth'
import { endpoints } from '../../../shared/schemas/endpoints'
import { feedFields, type Feed } from '../../../shared/schemas/feeds'
import { Component as FilePage } from '../../../src/pages/file'
import { fakeServer, reply } from '../support/fake-server'
import { aWaitingFile } from '../support/file-fixtures'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

const analyst: Me = { ...officer, id: 2, name: 'Ana Quill', roles: ['analyst'] }
const waiting = aWaitingFile()

function open(me: Me, file = waiting) {
  const asked = fakeServer({
    'GET /files/9': () => reply(endpoints.file, file),
    'GET /feeds': () => reply(endpoints.listFeeds, { items: [], nextCursor: null }),
    'POST /feeds': ({ body }) => {
      const feed: Feed = {
        ...feedFields.parse(body), id: 4, derivedFrom: null, derivedSources: [], formula: null, formulaVersion: null, retired: false,
        createdAt: '2026-06-11T03:00:00Z', version: 1, layers: 0, oldestLayerAt: null, newestLayerAt: null, newestAgeHours: null, silent: false,
      }
      return reply(endpoints.createFeed, feed)
    },
  })
  show(<FilePage />, { me, at: '/layers/files/9', pattern: '/layers/files/:id' })
  return asked
}

test('a waiting file says what was understood and asks only for what it cannot know', async () => {
  open(analyst)
  expect(await screen.findByRole('heading', { name: 'This file fits no feed yet.' })).toBeVisible()
  expect(screen.getByRole('row', { name: /Variable chl read/ })).toBeVisible()
  expect(screen.getAllByText('please say')).toHaveLength(8)
})

test('confirming sends the proposal as it stands, with the answers and the file', async () => {
  const asked = open(analyst)
  const name = await screen.findByLabelText('Name of the feed')
  await userEvent.clear(name)
  await userEvent.type(name, 'West, daily')
  await userEvent.selectOptions(screen.getByLabelText('Stage'), 'reprocessed')
  await userEvent.click(screen.getByRole('button', { name: /Confirm the feed, read 12 layers/ }))
  await expect.poll(() => asked.find((one) => one.method === 'POST')?.body).toEqual({ ...waiting.proposal, name: 'West, daily', stage: 'reprocessed', fileId: 9 })
})

test('the valid range, the cadence and that numbers are logarithms are told while confirming', async () => {
  const asked = open(analyst)
  const from = await screen.findByLabelText('Valid from')
  expect(from).toHaveValue('0.001')
  await userEvent.clear(from)
  await userEvent.clear(screen.getByLabelText('Valid to'))
  await userEvent.type(screen.getByLabelText('Valid to'), '1.5')
  await userEvent.selectOptions(screen.getByLabelText('Cadence'), '8-day')
  await userEvent.click(screen.getByRole('checkbox', { name: 'base-10 logarithms' }))
  await userEvent.click(screen.getByRole('button', { name: /Confirm the feed/ }))
  // An 8-day feed is silent after as long as one that is proposed so.
  await expect.poll(() => asked.find((one) => one.method === 'POST')?.body).toMatchObject({ validMin: null, validMax: 1.5, cadence: '8-day', silentAfterHours: 480, storedLog10: true })
})

test('a valid range that is turned round or no number is told in words and nothing is sent', async () => {
  const asked = open(analyst)
  const to = await screen.findByLabelText('Valid to')
  for (const [typed, sentence] of [['0.0001', 'The valid range ends before it begins.'], ['some', 'Give a number, or leave it empty.']] as const) {
    await userEvent.clear(to)
    await userEvent.type(to, typed)
    await userEvent.click(screen.getByRole('button', { name: /Confirm the feed/ }))
    expect(await screen.findByText(sentence)).toBeVisible()
  }
  expect(asked.some((one) => one.method === 'POST')).toBe(false)
})

test('what the file itself calls a logarithm is not asked for', async () => {
  const [variable] = waiting.report!.variables
  const report = { ...waiting.report!, variables: [{ ...variable!, conversion: 'stored as base-10 logarithm, of mg m-3' }] }
  const asked = open(analyst, { ...waiting, report, proposal: { ...waiting.proposal!, storedLog10: true } })
  expect(await screen.findByRole('row', { name: /Unit .* worked out stored as base-10 logarithm/ })).toBeVisible()
  expect(screen.queryByRole('checkbox', { name: 'base-10 logarithms' })).toBeNull()
  await userEvent.click(screen.getByRole('button', { name: /Confirm the feed/ }))
  await expect.poll(() => asked.find((one) => one.method === 'POST')?.body).toMatchObject({ storedLog10: true })
})

test('of a file that names no unit the page says that confirming says it', async () => {
  const [variable] = waiting.report!.variables
  open(analyst, { ...waiting, report: { ...waiting.report!, variables: [{ ...variable!, unit: null, fileUnit: null }] } })
  expect(await screen.findByText(/The file names none: what is confirmed here says it, for later files too/)).toBeVisible()
})

test('an empty name is asked for in words and nothing is sent', async () => {
  const asked = open(analyst)
  await userEvent.clear(await screen.findByLabelText('Name of the feed'))
  await userEvent.click(screen.getByRole('button', { name: /Confirm the feed/ }))
  expect(await screen.findByText('The feed needs a name.')).toBeVisible()
  expect(asked.some((one) => one.method === 'POST')).toBe(false)
})

test('who may not confirm a feed is told who can', async () => {
  open(officer)
  expect(await screen.findByText('An analyst has to confirm the feed.')).toBeVisible()
  expect(screen.queryByRole('button', { name: /Confirm/ })).toBeNull()
})

test('flags found in the file are shown, those that usually hide a cell ticked, and what is ticked is sent', async () => {
  const proposal = { ...waiting.proposal!, flagMeanings: ['LAND', 'CLDICE', 'COCCOLITH'], hiddenFlags: ['LAND', 'CLDICE'] }
  const asked = open(analyst, { ...waiting, proposal })
  expect(await screen.findByRole('checkbox', { name: 'CLDICE' })).toBeChecked()
  expect(screen.getByRole('checkbox', { name: 'COCCOLITH' })).not.toBeChecked()
  await userEvent.click(screen.getByRole('checkbox', { name: 'LAND' }))
  await userEvent.click(screen.getByRole('button', { name: /Confirm the feed/ }))
  await expect.poll(() => asked.find((one) => one.method === 'POST')?.body).toMatchObject({ hiddenFlags: ['CLDICE'] })
})
