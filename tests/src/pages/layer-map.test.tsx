import { fireEvent, render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useLocation } from 'react-router-dom'
import { describe, expect, test, vi } from 'vitest'
import { colouringOf, ticksOf } from '../../../shared/colouring'
import { endpoints } from '../../../shared/schemas/endpoints'
import type { Feed } from '../../../shared/schemas/feeds'
import type { FeedDays, Layer, LayerPoint, UsualHere } from '../../../shared/schemas/layers'
import { tilesOfView } from '../../../src/components/map/tile-address'
import { withRoom } from '../../../src/components/map/legend-scale'
import { missingWords } from '../../../src/components/map/legend-words'
import { Component as LayerMap } from '../../../src/pages/layer-map'
import { CellReadout } from '../../../src/pages/layer-map/cell-readout'
import { DaySlider } from '../../../src/pages/layer-map/day-slider'
import { mapLink, readAddress } from '../../../src/pages/layer-map/map-address'
import { dayByKey, daysAround } from '../../../src/pages/layer-map/slider-days'
import { fakeServer, reply } from '../support/fake-server'
import { officer } from '../support/fixtures'
import { show } from '../support/show'

vi.mock('../../../src/pages/layer-map/layer-sea', () => ({
  default: ({ layerId, next, onPick }: { layerId: number | null; next: number[]; onPick: (at: { latitude: number; longitude: number }) => void }) => (
    <button type="button" onClick={() => onPick({ latitude: 51.5, longitude: -10.25 })}>
      map of {layerId ?? 'nothing'}, next {next.join(' and ')}
    </button>
  ),
}))

const feedFields = {
  quantity: 'chlorophyll', variable: 'chlor_a', unit: 'mg m-3', scale: 'log10', cadence: 'daily', stage: 'near-real-time', processingVersion: 'R1',
  validMin: null, validMax: null, fileNamePattern: null, freshnessLimitHours: 72, silentAfterHours: 72, hiddenFlags: [], flagMeanings: [],
  gapFilled: false, storedLog10: false, fileUnit: null, derivedFrom: null, derivedSources: [], formula: null, formulaVersion: null, retired: false,
  createdAt: '2026-01-01T00:00:00Z', version: 1, layers: 4, newestAgeHours: 3, silent: false,
} satisfies Partial<Feed>

const aFeed = (id: number, name: string, oldest: string | null, newest: string | null): Feed => ({
  ...feedFields, id, name, oldestLayerAt: oldest && `${oldest}T13:12:00Z`, newestLayerAt: newest && `${newest}T13:12:00Z`,
})

const dayLayer = (id: number, day: string) => ({ id, observedAt: `${day}T13:12:00Z`, endsAt: null, hasClock: true, suspect: false })
const days: FeedDays = {
  feedId: 1, first: '2024-05-20', last: '2026-06-10',
  days: ['2026-05-20', '2026-06-02', '2026-06-08', '2026-06-10'].map((day, i) => ({ day, layers: [dayLayer(11 + i, day)] })),
}

const aLayer = (id: number, change: Partial<Layer> = {}): Layer => ({
  id, feedId: 1, fileId: 9, fileName: 'chl_20260610.nc', checksum: '9f2c41d0'.padEnd(64, '0'), variable: 'chlor_a', unit: 'mg m-3', observedAt: '2026-06-10T13:12:00Z',
  endsAt: null, hasClock: true, processingVersion: 'R1', stage: 'near-real-time', receivedAt: '2026-06-10T16:00:00Z', derived: null, suspect: null,
  grid: { kind: 'axes', rows: 80, columns: 100, west: -12.5, south: 50.5, east: -7, north: 53.5 }, ...change,
})

const legendOf = (layerId: number) => ({
  layerId, quantity: 'Chlorophyll', unit: 'mg m-3', period: null, colouring: { ramp: 'sea', scale: 'log', from: 0.03, to: 30, rangeFrom: 'quantity' } as const,
  looked: 'all' as const, cells: 100, valid: 40, hidden: [{ reason: 'CLOUD', cells: 48 }], bins: [40], below: 0, above: 0,
})

const usual: UsualHere = { halfWidthDays: 5, median: 1.2, values: 63, years: 9, yearsWithLayers: 10, cut: false }
const pointOf = (layerId: number, change: Partial<LayerPoint> = {}): LayerPoint => ({
  layerId, latitude: 51.5, longitude: -10.25, row: 30, column: 41, value: 3.6, unit: 'mg m-3', usual: null,
  cell: { latitude: 51.5, longitude: -10.25, corners: [[-10.27, 51.48], [-10.23, 51.48], [-10.23, 51.52], [-10.27, 51.52]] }, ...change,
})

function Address() {
  return <output data-testid="address">{useLocation().search}</output>
}

function showPage(at: string) {
  const asked = fakeServer({
    'GET /feeds': () => reply(endpoints.listFeeds, { items: [aFeed(1, 'Chlorophyll, daily', '2024-05-20', '2026-06-10'), aFeed(2, 'Long record', '2016-01-01', '2026-06-09'), aFeed(3, 'Nothing yet', null, null)], nextCursor: null }),
    'GET /regions': () => reply(endpoints.listRegions, { items: [], nextCursor: null }),
    'GET /feeds/1/days': () => reply(endpoints.feedDays, days),
    'GET /feeds/2/days': () => reply(endpoints.feedDays, { feedId: 2, first: '2016-01-01', last: '2026-06-09', days: [] }),
    ...Object.fromEntries([11, 12, 13, 14].flatMap((id) => [
      [`GET /layers/${id}`, () => reply(endpoints.layer, aLayer(id))],
      [`GET /layers/${id}/legend`, () => reply(endpoints.layerLegend, legendOf(id))],
      [`GET /layers/${id}/point`, ({ path }: { path: string }) => reply(endpoints.layerPoint, pointOf(id, path.includes('usual=true') ? { usual } : {}))],
    ])),
  })
  show(<><LayerMap /><Address /></>, { me: officer, at, pattern: '/layers/map' })
  return asked
}

const slider = () => screen.findByRole('slider', { name: 'Day on the map' })
const address = () => screen.getByTestId('address').textContent

describe('the slider of days', () => {
  test('goes a day by arrow, a week with shift, to the ends of the record by Home and End, and never beyond them', () => {
    const go = (key: string, shift: boolean, day: string) => dayByKey(key, shift, day, '2024-05-20', '2026-06-10')
    expect([go('ArrowLeft', false, '2026-03-01'), go('ArrowRight', false, '2026-02-28'), go('ArrowUp', true, '2026-02-27')]).toEqual(['2026-02-28', '2026-03-01', '2026-03-06'])
    expect([go('ArrowRight', true, '2026-06-08'), go('PageUp', false, '2024-06-01'), go('Home', false, '2026-01-01'), go('End', false, '2026-01-01')]).toEqual(['2026-06-10', '2024-05-20', '2024-05-20', '2026-06-10'])
    expect(go('a', false, '2026-01-01')).toBeUndefined()
  })

  test('shows a month, or the two months a day lies in', () => {
    expect(daysAround('2024-02-29', 1)).toHaveLength(29)
    expect([daysAround('2026-06-10', 2)[0], daysAround('2026-06-10', 2).at(-1)]).toEqual(['2026-05-01', '2026-06-30'])
    expect(daysAround('2026-12-31', 2).at(-1)).toBe('2026-12-31')
  })

  test('says the day and whether it has a layer, and follows keys and pointer', async () => {
    const onChange = vi.fn()
    render(<DaySlider day="2026-06-09" first="2024-05-20" last="2026-06-10" layersOf={new Map(days.days.map((one) => [one.day, one.layers]))} onChange={onChange} />)
    const one = await slider()
    expect(one).toHaveAttribute('aria-valuetext', '9 Jun 2026, no layer')
    one.focus()
    await userEvent.keyboard('{ArrowLeft}{Shift>}{ArrowLeft}{/Shift}{Home}{End}')
    expect(onChange.mock.calls.flat()).toEqual(['2026-06-08', '2026-06-02', '2024-05-20', '2026-06-10'])
    vi.spyOn(one, 'getBoundingClientRect').mockReturnValue({ left: 0, width: 610, top: 0, height: 52, right: 610, bottom: 52, x: 0, y: 0, toJSON: () => '' })
    fireEvent.pointerDown(one, { clientX: 325, buttons: 1 })
    expect(onChange).toHaveBeenLastCalledWith('2026-06-02')
  })
})

describe('the address', () => {
  test('is read back as it was written, and nonsense in it is passed over', () => {
    const whole = { feedId: 3, day: '2026-06-10', layerId: 14, at: { latitude: 51.5, longitude: -190.25 } }
    expect(readAddress(new URLSearchParams(mapLink(whole).split('?')[1]))).toEqual(whole)
    expect(readAddress(new URLSearchParams('feed=x&day=2026-02-30&layer=-1&at=95,3'))).toEqual({ feedId: undefined, day: undefined, layerId: undefined, at: undefined })
    expect(readAddress(new URLSearchParams('at=51,'))).toMatchObject({ at: undefined })
  })

  test('decides feed, day and cell, and keeps them as they are changed', async () => {
    showPage('/layers/map?feed=1&day=2026-06-08&at=51.5,-10.25')
    expect(await screen.findByRole('button', { name: 'map of 13, next 12 and 14' })).toBeInTheDocument()
    expect(await slider()).toHaveAttribute('aria-valuetext', '8 Jun 2026, layer of 13:12 UTC')
    expect(await screen.findByText('3.6')).toBeInTheDocument()
    await userEvent.click(await screen.findByRole('button', { name: 'Layer after' }))
    expect(address()).toBe('?feed=1&day=2026-06-10&at=51.5%2C-10.25')
    await userEvent.selectOptions(screen.getByLabelText('Feed'), 'Long record')
    expect(address()).toBe('?feed=2&day=2026-06-10&at=51.5%2C-10.25')
  })

  test('without a day shows the newest of the first feed that has layers, and keeps the cell that is clicked', async () => {
    showPage('/layers/map')
    await userEvent.click(await screen.findByRole('button', { name: /map of 14/ }))
    expect(address()).toBe('?feed=1&day=2026-06-10&at=51.5%2C-10.25')
    expect(screen.queryByRole('option', { name: 'Nothing yet' })).toBeNull()
  })

  test('of a day without a layer shows none and says so', async () => {
    showPage('/layers/map?feed=1&day=2026-06-05&at=51.5,-10.25')
    expect(await screen.findByRole('button', { name: 'map of nothing, next 12 and 13' })).toBeInTheDocument()
    expect(screen.getByText('There is no layer on this day; the place is kept for the next.')).toBeInTheDocument()
  })
})

describe('a cell', () => {
  const read = (change: Partial<LayerPoint>, usualThere: UsualHere) => {
    fakeServer({
      'GET /layers/14/legend': () => reply(endpoints.layerLegend, legendOf(14)),
      'GET /layers/14/point': ({ path }) => reply(endpoints.layerPoint, pointOf(14, { ...change, usual: path.includes('usual=true') ? usualThere : null })),
    })
    show(<CellReadout layer={aLayer(14)} at={{ latitude: 51.5, longitude: -10.25 }} onForget={() => undefined} />)
  }

  test('is told with value, unit, place, time, file, and what is usual there', async () => {
    read({}, usual)
    expect(await screen.findByText('3.6')).toBeInTheDocument()
    expect(await screen.findByText('3.0 times usual')).toBeInTheDocument()
    expect(screen.getByText('median of 63 values from 9 earlier years, 5 days either side of 10 June')).toBeInTheDocument()
    expect(screen.getByText('51.5000° N, 10.2500° W')).toBeInTheDocument()
    expect(screen.getByText('10 Jun 2026 13:12 UTC')).toBeInTheDocument()
    expect(screen.getByRole('link', { name: 'chl_20260610.nc' })).toHaveAttribute('href', '/layers/files/9')
  })

  test('that is missing is not called zero, and without earlier years nothing is made up', async () => {
    read({ value: null }, { ...usual, median: null, values: 0, years: 0, yearsWithLayers: 0 })
    expect(await screen.findByText('missing')).toBeInTheDocument()
    expect(await screen.findByText('no earlier years')).toBeInTheDocument()
  })
})

test('the tiles fetched ahead are those the map will ask for: wrapped round the globe, none beyond the poles', () => {
  const of = (view: Parameters<typeof tilesOfView>[2]) => tilesOfView(7, 'light', view).map((address) => address.replace('/api/layers/7/tiles/', '').replace('.png?theme=light', ''))
  expect(of({ west: -12.5, east: -7, south: 50.5, north: 53.5, zoom: 7.2 })).toEqual(['7/59/41', '7/59/42', '7/59/43', '7/60/41', '7/60/42', '7/60/43', '7/61/41', '7/61/42', '7/61/43'])
  expect(of({ west: 170, east: 190, south: -5, north: 5, zoom: 3 })).toEqual(['3/7/3', '3/7/4', '3/0/3', '3/0/4'])
  expect(of({ west: -180, east: 180, south: -90, north: 90, zoom: 0 })).toEqual(['0/0/0'])
})

test('figures of a scale keep clear of each other on a phone, and all stand where there is room', () => {
  const ticks = ticksOf(colouringOf({ quantity: 'reflectance', variable: 'Rrs_443', unit: 'sr-1', scale: 'linear', validMin: null, validMax: null })!).filter((tick) => tick.labelled)
  expect(withRoom(ticks, 520).map((tick) => tick.at)).toEqual([0.0001, 0.0003, 0.001, 0.003, 0.01, 0.03])
  expect(withRoom(ticks, 300).map((tick) => tick.at)).toEqual([0.0001, 0.001, 0.003, 0.03])
})

test('the legend says why cells are missing as far as the file does', () => {
  const legend = legendOf(1)
  expect(missingWords(legend)).toBe('60 % of cells: CLOUD 48 %; 12 % or more without a value in the file')
  expect(missingWords({ ...legend, hidden: [] })).toBe('60 % of cells, land among them; the file says no more')
  expect(missingWords({ ...legend, valid: 100 })).toBe('no cell')
})
