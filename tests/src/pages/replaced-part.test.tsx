import { render, screen } from '@testing-library/react'
import { MemoryRouter } from 'react-router-dom'
import { describe, expect, it } from 'vitest'
import { paths } from '../../../shared/paths'
import { ReplacedPart } from '../../../src/pages/file/replaced-part'
import { aWaitingFile } from '../support/file-fixtures'

const layer = (id: number, replaced: boolean) => ({ id, feedId: 1, observedAt: '2026-06-10T12:00:00Z', replaced })
const newer = { id: 12, name: 'west_chl_2026-corrected.nc', at: '2026-06-11T15:00:00Z', layers: 1 }
const show = (change: Parameters<typeof aWaitingFile>[0]) =>
  render(
    <MemoryRouter>
      <ReplacedPart file={aWaitingFile({ status: 'processed', ...change })} />
    </MemoryRouter>,
  )

describe('a file and the one that replaced it', () => {
  it('says by which file and when, and that it is kept', () => {
    const { container } = show({ layers: [layer(1, true)], replacedBy: [newer] })
    expect(container.textContent).toBe(
      'This file was replaced. Replaced by west_chl_2026-corrected.nc on 11 Jun 2026. It is kept, but takes no part in any figure.',
    )
    expect(screen.getByRole('link').getAttribute('href')).toBe(paths.file.to({ id: 12 }))
  })

  it('tells apart files of one name', () => {
    const own = aWaitingFile().name
    expect(show({ layers: [layer(1, true)], replacedBy: [{ ...newer, name: own }] }).container.textContent).toContain(`Replaced by ${own}, a newer file of the same name, on 11 Jun 2026.`)
    expect(show({ replaces: { id: 3, name: own } }).container.textContent).toBe(`It came under the same address as ${own}, an older file of the same name, and took its place.`)
  })

  it('says so when only some of its layers were', () => {
    const { container } = show({ layers: [layer(1, true), layer(2, false)], replacedBy: [newer] })
    expect(container.textContent).toMatch(/^1 layer of this file was replaced\./)
  })

  it('names the file whose place it took', () => {
    const { container } = show({ replaces: { id: 3, name: 'older.nc' } })
    expect(container.textContent).toBe('It came under the same address as older.nc and took its place.')
  })

  it('says nothing where nothing was replaced', () => expect(show({}).container.textContent).toBe(''))
})
