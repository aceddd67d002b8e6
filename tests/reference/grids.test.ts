import { readFileSync } from 'node:fs'
import type { MultiPolygon, Polygon } from 'geojson'
import { afterEach, describe, expect, it } from 'vitest'
import { cellsWith } from '../../server/grids/flags'
import type { GridSource } from '../../server/grids/grid-source'
import { openGridSource } from '../../server/grids/read/open'
import { projectTo, unprojectFrom } from '../../server/grids/read/project'
import { cellAreasKm2 } from '../../shared/science/cell-areas'
import { cellShares } from '../../shared/science/cell-shares'
import { summarise } from '../../shared/science/figures'
import type { CurvilinearGrid, Grid } from '../../shared/science/grid'

const folder = new URL('./grids/', import.meta.url).pathname

type ExpectedFigures = Record<'cells' | 'valid' | 'validAreaKm2', number> & Partial<Record<Statistic, number>>
const statistics = ['mean', 'geometricMean', 'sdLog10', 'max', 'p10', 'p25', 'median', 'p75', 'p90', 'p95'] as const
type Statistic = (typeof statistics)[number]

interface ExpectedFile {
  variable: string
  unit: string
  times: string[]
  values: Record<string, (number | null)[][]>
  summaries: Record<string, Record<string, ExpectedFigures | null>>
  regions: string
  latEdges?: number[]
  lonEdges?: number[]
  transform?: number[]
  /** Of curvilinear grids: corners row by row, longitude and latitude. */
  corners?: ([number, number] | null)[][]
  /** Ends of composites. */
  ends?: string[]
  /** Of a flag variable: which cells each meaning marks. */
  flags?: Record<string, number[]>
}

const expected = JSON.parse(readFileSync(`${folder}expected.json`, 'utf8')) as {
  regions: Record<string, Record<string, Polygon | MultiPolygon>>
  files: Record<string, ExpectedFile>
}
const more = JSON.parse(readFileSync(`${folder}expected-more.json`, 'utf8')) as Pick<typeof expected, 'files'>
const filters = JSON.parse(readFileSync(`${folder}expected-filters.json`, 'utf8')) as Pick<typeof expected, 'files'>
Object.assign(expected.files, more.files, filters.files)

let source: GridSource | null = null
afterEach(() => {
  source?.close()
  source = null
})

async function open(name: string) {
  source = await openGridSource(folder + name, name)
  const file = expected.files[name]!
  const variable = source.variables.find((candidate) => candidate.name === file.variable)
  if (!variable) throw new Error(`${name} has ${source.variables.map((v) => v.name).join(', ')}`)
  return { source, file, variable }
}

const close = (actual: number, wanted: number, relative: number) =>
  expect(Math.abs(actual - wanted)).toBeLessThanOrEqual(relative * Math.max(Math.abs(wanted), 1e-12))

describe('files written and read back by reference libraries', () => {
  it('are at least sixty', () => expect(Object.keys(expected.files).length).toBeGreaterThanOrEqual(60))

  it.each(Object.keys(expected.files))('%s gives the same place, times and cell values', async (name) => {
    const { source, file, variable } = await open(name)
    expect(variable.quantity).toBe('chlorophyll')
    expect(variable.unit).toBe(file.unit)
    expect(variable.times.map(({ observedAt }) => new Date(observedAt ?? NaN).toISOString())).toEqual(file.times)
    if (file.ends) expect(variable.times.map(({ endsAt }) => new Date(endsAt ?? NaN).toISOString())).toEqual(file.ends)
    comparePlace(variable.grid, file)
    const { rows, columns } = variable.grid
    for (const [step, wanted] of Object.entries(file.values)) {
      const values = await source.readWindow(variable.name, Number(step), { row: 0, column: 0, rows, columns })
      expect(values.length).toBe(wanted.flat().length)
      wanted.flat().forEach((value, i) => {
        if (value === null) expect(values[i]).toBeNaN()
        else close(values[i]!, value, 1e-9)
      })
    }
  })

  it.each(Object.keys(expected.files))('%s gives the same values through small windows', async (name) => {
    const { source, file, variable } = await open(name)
    const [step, wanted] = Object.entries(file.values).at(-1)!
    for (const window of [
      { row: 3, column: 2, rows: 5, columns: 7 },
      { row: 0, column: 0, rows: 1, columns: 1 },
      { row: variable.grid.rows - 2, column: variable.grid.columns - 3, rows: 2, columns: 3 },
    ]) {
      const values = await source.readWindow(variable.name, Number(step), window)
      const cut = wanted.slice(window.row, window.row + window.rows)
      const cells = cut.flatMap((row) => row.slice(window.column, window.column + window.columns))
      expect(values.length).toBe(cells.length)
      cells.forEach((value, i) => (value === null ? expect(values[i]).toBeNaN() : close(values[i]!, value, 1e-9)))
    }
  })

  const flagged = Object.keys(expected.files).filter((name) => expected.files[name]!.flags)
  it.each(flagged)('%s marks the cells that numpy finds flagged', async (name) => {
    const { source, file, variable } = await open(name)
    const { rows, columns } = variable.grid
    const cells = await source.readFlags(variable.name, 0, { row: 0, column: 0, rows, columns })
    expect(variable.flags!.meanings.map((meaning) => meaning.name)).toEqual(Object.keys(file.flags!))
    for (const meaning of variable.flags!.meanings) expect(Array.from(cellsWith(cells, meaning))).toEqual(file.flags![meaning.name])
  })

  it.each(Object.keys(expected.files))('%s gives the figures of numpy and shapely for its regions', async (name) => {
    const { source, file, variable } = await open(name)
    const { grid } = variable
    const projected = grid.kind === 'transform'
    for (const [step, regions] of Object.entries(file.summaries)) {
      const values = await source.readWindow(variable.name, Number(step), {
        row: 0, column: 0, rows: grid.rows, columns: grid.columns,
      })
      for (const [region, wanted] of Object.entries(regions)) {
        const geometry = expected.regions[file.regions]![region]!
        const { index, share } = cellShares(geometry, grid, projected ? projectTo(grid.crs) : undefined)
        const areaKm2 = cellAreasKm2(grid, index, projected ? unprojectFrom(grid.crs) : undefined)
        const figures = summarise({ values: Float64Array.from(index, (cell) => values[cell]!), share, areaKm2 })
        expect(wanted).not.toBeNull()
        const relative = projected ? 1e-3 : 1e-6
        expect([figures.cells, figures.valid]).toEqual([wanted!.cells, wanted!.valid])
        close(figures.validAreaKm2, wanted!.validAreaKm2, relative)
        for (const statistic of statistics) {
          const value = wanted![statistic]
          if (value === undefined) expect(figures[statistic]).toBeNull()
          else close(figures[statistic]!, value, relative)
        }
      }
    }
  })
})

function comparePlace(grid: Grid, file: ExpectedFile): void {
  if (grid.kind === 'transform') {
    expect(file.transform).toBeDefined()
    file.transform!.forEach((number, i) => close(grid.transform[i]!, number, 1e-12))
    return
  }
  if (grid.kind === 'curvilinear') {
    compareCorners(grid, file)
    return
  }
  file.latEdges!.forEach((edge, i) => expect(grid.latEdges[i]).toBeCloseTo(edge, 10))
  expect(grid.lonEdges.length).toBe(file.lonEdges!.length)
  // Which turn round the globe a file counts from is free; the edges must be the same places.
  const turn = 360 * Math.round((file.lonEdges![0]! - grid.lonEdges[0]!) / 360)
  file.lonEdges!.forEach((edge, i) => expect(grid.lonEdges[i]! + turn).toBeCloseTo(edge, 9))
}

function compareCorners(grid: CurvilinearGrid, file: ExpectedFile): void {
  const corners = file.corners!.flat()
  expect(grid.cornerLats.length).toBe(corners.length)
  corners.forEach((corner, i) => {
    if (corner === null) {
      expect(grid.cornerLats[i]! + grid.cornerLons[i]!).toBeNaN()
      return
    }
    const [lon, lat] = corner
    expect(grid.cornerLats[i]).toBeCloseTo(lat, 8)
    const aside = grid.cornerLons[i]! - lon
    expect(aside - 360 * Math.round(aside / 360)).toBeCloseTo(0, 8)
  })
}
