import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test, vi } from 'vitest'
import type { Me } from '../../../shared/schemas/auth'
import { endpoints } from '../../../shared/schemas/endpoints'
import type { ImportReply } from '../../../shared/schemas/outlines'
import type { Region } from '../../../shared/schemas/regions'
import { OutlineHolds } from '../../../src/components/region-form/outline-holds'
import { Component as EditRegion } from '../../../src/pages/edit-region'
import { Component as ImportRegions } from '../../../src/pages/import-regions'
import { fakeServer, reply } from '../support/fake-server'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

// The maps need a real browser; journeys see them.
vi.mock('../../../src/components/outline/draw-map', () => ({ default: () => null }))
vi.mock('../../../src/pages/import-regions/found-map', () => ({ default: () => null }))

const analyst: Me = { ...officer, id: 2, name: 'Ana Quill', roles: ['analyst'] }
const geometry = { type: 'Polygon' as const, coordinates: [[[-11, 51], [-10, 51], [-10, 52], [-11, 51]]] }
const region: Region = {
  id: 3, name: 'Tarrow Bay', timeZone: 'UTC', site: null, contacts: [], shoreBufferKm: 0, opticallyComplex: false, geometry, geometryVersion: 1, areaKm2: 3900,
  createdAt: '2026-06-01T00:00:00Z', createdBy: 'Ana Quill', retired: false, version: 4, repairs: [],
  standing: {
    state: 'unusual', because: 'Its newest usable views meet the rule.', feedId: 1, ruleId: 1, unit: 'mg m-3', severity: 'Severe', alertId: 41, view: null, seen: [],
    coverageFloor: 0.25, progress: null,
  },
}
const nothing = { items: [], nextCursor: null }

test('while drawing, each feed says its whole cells, feeds on one grid share a row, and too few are said to be too few', () => {
  const count = { exact: true, cells: 40, wholeCells: 22, waterAreaKm2: 300, nearLandShare: 0.12 }
  render(
    <OutlineHolds
      feeds={[
        { feedId: 1, name: 'Chlorophyll 4 km', ...count },
        { feedId: 2, name: 'Rrs 443', ...count },
        { feedId: 3, name: 'Chlorophyll 25 km', exact: true, cells: 6, wholeCells: 2, waterAreaKm2: 290, nearLandShare: 0.9 },
      ]}
    />,
  )
  const [, fine, coarse, ...others] = screen.getAllByRole('row')
  expect(others).toEqual([])
  expect(fine).toHaveTextContent('Chlorophyll 4 kmthe same in Rrs 4432212 %')
  expect(coarse).toHaveTextContent('Fewer than 5: Offing will show the single cells, no percentiles, and raise nothing by itself.')
})

test('a file of areas is read without saving; those ticked are saved under the names typed, and refusals say why', async () => {
  const found = { geometry, areaKm2: 3900, repairs: ['Repeated points were left out.'], marks: [] }
  const read: ImportReply = {
    format: 'KML', fileName: 'bays.kml', notes: ['Links to other files in it were not followed.'],
    items: [
      { name: 'One', found, refusal: null, regionId: null },
      { name: 'Two', found, refusal: null, regionId: null },
      { name: 'Bow', found: null, refusal: { sentence: 'The outline crosses itself near 51.000 N, 10.000 W.', place: null, reason: null }, regionId: null },
    ],
  }
  const asked = fakeServer({ 'POST /regions/import': () => reply(endpoints.importRegions, read), 'POST /regions': () => reply(endpoints.createRegion, { ...region, id: 9 }) })
  show(<ImportRegions />, { me: analyst })
  await userEvent.upload(screen.getByLabelText('File of outlines'), new File(['<kml/>'], 'bays.kml'))
  expect(await screen.findByText('The outline crosses itself near 51.000 N, 10.000 W.')).toBeVisible()
  expect(screen.getByText('Links to other files in it were not followed.')).toBeVisible()
  expect(screen.getAllByText(/Put right: Repeated points were left out\./)).toHaveLength(2)
  expect(asked.filter((one) => one.path === '/regions')).toEqual([])
  await userEvent.click(screen.getByRole('checkbox', { name: 'Save Two' }))
  await userEvent.clear(screen.getByLabelText('Name of area 1'))
  await userEvent.type(screen.getByLabelText('Name of area 1'), 'Inner Bay')
  await userEvent.click(screen.getByRole('button', { name: 'Save 1 region' }))
  expect(await screen.findByRole('link', { name: 'Inner Bay' })).toHaveAttribute('href', '/regions/9')
  const saved = asked.filter((one) => one.path === '/regions').map((one) => one.body)
  expect(saved).toEqual([expect.objectContaining({ name: 'Inner Bay', geometry, inland: false })])
})

test('redrawing while an event is running asks first, and goes on only when told to', async () => {
  let answers = 0
  const asked = fakeServer({
    'GET /regions/3': () => reply(endpoints.region, region),
    'GET /regions': () => reply(endpoints.listRegions, { items: [region], nextCursor: null }),
    'GET /feeds': () => reply(endpoints.listFeeds, nothing),
    'GET /layers': () => reply(endpoints.listLayers, nothing),
    'POST /regions/measure': () => reply(endpoints.measureOutline, { outline: { geometry, areaKm2: 3900, repairs: [], marks: [] }, refusal: null, feeds: [] }),
    'PATCH /regions/3': () => {
      answers += 1
      if (answers > 1) return reply(endpoints.changeRegion, { ...region, version: 5 })
      const error = { code: 'event-running', message: 'An event has been running.', details: { since: '2026-06-10', severity: 'Severe', eventIds: [1], alertIds: [41] } }
      return new Response(JSON.stringify({ error }), { status: 409, headers: { 'content-type': 'application/json' } })
    },
  })
  show(<EditRegion />, { me: analyst, at: '/regions/3/edit', pattern: '/regions/:id/edit', others: [{ path: '/regions/:id', element: <p>the region</p> }] })
  const buffer = await screen.findByLabelText('Shore buffer, km')
  await userEvent.clear(buffer)
  await userEvent.type(buffer, '2.5')
  await userEvent.click(screen.getByRole('button', { name: 'Save the changes' }))
  const dialog = await screen.findByRole('dialog', { name: 'An event is running over this outline.' })
  expect(dialog).toHaveTextContent('Severe, first flagged 10 Jun 2026.')
  expect(dialog).toHaveTextContent('Alert 41 stays open and says so.')
  expect(screen.queryByText(/Somebody else changed this region/)).toBeNull()
  await userEvent.click(within(dialog).getByRole('button', { name: 'Redraw as version 2' }))
  expect(await screen.findByText('the region')).toBeVisible()
  expect(asked.filter((one) => one.method === 'PATCH').map((one) => one.body)).toEqual([
    expect.not.objectContaining({ confirm: true }),
    expect.objectContaining({ confirm: true, shoreBufferKm: 2.5, version: 4 }),
  ])
})
