import { existsSync, readFileSync } from 'node:fs'
import { afterEach, describe, expect, it } from 'vitest'
import { cellCentre } from '../../server/grids/cell-centre'
import type { GridSource } from '../../server/grids/grid-source'
import { openGridSource } from '../../server/grids/read/open'

/** Where Debian's package ferret-datasets puts its ocean grids. */
const folder = '/usr/share/ferret-vis/data/'
const present = existsSync(`${folder}etopo60.cdf`)
const inCi = Boolean(process.env['CI'])
if (!present && !inCi) {
  console.warn('The ocean grids are not compared: install the Debian package ferret-datasets to have them read.')
}

interface Expected {
  file: string
  variable: string
  step: number
  time: string | null
  rows: number
  columns: number
  firstLat: number
  lastLat: number
  firstLon: number
  lastLon: number
  cells: number
  valid: number
  mean: number
  min: number
  max: number
  sumOfSquares: number
  picks: [number, number, number | null][]
}

const { files, refused } = JSON.parse(readFileSync(new URL('./values/ocean-grids.json', import.meta.url).pathname, 'utf8')) as {
  files: Expected[]
  refused: Record<string, string>
}

let source: GridSource | null = null
afterEach(() => {
  source?.close()
  source = null
})

/** In CI the package has to be there: a missing one fails. */
describe.skipIf(!present && !inCi)('ocean grids that nobody here made, against xarray', () => {
  it.each(files)('$file $variable, step $step', async (wanted) => {
    source = await openGridSource(folder + wanted.file, wanted.file)
    const variable = source.variables.find(({ name }) => name === wanted.variable)!
    const { rows, columns } = variable.grid
    expect([rows, columns]).toEqual([wanted.rows, wanted.columns])
    const [first, last] = [cellCentre(variable.grid, 0), cellCentre(variable.grid, rows * columns - 1)]
    const aside = (a: number, b: number) => Math.abs(a - b - 360 * Math.round((a - b) / 360))
    expect(aside(first[0], wanted.firstLon)).toBeLessThan(1e-9)
    expect(aside(last[0], wanted.lastLon)).toBeLessThan(1e-9)
    const { observedAt } = variable.times[wanted.step]!
    expect(observedAt === null ? null : new Date(observedAt).toISOString()).toBe(wanted.time)

    const values = await source.readWindow(wanted.variable, wanted.step, { row: 0, column: 0, rows, columns })
    const seen = values.filter((value) => !Number.isNaN(value))
    expect([values.length, seen.length]).toEqual([wanted.cells, wanted.valid])
    const near = (actual: number, expected: number) => expect(Math.abs(actual - expected)).toBeLessThanOrEqual(1e-6 * Math.abs(expected))
    near(seen.reduce((a, b) => a + b) / seen.length, wanted.mean)
    near(seen.reduce((a, b) => Math.min(a, b)), wanted.min)
    near(seen.reduce((a, b) => Math.max(a, b)), wanted.max)
    near(seen.reduce((sum, value) => sum + value * value, 0), wanted.sumOfSquares)
    for (const [row, column, value] of wanted.picks) {
      const cell = await source.readWindow(wanted.variable, wanted.step, { row, column, rows: 1, columns: 1 })
      if (value === null) expect(cell[0]).toBeNaN()
      else near(cell[0]!, value)
    }
  })

  it.each(Object.entries(refused))('%s is refused as a %s', async (file, code) => {
    await expect(openGridSource(folder + file, file)).rejects.toMatchObject({ code })
  })
})
