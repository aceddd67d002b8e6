import { screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import type { Me } from '../../../../shared/schemas/auth'
import { endpoints } from '../../../../shared/schemas/endpoints'
import { feedFields, type Feed, type FeedProposal } from '../../../../shared/schemas/feeds'
import type { OffingFile, ReportVariable } from '../../../../shared/schemas/files'
import { Component as FilePage } from '../../../../src/pages/file'
import { fakeServer, reply } from '../../support/fake-server'
import { aWaitingFile } from '../../support/file-fixtures'
import { officer } from '../../support/fixtures'
import { show } from '../../support/show'

// Leaflet has no place to draw in here; the picture has its own test in the server and the browser.
vi.mock('../../../../src/pages/file/file-look', () => ({ default: () => null }))

const analyst: Me = { ...officer, id: 2, name: 'Ana Quill', roles: ['analyst'] }
const base = aWaitingFile()
const chl = base.report!.variables[0]!
const facts = {
  derivedFrom: null, derivedSources: [], formula: null, formulaVersion: null, retired: false, createdAt: '2026-06-11T03:00:00Z', version: 1,
  layers: 0, oldestLayerAt: null, newestLayerAt: null, newestAgeHours: null, silent: false,
}
let feeds: Feed[] = []
beforeEach(() => {
  feeds = []
})

function withVariables(variables: ReportVariable[], change: Partial<OffingFile> = {}, report: Partial<NonNullable<OffingFile['report']>> = {}): OffingFile {
  return aWaitingFile({ report: { ...base.report!, variables, ...report }, ...change })
}

function open(file: OffingFile, me = analyst) {
  const asked = fakeServer({
    'GET /files/9': () => reply(endpoints.file, file),
    'GET /feeds': () => reply(endpoints.listFeeds, { items: feeds, nextCursor: null }),
    'POST /files/9/feeds': ({ body }) => {
      const made = (body as { feeds: unknown[] }).feeds.map((one, i): Feed => ({ ...feedFields.parse(one), ...facts, id: 20 + i }))
      return reply(endpoints.confirmFeeds, { items: made, nextCursor: null })
    },
  })
  show(<FilePage />, { me, at: '/layers/files/9', pattern: '/layers/files/:id' })
  return asked
}

describe('the histogram', () => {
  const histogram = { scale: 'log10' as const, step: 0.05, firstBin: -2, counts: [3, 9, 1], below: 2, above: 0, p2: 0.8, p10: 0.82, median: 0.94, p90: 1.05, p98: 1.1 }

  it('says its median, scale and what is not drawn, and has its table', async () => {
    open(withVariables([{ ...chl, histogram }]))
    expect(await screen.findByRole('img', { name: /chl: cells by value, Median 0.94, p10 0.82, p90 1.05 mg m⁻³/ })).toBeVisible()
    expect(screen.getByText(/20 bins a decade/)).toHaveTextContent('Not drawn: 2 cells below 0.001, zero or negative.')
    await userEvent.click(screen.getByRole('button', { name: 'Table' }))
    const rows = within(screen.getByRole('table', { name: 'Cells by value of chl' })).getAllByRole('row')
    expect(rows.map((row) => within(row).queryAllByRole('cell').map((cell) => cell.textContent))).toEqual([[], ['0.794', '0.891', '3'], ['0.891', '1', '9'], ['1', '1.12', '1']])
  })

  it('says that only bands of a very large grid were looked at', async () => {
    open(withVariables([{ ...chl, histogram, cells: 4_000_000, grid: { ...chl.grid, rows: 4320, columns: 8640 } }]))
    expect(await screen.findByText(/Looked at: 4.000.000 of 37.324.800 cells, in bands of rows/)).toBeVisible()
  })
})

describe('kept and masked', () => {
  const found = { reasons: ['CLDICE', 'GLINT'], groups: [{ carry: [], value: 50, missing: 10, outside: 0 }, { carry: [0], value: 20, missing: 0, outside: 0 }, { carry: [0, 1], value: 20, missing: 0, outside: 0 }], unlisted: { value: 0, missing: 0, outside: 0 } }
  const flags = ['CLDICE', 'GLINT']

  it('changes while flags are ticked, with every reason in words', async () => {
    open(withVariables([{ ...chl, found }], { proposal: { ...base.proposal!, flagMeanings: flags, hiddenFlags: ['CLDICE'] } }))
    const words = async () => within((await screen.findByText('kept')).closest('ul')!).getAllByRole('listitem').map((item) => item.textContent?.trim())
    expect(await words()).toEqual(['kept 50 %', 'masked: CLDICE 40 %', 'masked: missing in the file, no reason given 10 %'])
    await userEvent.click(screen.getByRole('checkbox', { name: 'CLDICE' }))
    expect(await words()).toEqual(['kept 90 %', 'masked: missing in the file 10 %'])
    await userEvent.click(screen.getByRole('checkbox', { name: 'GLINT' }))
    expect(await words()).toEqual(['kept 70 %', 'masked: GLINT 20 %', 'masked: missing in the file, no reason given 10 %'])
    expect(screen.getByText(/A cell may have several reasons/)).toBeVisible()
  })

  it('of a file that was read goes by the flags of its feeds', async () => {
    open(withVariables([{ ...chl, found, masked: [{ reason: 'GLINT', cells: 20 }] }], { status: 'processed', proposal: null, waitingFor: null }))
    expect(await screen.findByText('masked: GLINT')).toBeVisible()
    expect(screen.queryByText('masked: CLDICE')).toBeNull()
  })
})

describe('what a file holds', () => {
  const axes = [
    { dimension: 'time', size: 12, role: 'time' as const, coordinate: 'time', unit: 'days since 1970-01-01', first: 20603, last: 20614, spacing: 1, direction: 'ascending' as const },
    { dimension: 'lat', size: 70, role: 'latitude' as const, coordinate: 'lat', unit: 'degrees_north', first: 53.45, last: 50.625, spacing: null, direction: 'descending' as const },
  ]
  const attributes = { items: [{ name: 'comment', value: '<img src=x onerror=alert(1)>', length: null }, { name: 'history', value: 'made', length: 9000 }], leftOut: 3 }

  it('shows axes with role, ends, spacing and direction', async () => {
    open(withVariables([{ ...chl, axes }]))
    const table = await screen.findByRole('table', { name: 'Axes of chl' })
    expect(within(table).getByRole('row', { name: 'time time 12 20603 (30 May 2026) 20614 (10 Jun 2026) 1 ascending days since 1970-01-01' })).toBeVisible()
    expect(within(table).getByRole('row', { name: 'lat latitude 70 53.45 50.625 uneven descending degrees_north' })).toBeVisible()
  })

  it('shows attributes as text, markup too, and says what was cut and left out', async () => {
    open(withVariables([{ ...chl, attributes }], {}, { attributes }))
    const fold = await screen.findByText('Attributes of the file (5)')
    const list = fold.closest('details')!
    expect(within(list).getByText('<img src=x onerror=alert(1)>')).toBeInTheDocument()
    expect(list.querySelector('img')).toBeNull()
    expect(list).toHaveTextContent(/cut: 9.000 characters in all/)
    expect(list).toHaveTextContent('3 more attributes not shown.')
  })

  it('says of every variable what it is used for, and shows the one that is chosen', async () => {
    open(withVariables([{ ...chl, axes }, { ...chl, name: 'chl_error', axes: axes.slice(1), tellsOfAnother: true }]))
    const table = await screen.findByRole('table', { name: 'Variables of this file' })
    expect(within(table).getByRole('row', { name: /^chl Chlorophyll.* proposed shown/ })).toBeVisible()
    expect(within(table).getByRole('row', { name: /chl_error .*never proposed: it tells of another variable/ })).toBeVisible()
    await userEvent.click(screen.getByRole('button', { name: 'Show chl_error' }))
    expect(screen.getByRole('table', { name: 'Axes of chl_error' })).toBeVisible()
  })

  it('says why each feed did not take it', async () => {
    open(withVariables([chl], {}, { missed: [{ feedId: 3, feed: 'Chlorophyll, daily', why: 'reads chlor_a in mg m-3; this file has chl in mg m-3.' }] }))
    const item = (await screen.findByRole('link', { name: 'Chlorophyll, daily' })).closest('li')
    expect(item).toHaveTextContent('Chlorophyll, daily reads chlor_a in mg m-3; this file has chl in mg m-3.')
  })

  it('is shown to those who may not confirm, without anything to answer', async () => {
    open(withVariables([{ ...chl, axes }]), { ...officer, roles: ['researcher'] })
    expect(await screen.findByRole('table', { name: 'Axes of chl' })).toBeVisible()
    expect(screen.queryByText('please say')).toBeNull()
    expect(screen.queryByRole('button', { name: /Confirm/ })).toBeNull()
  })
})

describe('what happens then', () => {
  const outcome = async (word: RegExp) => (await screen.findByText(word)).parentElement!

  it('counts layers and regions, says by what later files are matched, and that history is thin', async () => {
    open(withVariables([chl], { wouldGive: { regions: [{ id: 1, name: 'Hallin Bank' }], ofRegions: 9 } }))
    expect(await outcome(/^12 layers$/)).toHaveTextContent('are read: 12 steps from 30 May 2026 to 10 Jun 2026.')
    expect(await outcome(/^1 of 9 regions$/)).toHaveTextContent('meets the grid and gets figures. Hallin Bank.')
    expect(await outcome(/^Later files$/)).toHaveTextContent('that are named like west_chl_* and hold chl in mg m⁻³ are read by themselves.')
    expect(await outcome(/^Alerts$/)).toHaveTextContent('this file holds 1 year, so until more is read its views are “not ready”')
  })

  it('says that a gap-filled feed cannot raise alerts, and why', async () => {
    open(withVariables([chl], { proposal: { ...base.proposal!, gapFilled: true } }))
    expect(await outcome(/^Alerts$/)).toHaveTextContent('cannot be raised: cells of this file were filled in and it does not say which')
  })
})

describe('bands of reflectance', () => {
  const bandOf = (nm: number): FeedProposal => feedFields.parse({ name: `Reflectance ${nm} nm, daily`, quantity: 'reflectance', variable: `Rrs_${nm}`, unit: 'sr-1', scale: 'linear' })
  const variables = [443, 490, 510, 555].map((nm): ReportVariable => ({ ...chl, name: `Rrs_${nm}`, quantity: 'reflectance', unit: 'sr-1', wavelengthNm: nm, times: { ...chl.times, count: 1 } }))
  const waiting = withVariables(variables, { proposal: bandOf(443), others: [bandOf(490), bandOf(510), bandOf(555)] })

  it('are all ticked; what stays ticked is made at once, under the names given', async () => {
    const asked = open(waiting)
    expect(await screen.findByRole('button', { name: 'Confirm 4 feeds, read 4 layers' })).toBeVisible()
    await userEvent.click(screen.getByRole('checkbox', { name: 'Read Rrs_510' }))
    const name = screen.getByLabelText('Name of the feed of Rrs_555')
    await userEvent.clear(name)
    await userEvent.type(name, 'Green')
    await userEvent.selectOptions(screen.getByLabelText('Stage'), 'reprocessed')
    await userEvent.click(screen.getByRole('button', { name: 'Confirm 3 feeds, read 3 layers' }))
    await expect.poll(() => asked.find((one) => one.method === 'POST')?.body).toEqual({
      feeds: [bandOf(443), bandOf(490), { ...bandOf(555), name: 'Green' }].map((one) => ({ ...one, stage: 'reprocessed' })),
    })
  })

  it('ask for a tick and for names in words, and send nothing until then', async () => {
    const asked = open(waiting)
    await userEvent.clear(await screen.findByLabelText('Name of the feed of Rrs_490'))
    await userEvent.click(screen.getByRole('button', { name: /Confirm 4 feeds/ }))
    expect(await screen.findByText('The feed needs a name.')).toBeVisible()
    for (const { name } of variables) await userEvent.click(screen.getByRole('checkbox', { name: `Read ${name}` }))
    await userEvent.click(screen.getByRole('button', { name: /Confirm 0 feeds/ }))
    expect(await screen.findByText('Tick at least one feed.')).toBeVisible()
    expect(asked.some((one) => one.method === 'POST')).toBe(false)
  })

  it('once read, name the formulas they are enough for, and lead to the feed that can make them', async () => {
    feeds = [{ ...bandOf(443), ...facts, id: 7 }, { ...feedFields.parse({ name: 'By OC4', quantity: 'chlorophyll', variable: 'chlor_a', unit: 'mg m-3', scale: 'log10' }), ...facts, id: 8, derivedFrom: 7, derivedSources: [7], formula: 'oc4-seawifs', formulaVersion: '2019' }]
    open(withVariables(variables, { status: 'processed', proposal: null, waitingFor: null }, { feeds: [{ feedId: 7, variable: 'Rrs_443', layers: 1 }] }))
    const ratio = (await screen.findByText('Chlorophyll by band ratio OC4 SeaWiFS')).closest('li')!
    expect(within(ratio).getByRole('link', { name: 'By OC4' })).toHaveAttribute('href', '/feeds/8')
    expect(within(ratio).getByRole('link', { name: /^version 6/ })).toHaveAttribute('href', '/feeds/7?formula=oc4-seawifs&version=6')
    const screenLine = screen.getByText('Bright-water (coccolith) screen').closest('li')!
    expect(screenLine).toHaveTextContent('Coefficients from memory.')
    expect(within(screenLine).getByRole('link')).toHaveAttribute('href', '/feeds/7?formula=bright-water&version=1')
    expect(screen.queryByText('Turbidity')).toBeNull()
  })
})

describe('figures of several feeds', () => {
  it('say which feed each belongs to', async () => {
    const row = { regionId: 1, regionName: 'Hallin Bank', day: '2026-06-10', coverage: 0.7, median: 0.0031, geometricMean: 0.003 }
    feeds = [7, 8].map((id) => ({ ...feedFields.parse({ name: `Band ${id}`, quantity: 'reflectance', variable: 'Rrs_443', unit: 'sr-1', scale: 'linear' }), ...facts, id }))
    open(withVariables([chl], { status: 'processed', proposal: null, waitingFor: null, summaries: [{ ...row, feedId: 7 }, { ...row, feedId: 8 }] }))
    expect(await screen.findByRole('row', { name: /Hallin Bank Band 7 10 Jun 2026/ })).toBeVisible()
    expect(screen.getByRole('row', { name: /Hallin Bank Band 8 10 Jun 2026/ })).toBeVisible()
  })
})
