import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, test, vi } from 'vitest'
import { endpoints } from '../../../shared/schemas/endpoints'
import type { Patch, PatchChange, RegionPatches, RegionView } from '../../../shared/schemas/patches'
import type { Region } from '../../../shared/schemas/regions'
import { AreaByValue } from '../../../src/components/view/area-by-value'
import { PatchList } from '../../../src/components/view/patch-list'
import { beforeWords, changeWords, peakWords, whereWords } from '../../../src/components/view/patch-words'
import { valueAxis } from '../../../src/components/view/value-axis'
import { ViewFigures } from '../../../src/components/view/view-figures'
import { Where } from '../../../src/pages/alert/where'
import { ViewPart } from '../../../src/pages/region/view-part'
import { fakeServer, reply } from '../support/fake-server'
import { anAlert, officer } from '../support/fixtures'
import { show } from '../support/show'

vi.mock('../../../src/pages/region/view-map', () => ({
  default: ({ found, marked }: { found: RegionPatches; marked: number }) => <p>map of layers {found.view!.layerIds.join(' and ')}, {found.patches.length} outlines, {marked} marked</p>,
}))
vi.mock('../../../src/pages/alert/map-piece', () => ({
  default: ({ layerId, found, marked }: { layerId: number; found: RegionPatches | undefined; marked: number }) => <p>map of layer {layerId}, {found?.patches.length ?? 'no'} outlines, {marked} marked</p>,
}))

const aChange = (change: Partial<PatchChange> = {}): PatchChange => ({ kind: 'grown', together: [1], beforeKm2: 10, changeKm2: 11.4, moved: { km: 3.12, bearing: 46 }, ...change })

const aPatch = (number: number, change: Partial<Patch> = {}): Patch => ({
  number, areaKm2: 21.4, atLeast: false, touchesEdge: false, touchesUnseen: false, cells: 3, greatest: 6.44, peak: { latitude: 51.2, longitude: -10.35 },
  centre: { latitude: 51.2, longitude: -10.35 }, nearest: { km: 6.21, bearing: 44 }, peakAway: { km: 9.13, bearing: 70 }, change: aChange(),
  outline: { type: 'MultiLineString', coordinates: [[[-10.4, 51.1], [-10.3, 51.1], [-10.3, 51.2], [-10.4, 51.1]]] }, ...change,
})

const aFinding = (change: Partial<RegionPatches> = {}): RegionPatches => ({
  regionId: 3, feedId: 1, unit: 'mg m-3', level: { level: 1, from: 'rule', why: '1 mg m⁻³, the floor of the rule in force here (Bloom, version 2).' }, answer: 'patches',
  sentence: '2 patches at or above 1 in the 71 % of the water that was seen, 25.4 km² together.', view: { day: '2026-06-10', observedAt: '2026-06-10T13:04:00Z', layerIds: [7], coverage: 0.71 },
  before: { day: '2026-06-08', coverage: 0.9, areaAboveKm2: 12 }, areaAboveKm2: 25.4,
  patches: [aPatch(1), aPatch(2, { areaKm2: 4, atLeast: true, change: aChange({ kind: 'new', together: [2], beforeKm2: 0, changeKm2: 4, moved: null }) })],
  others: { patches: 0, cells: 0, areaKm2: 0 }, gone: [{ kind: 'gone', areaKm2: 2, greatest: 1.4, peak: { latitude: 51, longitude: -10 } }], ...change,
})

const aView = (change: Partial<NonNullable<RegionView['view']>> = {}): RegionView => ({
  regionId: 3, feedId: 1, unit: 'mg m-3', scale: 'log10', level: aFinding().level, first: '2016-01-01', last: '2026-06-10', previous: '2026-06-08', next: null,
  view: {
    day: '2026-06-10', observedAt: '2026-06-10T13:04:00Z', endsAt: null, layerIds: [7], coverage: 0.71, waterAreaKm2: 500, validAreaKm2: 355, cells: 440, valid: 312,
    mean: 0.6, geometricMean: 0.5, median: 0.4, p10: 0.2, p90: 0.9, max: { value: 6.44, latitude: 51.2, longitude: -10.35, away: { km: 9.13, bearing: 70 } },
    histogram: [{ from: null, to: 0.001, areaKm2: 1 }, { from: 0.398, to: 0.447, areaKm2: 320 }, { from: 0.447, to: 0.501, areaKm2: 0 }, { from: 6.31, to: 7.08, areaKm2: 25.4 }],
    areaAboveKm2: 25.4, masked: [{ reason: 'CLOUD', areaKm2: 140, share: 0.28 }, { reason: 'GLINT', areaKm2: 2, share: 0.004 }], ...change,
  },
})

describe('a patch in words', () => {
  test('says where it begins and where its greatest value is, from the site or as a place', () => {
    const at = aPatch(1)
    expect([whereWords(at), peakWords(at)]).toEqual(['6.2 km NE', 'greatest 9.1 km ENE'])
    expect([whereWords({ ...at, nearest: { km: 0, bearing: null } }), peakWords({ ...at, nearest: at.peakAway })]).toEqual(['at the site', undefined])
    expect([whereWords({ ...at, nearest: null, peakAway: null }), peakWords({ ...at, nearest: null, peakAway: null })]).toEqual(['51°12′N 10°21′W', undefined])
  })

  test('says what became of it', () => {
    expect(changeWords(aChange())).toBe('grown by 11.4 km², moved 3.1 km NE')
    expect(changeWords(aChange({ kind: 'shrunk', changeKm2: -2, moved: { km: 0.4, bearing: 3 } }))).toBe('shrunk by 2 km²')
    expect(changeWords(aChange({ kind: 'parted', changeKm2: -2, together: [1, 3], moved: null }))).toBe('parted (1, 3 together), 2 km² less')
    expect([changeWords(aChange({ kind: 'new' })), changeWords(aChange({ kind: 'not seen before' })), changeWords(null)]).toEqual(['new', 'not seen before', ''])
    expect(beforeWords(aFinding())).toBe('Changes are since the view of 8 Jun 2026, which saw 90 % of the water. Together 12 km² then, 25.4 km² now. 1 patch of then is gone (2 km²).')
    expect(beforeWords(aFinding({ before: null }))).toBeUndefined()
    const lost = aFinding().gone.map((one) => ({ ...one, kind: 'not seen now' as const }))
    expect(beforeWords(aFinding({ answer: 'nothing seen', patches: [], areaAboveKm2: 0, gone: lost }))).toBe('The usable view before is of 8 Jun 2026, which saw 90 % of the water. 12 km² at or above the level then. 1 patch of then is not seen now (2 km²).')
  })
})

describe('the list of patches', () => {
  test('has every patch with its figures and says which level it is and why; a patch is marked by its number', async () => {
    const onMark = vi.fn()
    render(<PatchList found={aFinding()} marked={1} onMark={onMark} />)
    const [, first, second] = within(screen.getByRole('table', { name: 'Patches of this view' })).getAllByRole('row')
    expect(first).toHaveTextContent('121.46.446.2 km NEgreatest 9.1 km ENE')
    expect(within(first!).getAllByText('grown by 11.4 km², moved 3.1 km NE')).toHaveLength(2)
    expect(second).toHaveTextContent('at least4')
    expect(screen.getByText(/the floor of the rule in force here/)).toBeInTheDocument()
    expect(screen.getByRole('columnheader', { name: 'Since 8 Jun' })).toBeInTheDocument()
    await userEvent.tab()
    await userEvent.tab()
    expect(screen.getByRole('button', { name: 'Mark patch 1 on the map' })).toHaveFocus()
    await userEvent.tab()
    await userEvent.keyboard('{Enter}')
    expect(onMark).toHaveBeenCalledWith(2)
  })

  test('of a view without any says so, and shows no empty table', () => {
    render(<PatchList found={aFinding({ answer: 'none above', sentence: 'Nothing in the 71 % of the water that was seen reaches 1.', patches: [], before: null })} marked={1} onMark={() => undefined} />)
    expect(screen.getByText('Nothing in the 71 % of the water that was seen reaches 1.')).toBeInTheDocument()
    expect(screen.queryByRole('table')).toBeNull()
  })
})

describe('the figures of a view', () => {
  test('tell where the greatest value is and why water was not seen', () => {
    render(<ViewFigures shown={aView()} />)
    expect(screen.getByText('51°12′N 10°21′W, 9.1 km ENE of the site')).toBeInTheDocument()
    const rows = within(screen.getByRole('table', { name: 'Water that was not seen, by reason' })).getAllByRole('row').map((row) => row.textContent)
    expect(rows.slice(1)).toEqual(['CLOUD14028 %', 'GLINT2under 1 %', 'Not seen in all14529 %'])
  })

  test('of a view that saw nothing have no greatest value, and say that all of it was not seen', () => {
    render(<ViewFigures shown={aView({ coverage: 0, valid: 0, validAreaKm2: 0, max: null, median: null, histogram: [], areaAboveKm2: 0, masked: [] })} />)
    expect(screen.queryByText('Greatest value')).toBeNull()
    expect(screen.getByText('100 %')).toBeInTheDocument()
    expect(screen.getByText('The file says no reason. The region holds 500 km² of water.')).toBeInTheDocument()
  })

  test('area by value is drawn with the level marked, and the same is in a table', async () => {
    render(<AreaByValue shown={aView()} />)
    expect(screen.getByRole('img', { name: 'Area by value. 25.4 km² of 355 km² seen at or above 1 mg m⁻³.' })).toBeInTheDocument()
    expect(screen.getByText('level 1')).toBeInTheDocument()
    expect(screen.getByText(/1 km² below 0.001, zero or negative/)).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'Table' }))
    expect(within(screen.getByRole('table', { name: 'Area by value' })).getAllByRole('row')).toHaveLength(5)
  })

  test('the axis has room for the level where no bin is', () => {
    const bins = [{ from: 0.1, to: 0.112, areaKm2: 3 }]
    const axis = valueAxis(bins, 5)!
    expect([axis.from, axis.to, axis.place(0.1), axis.place(100)]).toEqual([0.1, 6.25, 0, 1])
    expect(axis.place(5)).toBeGreaterThan(0.9)
    expect(valueAxis([{ from: null, to: 0.001, areaKm2: 3 }], 1)).toBeNull()
  })
})

const aRegion = {
  id: 3, name: 'Tarrow Bay', geometry: { type: 'Polygon', coordinates: [[[-10.5, 51], [-10, 51], [-10, 51.5], [-10.5, 51]]] }, geometryVersion: 1, areaKm2: 500, timeZone: 'UTC',
  site: null, contacts: [], shoreBufferKm: 0, opticallyComplex: false, createdAt: '2026-01-01T00:00:00Z', createdBy: null, retired: false, version: 1, repairs: [],
  standing: {
    state: 'usual', because: '', feedId: 1, ruleId: 2, unit: 'mg m-3', severity: null, alertId: null, seen: [], coverageFloor: 0.25, progress: null,
    view: { layerId: 7, day: '2026-06-10', observedAt: '2026-06-10T13:04:00Z', ageHours: 3, coverage: 0.71, value: 0.4, usual: 0.4, p10: 0.2, p90: 0.9, timesUsual: 1 },
  },
} satisfies Region

describe('the page of a region', () => {
  test('shows the patches of its newest usable view, goes to the view before, and looks above another level', async () => {
    const asked = fakeServer({
      'GET /regions/3/view': ({ path }) => reply(endpoints.regionView, path.includes('day=2026-06-08') ? { ...aView({ day: '2026-06-08' }), previous: null, next: '2026-06-10' } : aView()),
      'GET /regions/3/patches': () => reply(endpoints.regionPatches, aFinding()),
    })
    show(<ViewPart region={aRegion} feedId={1} />, { me: officer })
    expect(await screen.findByText('map of layers 7, 2 outlines, 1 marked')).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'Mark patch 2 on the map' }))
    expect(screen.getByText('map of layers 7, 2 outlines, 2 marked')).toBeInTheDocument()
    expect(screen.getByRole('button', { name: 'View after' })).toBeDisabled()
    await userEvent.click(screen.getByRole('button', { name: 'View before' }))
    expect(await screen.findByText('Mon 8 June 2026')).toBeInTheDocument()
    expect(screen.getByText('map of layers 7, 2 outlines, 1 marked')).toBeInTheDocument()
    await userEvent.type(screen.getByLabelText('Another level, mg m⁻³'), 'much{Enter}')
    expect(screen.getByText('A level is a number.')).toBeInTheDocument()
    await userEvent.clear(screen.getByLabelText('Another level, mg m⁻³'))
    await userEvent.type(screen.getByLabelText('Another level, mg m⁻³'), '2.5{Enter}')
    await vi.waitFor(() => expect(asked.map((one) => one.path)).toContain('/regions/3/patches?feedId=1&day=2026-06-08&level=2.5'))
  })

  test('of a feed without a view shows nothing of this', async () => {
    fakeServer({
      'GET /regions/3/view': () => reply(endpoints.regionView, { ...aView(), view: null, first: null, last: null, previous: null, next: null }),
      'GET /regions/3/patches': () => reply(endpoints.regionPatches, aFinding({ answer: 'no view', view: null, patches: [], before: null })),
    })
    show(<ViewPart region={aRegion} feedId={1} />, { me: officer })
    await vi.waitFor(() => expect(screen.queryByRole('status')).toBeNull())
    expect(screen.queryByText(/Patches/)).toBeNull()
  })
})

describe('the page of an alert', () => {
  test('shows the patches of the day it was judged by, and what was kept when it was', async () => {
    const { evidence } = anAlert()
    const largestPatch = { level: 1, areaKm2: 20, atLeast: true, cells: 3, greatest: 6, latitude: 51.2, longitude: -10.35, siteName: 'Crow Rock', nearest: { km: 6.21, bearing: 44 }, peakAway: { km: 6.21, bearing: 44 }, patches: 1 }
    fakeServer({
      'GET /regions/3': () => reply(endpoints.region, aRegion),
      'GET /regions/3/view': () => reply(endpoints.regionView, aView()),
      'GET /regions/3/patches': () => reply(endpoints.regionPatches, aFinding()),
    })
    show(<Where alert={anAlert({ evidence: { ...evidence, largestPatch } })} />, { me: officer })
    expect(await screen.findByText('map of layer 7, 2 outlines, 1 marked')).toBeInTheDocument()
    expect(screen.getByText('When it was judged: The largest patch at or above 1 mg m⁻³ covers at least 20 km² and reaches 6 mg m⁻³, 6.2 km NE of Crow Rock.')).toBeInTheDocument()
    expect(screen.getByRole('table', { name: 'Patches of this view' })).toBeInTheDocument()
  })
})
